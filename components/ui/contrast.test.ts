import { themes, type Colors } from './tokens';

const luminance = (hex: string): number => {
  const [r, g, b] = [1, 3, 5]
    .map((i) => parseInt(hex.slice(i, i + 2), 16) / 255)
    .map((v) => (v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
};
/** WCAG 2.2, contrast ratio. */
const contrast = (a: string, b: string): number => {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (light! + 0.05) / (dark! + 0.05);
};

type Pair = [keyof Colors, keyof Colors];
const surfaces = ['ground', 'panel', 'raised', 'chip', 'selected'] as const;
const textPairs: Pair[] = [
  ...(['text', 'quiet', 'person', 'model', 'error'] as const).flatMap((ink) =>
    surfaces.map((s): Pair => [ink, s]),
  ),
  ['onAction', 'action'],
  ['onPerson', 'person'],
  ['onModel', 'model'],
  ['person', 'personWash'],
  ['model', 'modelWash'],
  ['error', 'errorWash'],
  ['onImage', 'image'],
  ['personOnImage', 'image'],
  ['modelOnImage', 'image'],
];
const graphicPairs: Pair[] = [
  ...(['ground', 'panel', 'raised'] as const).map((s): Pair => ['control', s]),
  ...(['ground', 'panel', 'raised', 'chip'] as const).map((s): Pair => ['focus', s]),
  ['model', 'chip'],
];

describe.each(Object.entries(themes))('theme %s', (_name, color) => {
  test.each(textPairs)('text %s on %s reaches 4.5:1', (ink, ground) =>
    expect(contrast(color[ink], color[ground])).toBeGreaterThanOrEqual(4.5),
  );
  test.each(graphicPairs)('graphics %s on %s reach 3:1', (ink, ground) =>
    expect(contrast(color[ink], color[ground])).toBeGreaterThanOrEqual(3),
  );
});
