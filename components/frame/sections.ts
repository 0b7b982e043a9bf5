import type { IconName } from '../ui/Icon';

export interface Section {
  href: '/regions' | '/shells' | '/catalogue' | '/inbox' | '/you';
  label: string;
  icon: IconName;
  /** Path beginnings that belong to it. */
  holds: readonly string[];
}

/** The five places of the app, in the order of the phone's tabs. */
export const sections: readonly Section[] = [
  { href: '/regions', label: 'Regions', icon: 'regions', holds: ['/regions', '/cubes'] },
  { href: '/shells', label: 'Shells', icon: 'shells', holds: ['/shells'] },
  { href: '/catalogue', label: 'Catalogue', icon: 'catalogue', holds: ['/catalogue', '/compare'] },
  { href: '/inbox', label: 'Inbox', icon: 'inbox', holds: ['/inbox'] },
  { href: '/you', label: 'You', icon: 'you', holds: ['/you'] },
];

export const holds = (section: Section, path: string): boolean =>
  section.holds.some((start) => path === start || path.startsWith(`${start}/`));
