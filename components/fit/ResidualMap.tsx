import { useMemo } from 'react';
import { View } from 'react-native';
import Svg, { Circle, G, Line, Path, Text as SvgText } from 'react-native-svg';
import { useFitMarks } from '@/hooks/useFits';
import { niceTicks } from '@/shared/image/ticks';
import { plainNumber } from '@/shared/physics/quantity';
import { RecordGate } from '../frame/RecordGate';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { fonts, space, typeScale } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { residualPlaces, residualWords, type ResidualPlace } from './residualPlaces';

const HEIGHT = space(84);
/** Half widths of the smallest and the largest sign, px. */
const SIGN = { least: 2, most: 9 };

/** Marks on the sky about the centre: triangles that point out or in, as large as their residual. */
export function ResidualMap({ fit, name }: { fit: DoneFit; name: string }) {
  const frozen = useFitMarks(fit.id);
  return (
    <Panel title="Residuals on the sky">
      <RecordGate read={frozen} what="marks" skeleton={<Skeleton height={HEIGHT} />}>
        {(marks) => <Sky fit={fit} places={residualPlaces(fit, marks)} name={name} />}
      </RecordGate>
    </Panel>
  );
}

function Sky({ fit, places, name }: { fit: DoneFit; places: ResidualPlace[]; name: string }) {
  const live = places.filter((p) => !p.setAside);
  const largest = Math.max(...live.map((p) => Math.abs(p.degrees)), 1e-12);
  const theta = fit.parameters.theta?.value ?? 0;
  const reach = useMemo(
    () => Math.max(theta, ...places.map((p) => Math.max(Math.abs(p.east), Math.abs(p.north)))) * 1.12,
    [theta, places],
  );
  return (
    <>
      <Measured height={HEIGHT}>
        {(width) => (
          <Drawing
            {...{ width, places, largest, theta, reach }}
            label={`Residuals of ${name} on the sky: ${residualWords(places)}`}
          />
        )}
      </Measured>
      <Legend largest={largest} setAside={places.length > live.length} />
    </>
  );
}

function Drawing(props: {
  width: number;
  places: ResidualPlace[];
  largest: number;
  theta: number;
  reach: number;
  label: string;
}) {
  const { width, places, largest, theta, reach, label } = props;
  const { color } = useTheme();
  const scale = Math.min(width, HEIGHT) / 2 / reach;
  const [cx, cy] = [width / 2, HEIGHT / 2];
  const x = (east: number) => cx - east * scale; // longitude grows to the left, as on the sky
  const y = (north: number) => cy - north * scale;
  const step = niceTicks(0, reach, 3).step;
  const font = { fontFamily: fonts.mono, fontSize: typeScale.small[0], fill: color.quiet };
  const signs = (outside: boolean) =>
    places
      .filter((p) => !p.setAside && p.degrees > 0 === outside)
      .map((p) => signPath(x(p.east), y(p.north), sizeOf(p.degrees, largest), outside))
      .join('');
  return (
    <View role="img" aria-label={label} style={{ width, height: HEIGHT }}>
      <Svg width={width} height={HEIGHT} aria-hidden>
        <Circle
          cx={cx}
          cy={cy}
          r={theta * scale}
          fill="none"
          stroke={color.model}
          strokeWidth={1.5}
          strokeDasharray="5 4"
        />
        <Path d={`M${cx - 5} ${cy}h10M${cx} ${cy - 5}v10`} stroke={color.model} strokeWidth={1.5} />
        <G>
          <Path d={signs(false)} fill="none" stroke={color.person} strokeWidth={1.5} />
          <Path d={signs(true)} fill={color.person} />
          <Path
            d={places
              .filter((p) => p.setAside)
              .map((p) => `M${x(p.east) - 4} ${y(p.north) - 4}l8 8m0 -8l-8 8`)
              .join('')}
            stroke={color.quiet}
            strokeWidth={1.5}
          />
        </G>
        <Line
          x1={8}
          x2={8 + step * scale}
          y1={HEIGHT - 8}
          y2={HEIGHT - 8}
          stroke={color.quiet}
          strokeWidth={1.5}
        />
        <SvgText {...font} x={8} y={HEIGHT - 14}>
          {`${plainNumber(step)}°`}
        </SvgText>
        <SvgText {...font} x={cx} y={12} textAnchor="middle">
          b
        </SvgText>
        <SvgText {...font} x={Math.max(cx - HEIGHT / 2, 6)} y={cy + 4}>
          l
        </SvgText>
      </Svg>
    </View>
  );
}

const sizeOf = (degrees: number, largest: number) =>
  SIGN.least + (SIGN.most - SIGN.least) * Math.min(Math.abs(degrees) / largest, 1);

/** A triangle about a point: upwards for a mark outside the model, downwards for one inside. */
function signPath(x: number, y: number, r: number, outside: boolean): string {
  const up = outside ? -1 : 1;
  return `M${x.toFixed(1)} ${(y + up * 1.2 * r).toFixed(1)}l${r} ${(-up * 2 * r).toFixed(1)}h${-2 * r}z`;
}

function Legend({ largest, setAside }: { largest: number; setAside: boolean }) {
  const { color } = useTheme();
  const entry = (d: string, words: string, style: object) => (
    <View key={words} style={{ flexDirection: 'row', alignItems: 'center', gap: space(1.5) }}>
      <Svg width={16} height={16} aria-hidden>
        <Path d={d} {...style} />
      </Svg>
      <Text size="small" tone="quiet">
        {words}
      </Text>
    </View>
  );
  return (
    <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(4), rowGap: space(1) }}>
      {entry(signPath(8, 8, 5, true), 'outside the model', { fill: color.person })}
      {entry(signPath(8, 8, 5, false), 'inside', {
        fill: 'none',
        stroke: color.person,
        strokeWidth: 1.5,
      })}
      {setAside && entry('M4 4l8 8m0 -8l-8 8', 'set aside', { stroke: color.quiet, strokeWidth: 1.5 })}
      <Text size="small" tone="quiet">
        {`largest sign: ${plainNumber(largest, 2)}°`}
      </Text>
    </View>
  );
}
