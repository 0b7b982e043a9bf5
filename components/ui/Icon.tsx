import Svg, { Circle, Path } from 'react-native-svg';
import { useTheme } from './theme';
import type { Colors } from './tokens';

/** Outlines on a 24-unit square, drawn with round 1.75-unit strokes. */
const paths = {
  regions: 'M3.5 6.5 9 4l6 2.5L20.5 4v13.5L15 20l-6-2.5L3.5 20zM9 4v13.5M15 6.5V20',
  shells: 'M12 3.5a8.5 8.5 0 1 0 8.5 8.5M12 7a5 5 0 0 1 5 5',
  catalogue: 'M4 6.5h16M4 12h16M4 17.5h16',
  inbox: 'M3.5 13.5 6.5 5h11l3 8.5V19h-17zM3.5 13.5h5l1.5 2.5h4l1.5-2.5h5',
  you: 'M12 12a4 4 0 1 0 0-8 4 4 0 0 0 0 8zM4.5 20c.8-3.6 3.7-5.5 7.5-5.5s6.7 1.9 7.5 5.5',
  back: 'M15 5l-7 7 7 7',
  next: 'M9 5l7 7-7 7',
  up: 'M5 15l7-7 7 7',
  down: 'M5 9l7 7 7-7',
  close: 'M6 6l12 12M18 6L6 18',
  plus: 'M12 5v14M5 12h14',
  check: 'M5 12.5l4.5 4.5L19 7',
  more: 'M4.2 12a.8.8 0 1 0 1.6 0a.8.8 0 1 0-1.6 0M11.2 12a.8.8 0 1 0 1.6 0a.8.8 0 1 0-1.6 0M18.2 12a.8.8 0 1 0 1.6 0a.8.8 0 1 0-1.6 0',
  upload: 'M12 16V4.5M7 9l5-5 5 5M4.5 16v3.5h15V16',
  download: 'M12 4.5V16M7 11.5l5 5 5-5M4.5 16v3.5h15V16',
  pause: 'M8.5 5v14M15.5 5v14',
  play: 'M7.5 5l11 7-11 7z',
  retry: 'M19.5 12a7.5 7.5 0 1 1-2.2-5.3L19.5 9M19.5 4v5h-5',
  trash: 'M4.5 7h15M9.5 7V4.5h5V7M6.5 7l1 13h9l1-13M10.3 11v5.5M13.7 11v5.5',
  edit: 'M4.5 19.5l1-4L16 5l3 3L8.5 18.5zM13.5 7.5l3 3',
  undo: 'M8.5 5L4 9.5 8.5 14M4 9.5h10a5.5 5.5 0 0 1 0 11h-3',
  redo: 'M15.5 5L20 9.5 15.5 14M20 9.5H10a5.5 5.5 0 0 0 0 11h3',
  caution: 'M12 4l9 15.5H3zM12 10v4.5M12 17.2h.01',
  info: 'M12 20.5a8.5 8.5 0 1 0 0-17 8.5 8.5 0 0 0 0 17zM12 11v5.5M12 7.8h.01',
  doubt:
    'M12 20.5a8.5 8.5 0 1 0 0-17 8.5 8.5 0 0 0 0 17zM9.5 9.7a2.5 2.5 0 1 1 3.6 2.2c-.8.4-1.1 1-1.1 1.9M12 16.6h.01',
  hand: 'M12 3v18M3 12h18M12 3l-2.5 2.5M12 3l2.5 2.5M12 21l-2.5-2.5M12 21l2.5-2.5M3 12l2.5-2.5M3 12l2.5 2.5M21 12l-2.5-2.5M21 12l-2.5 2.5',
  lasso:
    'M8.5 17.5C5.5 16.5 3.5 14 3.5 11c0-4 4-7 8.5-7s8.5 3 8.5 6.5-4 6-8 6c-2 0-4-.5-4-2 0-1.2 1.5-1.5 2.5-.5 1.5 1.5.5 4.5-2.5 6.5',
  ring: 'M12 20.5a8.5 8.5 0 1 0 0-17 8.5 8.5 0 0 0 0 17zM12 12h.01M12 12l6-6',
  search: 'M10.5 17a6.5 6.5 0 1 0 0-13 6.5 6.5 0 0 0 0 13zM15.5 15.5L20.5 20.5',
  filter: 'M4 6h16M7 12h10M10 18h4',
  compare: 'M4 18c0-9 3-12 5-12s5 3 5 12M10 18c0-7 3-9 5-9s5 2 5 9',
  cube: 'M4 8l8-4 8 4v8l-8 4-8-4zM4 8l8 4 8-4M12 12v8',
  chart: 'M4.5 4v15.5H20M8.5 15.5l3.5-4 3 2.5 4-6',
  link: 'M10 14l4-4M8.5 12l-2.5 2.5a3.5 3.5 0 0 0 5 5L13.5 17M15.5 12L18 9.5a3.5 3.5 0 0 0-5-5L10.5 7',
  keys: 'M3.5 7h17v10.5h-17zM7 10.5h.01M10.3 10.5h.01M13.7 10.5h.01M17 10.5h.01M8 14.2h8',
  sun: 'M12 16a4 4 0 1 0 0-8 4 4 0 0 0 0 8zM12 3v2M12 19v2M3 12h2M19 12h2M5.6 5.6L7 7M17 17l1.4 1.4M5.6 18.4L7 17M17 7l1.4-1.4',
  fit: 'M4 4v4M4 4h4M20 4v4M20 4h-4M4 20v-4M4 20h4M20 20v-4M20 20h-4M12 9v6M9 12h6',
  minus: 'M5 12h14',
  target: 'M12 19a7 7 0 1 0 0-14 7 7 0 0 0 0 14zM12 2.5v4M12 17.5v4M2.5 12h4M17.5 12h4',
} as const;
export type IconName = keyof typeof paths;

/** Decoration: the control that carries it has the name. */
export function Icon({
  name,
  size = 20,
  tone = 'text',
}: {
  name: IconName;
  size?: number;
  tone?: keyof Colors;
}) {
  const { color } = useTheme();
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" aria-hidden fill="none">
      <Path
        d={paths[name]}
        stroke={color[tone]}
        strokeWidth={1.75}
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </Svg>
  );
}

/** The wordmark's sign: a ring with a centre, and the arc of a second one. */
export function Sign({ size = 22 }: { size?: number }) {
  const { color } = useTheme();
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" aria-hidden fill="none">
      <Circle cx={12} cy={12} r={10} stroke={color.text} strokeWidth={1.8} />
      <Circle cx={12} cy={12} r={2} fill={color.person} />
      <Path d="M12 6.2A5.8 5.8 0 0 1 17.8 12" stroke={color.text} strokeWidth={1.8} strokeLinecap="round" />
    </Svg>
  );
}
