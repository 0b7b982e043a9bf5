import type { Page } from 'playwright-core';

/** The windows that people have; landscape is a phone on its side. */
export const WINDOWS = [
  { name: '390', width: 390, height: 844, touch: true },
  { name: '844 landscape', width: 844, height: 390, touch: true },
  { name: '900', width: 900, height: 1100, touch: false },
  { name: '1440', width: 1440, height: 900, touch: false },
  { name: '2560', width: 2560, height: 1440, touch: false },
] as const;
export type Window = (typeof WINDOWS)[number];
export const THEMES = ['light', 'dark'] as const;

/** Records of the demo that the screens show. */
export interface Shown {
  regionId: string;
  cubeId: string;
  shellId: string;
  fitId: string;
  channel: number;
  compared: readonly string[];
}

export interface SheetScreen {
  name: string;
  path: (shown: Shown) => string;
  /** What is done on it before it is photographed. */
  prepare?: (page: Page, wide: boolean) => Promise<void>;
}

const tab = (name: string) => async (page: Page, wide: boolean) => {
  if (!wide) await page.getByRole('tab', { name, exact: true }).click();
};
const cube = ({ cubeId, shellId, channel }: Shown) => `/cubes/${cubeId}?shell=${shellId}&ch=${channel}`;

export const SCREENS: readonly SheetScreen[] = [
  { name: 'regions', path: () => '/regions' },
  { name: 'region', path: (s) => `/regions/${s.regionId}` },
  { name: 'cube', path: cube },
  { name: 'cube-fit', path: cube, prepare: tab('Fit') },
  { name: 'cube-results', path: cube, prepare: tab('Results') },
  {
    name: 'cube-look',
    path: cube,
    prepare: async (page) => {
      await page.getByTestId('map').waitFor();
      await page.keyboard.press('w');
    },
  },
  {
    name: 'save-picture',
    path: cube,
    prepare: async (page) => {
      await page.getByTestId('map').waitFor();
      await page.keyboard.press('Control+s');
      await page.getByLabel('What will be saved').waitFor();
    },
  },
  { name: 'about', path: (s) => `/cubes/${s.cubeId}/about` },
  { name: 'shells', path: () => '/shells' },
  { name: 'shell', path: (s) => `/shells/${s.shellId}` },
  { name: 'fit', path: (s) => `/shells/${s.shellId}/fits/${s.fitId}` },
  { name: 'catalogue', path: () => '/catalogue' },
  { name: 'compare', path: (s) => `/compare?ids=${s.compared.join(',')}` },
  { name: 'inbox', path: () => '/inbox' },
  { name: 'you', path: () => '/you' },
];
