import { useMemo } from 'react';
import { View } from 'react-native';
import Svg, { G, Line, Path, Rect, Text as SvgText } from 'react-native-svg';
import { labelOf, niceTicks } from '@/shared/image/ticks';
import { useTheme } from '../ui/theme';
import { fonts, typeScale } from '../ui/tokens';
import { contour, densityOf, histogram, levelHolding } from './density';
import { percentile, type DrawColumn } from './drawColumns';
import { unitOf, writtenName } from './parameterWords';

const MARGIN = { left: 60, right: 12, top: 8, bottom: 52 };
const GAP = 6;
const BINS = 24;
/** Smallest side of a panel that can still be read, px. */
export const LEAST_PANEL = 76;
const MOST_PANEL = 150;
export const cornerWidth = (panels: number): number =>
  MARGIN.left + MARGIN.right + panels * LEAST_PANEL + (panels - 1) * GAP;

interface Axis {
  column: DrawColumn;
  low: number;
  high: number;
}

/** Every pair of parameters with its draws and the contours that hold 68 and 95 % of them; histograms on the diagonal. */
export function CornerPlot({
  columns,
  width,
  name,
}: {
  columns: readonly DrawColumn[];
  width: number;
  name: string;
}) {
  const { color } = useTheme();
  const axes = useMemo(() => columns.map(axisOf), [columns]);
  const n = axes.length;
  const room = width - MARGIN.left - MARGIN.right - (n - 1) * GAP;
  const side = Math.min(Math.floor(room / n), MOST_PANEL);
  const at = (k: number) => k * (side + GAP);
  const height = MARGIN.top + at(n) - GAP + MARGIN.bottom;
  const font = { fontFamily: fonts.mono, fontSize: typeScale.small[0] - 1, fill: color.quiet };
  const title = { fontFamily: fonts.semibold, fontSize: typeScale.small[0], fill: color.text };
  const total = MARGIN.left + at(n) - GAP + MARGIN.right;
  return (
    <View role="img" aria-label={describe(columns, name)} style={{ width: total, height }}>
      <Svg width={total} height={height} aria-hidden>
        {axes.map((row, i) =>
          axes.slice(0, i + 1).map((column, j) => (
            <G key={`${i} ${j}`} x={MARGIN.left + at(j)} y={MARGIN.top + at(i)}>
              <Rect width={side} height={side} fill="none" stroke={color.line} />
              {i === j ? <Marginal axis={row} side={side} /> : <Pair across={column} up={row} side={side} />}
            </G>
          )),
        )}
        {axes.map((axis, k) => (
          <G key={axis.column.name}>
            {ticksOf(axis, side).map((tick) => (
              <SvgText
                key={tick.label}
                {...font}
                x={MARGIN.left + at(k) + tick.share * side}
                y={MARGIN.top + at(n) - GAP + 16}
                textAnchor="middle"
              >
                {tick.label}
              </SvgText>
            ))}
            <SvgText
              {...title}
              x={MARGIN.left + at(k) + side / 2}
              y={MARGIN.top + at(n) - GAP + 36}
              textAnchor="middle"
            >
              {axisTitle(axis.column.name)}
            </SvgText>
            {k > 0 && (
              <>
                {ticksOf(axis, side).map((tick) => (
                  <SvgText
                    key={tick.label}
                    {...font}
                    x={MARGIN.left - 6}
                    y={MARGIN.top + at(k) + (1 - tick.share) * side + 4}
                    textAnchor="end"
                  >
                    {tick.label}
                  </SvgText>
                ))}
              </>
            )}
          </G>
        ))}
      </Svg>
    </View>
  );
}

const axisTitle = (name: string): string => {
  const unit = unitOf(name);
  return unit ? `${writtenName(name)}, ${unit}` : writtenName(name);
};

const finite = (values: readonly (number | null)[]): number[] => values.filter((v) => v !== null);

/** An axis holds 99 % of the bounded draws with some room, and the fitted value. */
function axisOf(column: DrawColumn): Axis {
  const values = finite(column.values);
  const low = Math.min(percentile(values, 0.005) ?? column.fitted, column.fitted);
  const high = Math.max(percentile(values, 0.995) ?? column.fitted, column.fitted);
  const room = (high - low) * 0.08 || Math.abs(column.fitted) * 1e-3 || 1e-3;
  return { column, low: low - room, high: high + room };
}

