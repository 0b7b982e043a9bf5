import Svg, { Path } from 'react-native-svg';
import { useTheme } from '../ui/theme';

export type Shape = 'circle' | 'square' | 'triangle' | 'diamond' | 'cross';
export interface GlyphLook {
  shape: Shape;
  filled: boolean;
}

const LOOKS: readonly GlyphLook[] = [
  { shape: 'circle', filled: true },
  { shape: 'square', filled: false },
  { shape: 'triangle', filled: true },
  { shape: 'diamond', filled: false },
  { shape: 'square', filled: true },
  { shape: 'circle', filled: false },
  { shape: 'diamond', filled: true },
  { shape: 'triangle', filled: false },
];

/** Regions differ by shape and fill, never by hue alone; the ninth looks like the first again, and has its name. */
export const glyphOf = (index: number): GlyphLook => LOOKS[Math.max(0, index) % LOOKS.length]!;

/** Outline about (0, 0) with this half width. */
export function glyphPath(shape: Shape, r: number): string {
  switch (shape) {
    case 'circle':
      return `M${-r} 0a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0z`;
    case 'square':
      return `M${-r} ${-r}h${2 * r}v${2 * r}h${-2 * r}z`;
    case 'triangle':
      return `M0 ${-1.2 * r}L${1.15 * r} ${0.8 * r}H${-1.15 * r}z`;
    case 'diamond':
      return `M0 ${-1.3 * r}L${1.3 * r} 0L0 ${1.3 * r}L${-1.3 * r} 0z`;
    case 'cross':
      return `M${-r} ${-r}L${r} ${r}M${r} ${-r}L${-r} ${r}`;
  }
}

/** The sign of a region beside its name. */
export function Glyph({ index, size = 14 }: { index: number; size?: number }) {
  const { color } = useTheme();
  const { shape, filled } = glyphOf(index);
  return (
    <Svg width={size} height={size} viewBox="-8 -8 16 16" aria-hidden>
      <Path
        d={glyphPath(shape, 4.6)}
        fill={filled ? color.text : color.panel}
        stroke={color.text}
        strokeWidth={1.6}
      />
    </Svg>
  );
}
