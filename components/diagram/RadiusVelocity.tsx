import { useMemo, useState } from 'react';
import { View } from 'react-native';
import Svg, { Circle, G, Line, Path, Text as SvgText } from 'react-native-svg';
import { DiagramHandles } from '@/components/diagram/DiagramHandles';
import {
  curveVelocities,
  diagramLayout,
  domainOf,
  type DiagramDomain,
  type DiagramLayout,
  type DiagramModel,
  type DiagramRing,
} from '@/components/diagram/diagramScale';
import { useTheme } from '@/components/ui/theme';
import { fonts, typeScale } from '@/components/ui/tokens';
import { labelOf } from '@/shared/image/ticks';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { modelRadius, type RingParameters } from '@/shared/shell/channelCurve';
import { ringRadius } from '@/shared/shell/ring';

export interface RadiusVelocityProps {
  width: number;
  height: number;
  rings: readonly DiagramRing[];
  model: DiagramModel | null;
  /** Full width of a channel, km/s: residuals compare with the model averaged over it. */
  channelWidth: number;
  /** Single marks, drawn small: angle from the model's centre, degrees. */
  points?: readonly { velocity: number; radius: number }[];
  /** The velocity shown on the map. */
  current?: number | null;
  /** Give several diagrams one domain to compare them. */
  domain?: DiagramDomain;
  residuals?: boolean;
  /** What the diagram is about: the shell's name. */
  name: string;
  onPick?: (ring: DiagramRing) => void;
  /** Where the model may be set by hand: its crown and its feet can be taken hold of. */
  onModel?: (by: Partial<RingParameters>) => void;
}

/** Data minus model in degrees; null beyond the model's caps. */
export function ringResidual(ring: DiagramRing, model: DiagramModel, channelWidth: number): number | null {
  const expected = modelRadius(ring.velocity, channelWidth, model);
  return expected === null ? null : ring.theta - expected;
}

/** Ring angular radius against velocity: data in the person's colour, model in the model's, residuals below. */
export function RadiusVelocity(props: RadiusVelocityProps) {
  const {
    width,
    height,
    rings,
    model,
    channelWidth,
    points = [],
    current,
    residuals = true,
    name,
    onPick,
    onModel,
  } = props;
  const { color } = useTheme();
  const own = useMemo(
    () => domainOf([{ rings, model }], (r, m) => ringResidual(r, m, channelWidth)),
    [rings, model, channelWidth],
  );
  // Axes that moved under the hand would take the model from it: they wait until it lets go.
  const [held, setHeld] = useState<DiagramDomain | null>(null);
  const domain = held ?? props.domain ?? own;
  const showResiduals = residuals && model !== null;
  const l = useMemo(
    () => diagramLayout(domain, width, height, showResiduals),
    [domain, width, height, showResiduals],
  );
  const curve = useMemo(() => (model ? curvePaths(model, l) : null), [model, l]);
  const font = { fontFamily: fonts.mono, fontSize: typeScale.small[0], fill: color.quiet };
  const names = { fontFamily: fonts.regular, fontSize: typeScale.small[0], fill: color.quiet };
  const inside = (v: number) => v >= domain.velocity[0] && v <= domain.velocity[1];

  return (
    <View style={{ width, height }}>
      <View role="img" aria-label={describe(name, rings, model, channelWidth)} style={{ width, height }}>
        <Svg width={width} height={height} aria-hidden>
          {l.radiusTicks.values.map((r) => (
            <G key={r}>
              <Line x1={l.left} x2={l.right} y1={l.y(r)} y2={l.y(r)} stroke={color.line} strokeWidth={1} />
              <SvgText {...font} x={l.left - 8} y={l.y(r) + 4} textAnchor="end">
                {labelOf(r, l.radiusTicks.decimals)}
              </SvgText>
            </G>
          ))}
          {l.velocityTicks.values.map((v) => (
            <SvgText key={v} {...font} x={l.x(v)} y={l.residualFloor + 16} textAnchor="middle">
              {labelOf(v, l.velocityTicks.decimals)}
            </SvgText>
          ))}
          <SvgText {...names} x={l.left - 36} y={12}>
            ring radius, °
          </SvgText>
          <SvgText {...names} x={l.right} y={l.residualFloor + 30} textAnchor="end">
            velocity, km/s
          </SvgText>
          {curve?.band && <Path d={curve.band} fill={color.model} fillOpacity={0.2} />}
          {current != null && inside(current) && (
            <Line
              x1={l.x(current)}
              x2={l.x(current)}
              y1={l.top - 6}
              y2={l.residualFloor}
              stroke={color.text}
              strokeWidth={1.5}
              strokeDasharray="2 4"
            />
          )}
          {points.map((p, i) => (
            <Circle
              key={i}
              cx={l.x(p.velocity)}
              cy={l.y(p.radius)}
              r={1.5}
              fill={color.quiet}
              fillOpacity={0.8}
            />
          ))}
          {curve && <Path d={curve.line} fill="none" stroke={color.model} strokeWidth={2} />}
          {rings.map((ring) => (
            <Datum key={ring.velocity} ring={ring} x={l.x(ring.velocity)} y={l.y} onPick={onPick} />
          ))}
          {showResiduals && (
            <>
              <Line
                x1={l.left}
                x2={l.right}
                y1={l.yResidual(0)}
                y2={l.yResidual(0)}
                stroke={color.line}
                strokeWidth={1}
              />
              <SvgText {...font} x={l.left - 8} y={l.yResidual(0) + 4} textAnchor="end">
                0
              </SvgText>
              <SvgText {...names} x={l.left - 36} y={l.residualTop + 2}>
                data − model, °
              </SvgText>
              {rings.map((ring) => {
                const residual = ringResidual(ring, model, channelWidth);
                return residual === null ? null : (
                  <Datum
                    key={ring.velocity}
                    ring={{ ...ring, theta: residual }}
                    x={l.x(ring.velocity)}
                    y={l.yResidual}
                    small
                  />
                );
              })}
            </>
          )}
        </Svg>
      </View>
      {onModel && model && (
        <DiagramHandles
          layout={l}
          domain={domain}
          model={model}
          channelWidth={channelWidth}
          onModel={onModel}
          onHold={(holding) => setHeld(holding ? domain : null)}
        />
      )}
    </View>
  );
}

