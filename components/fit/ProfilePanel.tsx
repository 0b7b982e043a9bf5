import { View } from 'react-native';
import Svg, { Line, Path, Text as SvgText } from 'react-native-svg';
import type { Profile } from '@/shared/contract/fits';
import { labelOf, niceTicks } from '@/shared/image/ticks';
import { plainNumber } from '@/shared/physics/quantity';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { fonts, space, typeScale } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { unitOf, writtenName, writtenValue } from './parameterWords';
import { below } from './profileWords';

const HEIGHT = space(44);
const MARGIN = { left: 28, right: 40, top: 10, bottom: 34 };
/** Rises of χ² that bound 68 and 95 % of a normal error. */
const LEVELS = [
  [1, '68 %'],
  [3.84, '95 %'],
] as const;
const TOP = 6;

/** How χ² rises along Θ and v_exp with the others refitted: a look at the shape, not the error bar. */
export function ProfilePanel({ fit }: { fit: DoneFit }) {
  const profiles = fit.extra.profiles ?? [];
  if (profiles.length === 0) return null;
  return (
    <Panel title="Profile likelihood">
      {profiles.map((profile) => (
        <View key={profile.parameter} style={{ gap: space(1) }}>
          <Measured height={HEIGHT}>
            {(width) => (
              <Curve profile={profile} width={width} fitted={fit.parameters[profile.parameter]?.value} />
            )}
          </Measured>
          <Text size="small" tone="quiet">
            {`${writtenName(profile.parameter)}: ${below(profile, 1)}.`}
          </Text>
        </View>
      ))}
      <Text size="small" tone="quiet">
        Drawn to see the shape: it takes marks as independent, so the error bars above are the ones to quote.
      </Text>
    </Panel>
  );
}

function Curve({ profile, width, fitted }: { profile: Profile; width: number; fitted: number | undefined }) {
  const { color } = useTheme();
  const { parameter, values, deltaChi2 } = profile;
  // a steep curve fills the frame too: only what lies below the top is framed
  const framed = values.filter((_, i) => deltaChi2[i]! <= TOP);
  const [low, high] = [Math.min(...framed), Math.max(...framed)];
  const right = width - MARGIN.right;
  const floor = HEIGHT - MARGIN.bottom;
  const x = (v: number) => MARGIN.left + ((v - low) / (high - low || 1)) * (right - MARGIN.left);
  const y = (d: number) => floor - (d / TOP) * (floor - MARGIN.top);
  const ticks = niceTicks(low, high, (right - MARGIN.left) / 80);
  const font = { fontFamily: fonts.mono, fontSize: typeScale.small[0], fill: color.quiet };
  const names = { ...font, fontFamily: fonts.regular };
  // what rises out of the frame is left out, not drawn along its edge
  const path = values
    .flatMap((v, i) => (deltaChi2[i]! <= TOP ? [`${x(v).toFixed(1)} ${y(deltaChi2[i]!).toFixed(1)}`] : []))
    .map((place, i) => `${i === 0 ? 'M' : 'L'}${place}`)
    .join('');
  const label =
    `Profile of χ² along ${writtenName(parameter)}: ${below(profile, 1)}` +
    (fitted === undefined
      ? ''
      : `, least at ${writtenValue(parameter, Number(plainNumber(fitted).replace('−', '-')))}`);
  return (
    <View role="img" aria-label={label} style={{ width, height: HEIGHT }}>
      <Svg width={width} height={HEIGHT} aria-hidden>
        {LEVELS.map(([level, name]) => (
          <Line
            key={name}
            x1={MARGIN.left}
            x2={right}
            y1={y(level)}
            y2={y(level)}
            stroke={color.line}
            strokeDasharray="4 4"
          />
        ))}
        {LEVELS.map(([level, name]) => (
          <SvgText key={name} {...font} x={right + 6} y={y(level) + 4}>
            {name}
          </SvgText>
        ))}
        <Line x1={MARGIN.left} x2={right} y1={floor} y2={floor} stroke={color.line} />
        {ticks.values.map((v) => (
          <SvgText key={v} {...font} x={x(v)} y={floor + 16} textAnchor="middle">
            {labelOf(v, ticks.decimals)}
          </SvgText>
        ))}
        <SvgText {...names} x={right} y={floor + 30} textAnchor="end">
          {`${writtenName(parameter)}, ${unitOf(parameter)}`}
        </SvgText>
        <SvgText {...names} x={0} y={MARGIN.top + 8}>
          Δχ²
        </SvgText>
        {fitted !== undefined && (
          <Line
            x1={x(fitted)}
            x2={x(fitted)}
            y1={MARGIN.top}
            y2={floor}
            stroke={color.text}
            strokeDasharray="2 4"
          />
        )}
        <Path d={path} fill="none" stroke={color.model} strokeWidth={2} />
      </Svg>
    </View>
  );
}
