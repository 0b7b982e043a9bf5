/** Every colour and measure of the interface; hex values and bare pixels live here and nowhere else. */
const dome = {
  ground: '#0A0F1C',
  panel: '#111829',
  raised: '#192238',
  chip: '#1F2A45',
  selected: '#192238',
  line: '#26314D',
  /** edges of things one can operate: at least 3:1 on ground, panel and raised */
  control: '#6B7AA3',
  text: '#E9EDF6',
  quiet: '#9FABC6',
  /** what a person put there: marks, readings, selection */
  person: '#F3AE3D',
  onPerson: '#1A1204',
  personWash: '#2B2414',
  /** what the model says: curves, rings, bands */
  model: '#56CBDD',
  onModel: '#04181C',
  modelWash: '#10293A',
  /** errors alone */
  error: '#FF7A6B',
  errorWash: '#33191F',
  focus: '#FFFFFF',
  action: '#E9EDF6',
  onAction: '#0A0F1C',
  scrim: 'rgba(3, 6, 14, 0.72)',
  shadow: 'rgba(0, 0, 0, 0.45)',
  /** image panels are dark in both themes */
  image: '#05070D',
  onImage: '#F4F1EA',
  /** pixels without a value */
  imageHatch: '#2C3348',
  imageShade: 'rgba(5, 7, 13, 0.78)',
  personOnImage: '#F3AE3D',
  modelOnImage: '#56CBDD',
  edgeOnImage: '#0A0710',
};

export type Colors = Record<keyof typeof dome, string>;

const paper: Colors = {
  ground: '#F5F0E6',
  panel: '#FDFBF6',
  raised: '#FFFFFF',
  chip: '#EDE5D6',
  selected: '#EDE5D6',
  line: '#DCD3C2',
  control: '#857B63',
  text: '#1B2030',
  quiet: '#565C6E',
  person: '#8A5200',
  onPerson: '#FFFFFF',
  personWash: '#F8E8CB',
  model: '#00667A',
  onModel: '#FFFFFF',
  modelWash: '#DCEEF0',
  error: '#B3261E',
  errorWash: '#FBE6E1',
  focus: '#1B2030',
  action: '#1B2030',
  onAction: '#FDFBF6',
  scrim: 'rgba(27, 32, 48, 0.45)',
  shadow: 'rgba(27, 32, 48, 0.18)',
  image: dome.image,
  onImage: dome.onImage,
  imageHatch: dome.imageHatch,
  imageShade: dome.imageShade,
  personOnImage: dome.personOnImage,
  modelOnImage: dome.modelOnImage,
  edgeOnImage: dome.edgeOnImage,
};

export const themes = { dome, paper } as const satisfies Record<string, Colors>;
export type ThemeName = keyof typeof themes;

/** Five sizes: [font size, line height]. */
export const typeScale = {
  small: [12, 16],
  body: [14, 20],
  lead: [16, 24],
  title: [20, 24],
  display: [28, 32],
} as const;
export type TypeSize = keyof typeof typeScale;

export const fonts = {
  regular: 'OutswellText',
  semibold: 'OutswellTextSemibold',
  bold: 'OutswellTextBold',
  mono: 'OutswellMono',
  monoSemibold: 'OutswellMonoSemibold',
} as const;

/** The 4-px grid: space(3) is 12. */
export const space = (n: number): number => n * 4;

/** What rounded corners, notches and bars of the system take from an edge; 0 elsewhere. */
export const inset = (edge: 'top' | 'right' | 'bottom' | 'left', more = 0): number =>
  `calc(env(safe-area-inset-${edge}, 0px) + ${more}px)` as unknown as number;

export const radius = { small: 6, large: 10, round: 999 } as const;
export const hairline = 1;
/** The least side of anything to be hit by a finger. */
export const touch = 44;
/** Columns from `wide` on, room for a second map from `roomy` on; a phone on its side below the height `low`; px. */
export const breakpoints = { wide: 900, roomy: 1440, low: 480 } as const;
/** Milliseconds; used only where motion explains, and not under reduced motion. */
export const motion = { quick: 150, slow: 200 } as const;
export const layout = {
  topBar: 52,
  tabBar: 56,
  column: 256,
  readable: 720,
  content: 1440,
  dialog: 520,
} as const;