const shareOf = (axis: Axis, value: number) => (value - axis.low) / (axis.high - axis.low);

function ticksOf(axis: Axis, side: number): { label: string; share: number }[] {
  const { values, decimals } = niceTicks(axis.low, axis.high, Math.max(side / 48, 1.6));
  const all = values.map((v) => ({ label: labelOf(v, decimals), share: shareOf(axis, v) }));
  // at an edge the label would run into that of the next panel
  const inside = all.filter((tick) => tick.share > 0.14 && tick.share < 0.86);
  return inside.length > 0 ? inside : all.slice(0, 1);
}

function Marginal({ axis, side }: { axis: Axis; side: number }) {
  const { color } = useTheme();
  const { column } = axis;
  const counts = useMemo(
    () => histogram(finite(column.values), [axis.low, axis.high], BINS),
    [column, axis.low, axis.high],
  );
  const most = Math.max(...counts, 1);
  const bin = side / BINS;
  const outline = counts.map((c, k) => `L${(k * bin).toFixed(1)} ${height(c)}h${bin.toFixed(2)}`).join('');
  function height(c: number) {
    return (side - (c / most) * side * 0.9).toFixed(1);
  }
  const line = (value: number | null, dash?: string) =>
    value !== null && (
      <Line
        x1={shareOf(axis, value) * side}
        x2={shareOf(axis, value) * side}
        y1={0}
        y2={side}
        stroke={color.model}
        strokeWidth={1.5}
        strokeDasharray={dash}
      />
    );
  return (
    <>
      <Path
        d={`M0 ${side}${outline}L${side} ${side}z`}
        fill={color.modelWash}
        stroke={color.quiet}
        strokeWidth={1}
      />
      {line(percentile(column.values, 0.1587), '3 3')}
      {line(column.fitted)}
      {line(percentile(column.values, 0.8413), '3 3')}
    </>
  );
}

function Pair({ across, up, side }: { across: Axis; up: Axis; side: number }) {
  const { color } = useTheme();
  const { dots, inner, outer } = useMemo(() => {
    const points = across.column.values.flatMap((a, k) => {
      const b = up.column.values[k] ?? null;
      return a === null || b === null ? [] : [{ x: shareOf(across, a), y: shareOf(up, b) }];
    });
    const inside = points.filter((p) => p.x >= 0 && p.x <= 1 && p.y >= 0 && p.y <= 1);
    const place = (p: { x: number; y: number }) =>
      `${(p.x * side).toFixed(1)} ${((1 - p.y) * side).toFixed(1)}`;
    const dotsPath = inside.map((p) => `M${place(p)}h0`).join('');
    if (points.length < 20) return { dots: dotsPath, inner: '', outer: '' };
    const density = densityOf(points);
    const path = (share: number) =>
      contour(density, levelHolding(density, points, share))
        .map(([a, b]) => `M${place(a)}L${place(b)}`)
        .join('');
    return { dots: dotsPath, inner: path(0.68), outer: path(0.95) };
  }, [across, up, side]);
  const [fx, fy] = [shareOf(across, across.column.fitted) * side, (1 - shareOf(up, up.column.fitted)) * side];
  return (
    <>
      <Path d={dots} stroke={color.quiet} strokeWidth={2} strokeLinecap="round" strokeOpacity={0.45} />
      <Path d={outer} fill="none" stroke={color.model} strokeWidth={1} />
      <Path d={inner} fill="none" stroke={color.model} strokeWidth={2} />
      <Path d={`M${fx - 4} ${fy}h8M${fx} ${fy - 4}v8`} stroke={color.text} strokeWidth={1.5} />
    </>
  );
}

function describe(columns: readonly DrawColumn[], name: string): string {
  const names = columns.map((c) => writtenName(c.name)).join(', ');
  const open = columns.find((c) => c.unbounded > 0);
  const unbounded = open
    ? ` ${open.unbounded} draws leave ${writtenName(open.name)} without a bound and are not drawn.`
    : '';
  return `Draws of ${name}, each of ${names} against each: ${columns[0]?.values.length ?? 0} draws.${unbounded}`;
}