function Datum(props: {
  ring: DiagramRing;
  x: number;
  y: (value: number) => number;
  small?: boolean;
  onPick?: (ring: DiagramRing) => void;
}) {
  const { ring, x, y, small, onPick } = props;
  const { color } = useTheme();
  return (
    <G onPress={onPick ? () => onPick(ring) : undefined}>
      {ring.se !== null && (
        <Line
          x1={x}
          x2={x}
          y1={y(ring.theta - ring.se)}
          y2={y(ring.theta + ring.se)}
          stroke={color.person}
          strokeWidth={1.5}
        />
      )}
      {onPick && <Circle cx={x} cy={y(ring.theta)} r={16} fill="transparent" />}
      <Circle cx={x} cy={y(ring.theta)} r={small ? 3 : 4.5} fill={color.person} />
    </G>
  );
}

function curvePaths(model: DiagramModel, l: DiagramLayout): { line: string; band: string | null } {
  const velocities = curveVelocities(model).filter((v) => l.x(v) >= l.left && l.x(v) <= l.right);
  const radii = velocities.map((v) => ringRadius(v, model) ?? 0);
  const at = (v: number, r: number) => `${l.x(v).toFixed(1)} ${l.y(Math.max(r, 0)).toFixed(1)}`;
  const line = velocities.map((v, i) => `${i === 0 ? 'M' : 'L'}${at(v, radii[i]!)}`).join('');
  const { errorAt, bandAt } = model;
  if (!(errorAt || bandAt) || velocities.length === 0) return { line, band: null };
  const ends = velocities.map((v, i) => bandAt?.(v) ?? [radii[i]! - errorAt!(v), radii[i]! + errorAt!(v)]);
  const upper = velocities.map((v, i) => at(v, ends[i]![1]));
  const lower = velocities.map((v, i) => at(v, ends[i]![0])).reverse();
  return { line, band: `M${[...upper, ...lower].join('L')}Z` };
}

function describe(
  name: string,
  rings: readonly DiagramRing[],
  model: DiagramModel | null,
  channelWidth: number,
): string {
  const shown = (v: number) => velocityLabel(v, channelWidth);
  const found =
    rings.length === 0
      ? 'no rings yet'
      : `${rings.length} rings from ${shown(Math.min(...rings.map((r) => r.velocity)))} to ` +
        `${shown(Math.max(...rings.map((r) => r.velocity)))} km/s`;
  const fitted = model
    ? `; the model is widest with ${model.theta.toPrecision(3)} degrees at ${shown(model.vSys)} km/s and closes ` +
      `${model.vExp.toPrecision(3)} km/s to either side`
    : '';
  return `Radius–velocity diagram of ${name}: ${found}${fitted}.`;
}
