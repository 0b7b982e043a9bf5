import { useRouter } from 'expo-router';
import {
  VictoryAxis,
  VictoryChart,
  VictoryContainer,
  VictoryErrorBar,
  VictoryLabel,
  VictoryLine,
  VictoryScatter,
} from 'victory';
import { formatQuantity, plainNumber } from '@/shared/physics/quantity';
import { useTheme } from '../ui/theme';
import { fonts, typeScale, type Colors } from '../ui/tokens';
import { ageLines, chartDomain, logTicks, type ChartDomain, type ChartPoint } from './chartScale';
import { glyphOf, glyphPath } from './glyphs';

export interface ShellChartProps {
  points: readonly ChartPoint[];
  /** Which sign each region has. */
  regionIndex: (regionId: string) => number;
  picked: readonly string[];
  ageFactor: number;
  width: number;
  height: number;
}

/** v_exp against R with errors and lines of constant age; every point is a link to its shell. */
export default function ShellChart({
  points,
  regionIndex,
  picked,
  ageFactor,
  width,
  height,
}: ShellChartProps) {
  const { color } = useTheme();
  const router = useRouter();
  const domain = chartDomain(points);
  const [fontSize] = typeScale.small;
  const tick = { fontFamily: fonts.mono, fontSize, fill: color.quiet };
  const axis = {
    axis: { stroke: 'transparent' },
    grid: { stroke: color.line, strokeWidth: 1 },
    tickLabels: { ...tick, padding: 6 },
  };
  const name = { fontFamily: fonts.regular, fontSize, fill: color.quiet };
  const data = points.map((p) => ({
    x: p.radius,
    y: p.vExp,
    errorX: p.radiusError < p.radius ? p.radiusError : [p.radiusError, p.radius * 0.5],
    errorY: [p.vExpError[1], Math.min(p.vExpError[0], p.vExp * 0.9)],
    point: p,
  }));
  return (
    <VictoryChart
      width={width}
      height={height}
      scale={{ x: 'log', y: 'log' }}
      domain={domain}
      padding={{ left: 48, right: 16, top: 28, bottom: 44 }}
      containerComponent={
        <VictoryContainer
          responsive={false}
          role="group"
          aria-label="Expansion velocity against radius, a link for each shell"
        />
      }
    >
      <VictoryAxis tickValues={logTicks(domain.x)} tickFormat={(t: number) => plainNumber(t)} style={axis} />
      <VictoryAxis
        dependentAxis
        tickValues={logTicks(domain.y)}
        tickFormat={(t: number) => plainNumber(t)}
        style={axis}
      />
      <VictoryLabel text="expansion velocity, km/s" x={8} y={14} style={name} />
      <VictoryLabel text="radius, pc" x={48} y={height - 8} style={name} />
      <VictoryLabel
        text={`lines: age ${ageFactor} R / v, Myr`}
        x={width - 16}
        y={height - 8}
        textAnchor="end"
        style={name}
      />
      {ageLines(domain, ageFactor).map(({ age, points: ends }) => (
        <VictoryLine
          key={age}
          data={ends}
          style={{ data: { stroke: color.model, strokeWidth: 1.25 } }}
          labels={({ index }: { index?: number | string }) => (Number(index) === 1 ? plainNumber(age) : '')}
          labelComponent={
            <VictoryLabel
              dy={2}
              {...(nearLeft(ends[1]!.x, domain)
                ? { dx: 8, textAnchor: 'start' }
                : { dx: -8, textAnchor: 'end' })}
              style={{ fontFamily: fonts.mono, fontSize, fill: color.model }}
            />
          }
        />
      ))}
      <VictoryErrorBar
        data={data}
        errorX={(d: (typeof data)[number]) => d.errorX as number}
        errorY={(d: (typeof data)[number]) => d.errorY as unknown as number}
        borderWidth={0}
        style={{ data: { stroke: color.text, strokeWidth: 1.25 } }}
      />
      <VictoryScatter
        data={data}
        dataComponent={
          <PointLink
            color={color}
            regionIndex={regionIndex}
            picked={picked}
            right={width}
            open={(id) => router.push(`/shells/${id}`)}
          />
        }
      />
    </VictoryChart>
  );
}

/** A label to the left of such a place would be cut off. */
const nearLeft = (x: number, { x: [low, high] }: ChartDomain): boolean =>
  Math.log(x / low) < 0.12 * Math.log(high / low);

interface PointLinkProps {
  color: Colors;
  regionIndex: (regionId: string) => number;
  picked: readonly string[];
  right: number;
  open: (shellId: string) => void;
  /** Given by the chart. */
  x?: number;
  y?: number;
  datum?: { point: ChartPoint };
}

function PointLink({ color, regionIndex, picked, right, open, x = 0, y = 0, datum }: PointLinkProps) {
  if (!datum) return null;
  const { shell, radius, vExp } = datum.point;
  const { shape, filled } = glyphOf(regionIndex(shell.regionId));
  const isPicked = picked.includes(shell.id);
  const m = shell.adopted!;
  const label = `${shell.name}, ${shell.regionName}: radius ${formatQuantity(m.radius ?? { value: radius, se: null, unit: 'pc' }).spoken}, expansion velocity ${formatQuantity({ ...m.vExp, value: vExp }).spoken}`;
  const flip = x > right - 110;
  return (
    <a
      href={`/shells/${shell.id}`}
      aria-label={label}
      onClick={(e) => {
        if (e.metaKey || e.ctrlKey || e.shiftKey) return;
        e.preventDefault();
        open(shell.id);
      }}
    >
      <title>{shell.name}</title>
      <circle cx={x} cy={y} r={16} fill="transparent" />
      {isPicked && <circle cx={x} cy={y} r={10} fill="none" stroke={color.person} strokeWidth={2.25} />}
      <path
        d={glyphPath(shape, 5)}
        transform={`translate(${x} ${y})`}
        fill={filled ? color.text : color.panel}
        stroke={color.text}
        strokeWidth={1.75}
      />
      {isPicked && (
        <text
          x={flip ? x - 14 : x + 14}
          y={y - 8}
          textAnchor={flip ? 'end' : 'start'}
          fontFamily={fonts.regular}
          fontSize={typeScale.small[0]}
          fill={color.text}
        >
          {shell.name}
        </text>
      )}
    </a>
  );
}
