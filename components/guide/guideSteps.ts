/** A card of the guide: what a control is for, and where it is. */
export interface GuideStep {
  title: string;
  text: string;
  /** The control, the first of these that is on the page: a phone keeps some behind a tab. */
  at: readonly string[];
}

/** Five cards, in the order of the work; all but the last stand on the cube screen. */
export const GUIDE: readonly GuideStep[] = [
  {
    title: 'Run through the channels',
    text: 'The strip holds every channel by velocity, with the mean spectrum over it. Drag along it, or use the arrow keys: a shell is a ring that grows, peaks and closes.',
    at: ['[data-testid="strip"]'],
  },
  {
    title: 'Mark the rim',
    text: 'Choose or name a shell, switch “Mark” on, and tap points along its ring, on a few channels. After three the circle through them appears. Marks save by themselves.',
    at: ['[data-testid="map"]'],
  },
  {
    title: 'Watch the fit',
    text: 'Each channel’s ring is a point of radius against velocity, and the model a curve through them, live while you mark. Drag its crown or its feet to set where the fit starts.',
    at: ['[role="img"][aria-label*="adius"]', '[role="tab"][aria-label="Fit"]'],
  },
  {
    title: 'Keep a fit of record',
    text: 'When the marks are good, run the fit of record: it keeps marks, model and error bars for good. Adopt it, and it stands for the shell.',
    at: [
      'button[aria-label^="Run"]',
      '[role="button"][aria-label^="Run"]',
      '[role="tab"][aria-label="Results"]',
    ],
  },
  {
    title: 'Find it in the catalogue',
    text: 'Every shell with an adopted fit has a row there: filter, compare, plot and download. That is all; this guide stays under “Keys”.',
    at: ['[role="navigation"] a[href="/catalogue"]'],
  },
];
