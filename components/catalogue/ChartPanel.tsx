import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { AGE_FACTOR } from '@/shared/physics/age';
import { EmptyState } from '../ui/EmptyState';
import { count } from '../ui/format';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { pointsOf } from './chartScale';
import { Glyph } from './glyphs';

// the charting library is as large as half the rest: it comes when a chart is shown
const ShellChart = lazy(() => import('./ShellChart'));

/** The chart of the listed shells, with the regions' signs. */
export function ChartPanel({
  shells,
  regionIndex,
  picked,
  height = space(112),
}: {
  shells: readonly Shell[];
  regionIndex: (regionId: string) => number;
  picked: readonly string[];
  height?: number;
}) {
  const points = pointsOf(shells);
  const missing = shells.length - points.length;
  const regions = [...new Map(points.map((p) => [p.shell.regionId, p.shell.regionName]))];
  return (
    <Panel title="Expansion velocity and radius">
      {points.length === 0 ? (
        <EmptyState icon="chart" title="Nothing to draw yet">
          A point needs an adopted fit and a distance. Give the shell or its region a distance.
        </EmptyState>
      ) : (
        <Measured height={height}>
          {(width) => (
            <Suspense fallback={<Skeleton height={height} />}>
              <ShellChart
                points={points}
                regionIndex={regionIndex}
                picked={picked}
                ageFactor={points[0]?.shell.adopted?.ageFactor ?? AGE_FACTOR}
                width={width}
                height={height}
              />
            </Suspense>
          )}
        </Measured>
      )}
      {points.length > 0 && (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(4), rowGap: space(1) }}>
          {regions.map(([id, name]) => (
            <View key={id} style={{ flexDirection: 'row', alignItems: 'center', gap: space(1.5) }}>
              <Glyph index={regionIndex(id)} />
              <Text size="small">{name}</Text>
            </View>
          ))}
        </View>
      )}
      {points.length > 0 && missing > 0 && (
        <Text size="small" tone="quiet">
          {`${count(missing, 'shell')} without a distance ${missing === 1 ? 'is' : 'are'} not drawn.`}
        </Text>
      )}
    </Panel>
  );
}
