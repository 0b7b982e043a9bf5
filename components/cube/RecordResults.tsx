import { useState } from 'react';
import { View } from 'react-native';
import { byLargest, type DoneFit } from '@/components/fit/fitFacts';
import { ParameterRows } from '@/components/fit/ParameterRows';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { Press, type PressState } from '@/components/ui/Press';
import { Notice } from '@/components/ui/ProblemNotice';
import { SectionTitle } from '@/components/ui/Panel';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space, touch } from '@/components/ui/tokens';
import { useFitMarks } from '@/hooks/useFits';
import { labelOf } from '@/shared/image/ticks';
import { velocityLabel } from '@/shared/image/velocityDigits';

const FIRST = 6;

/** A fit of record beside the map: numbers, warnings, and the marks it fits worst, each a way to its place. */
export function RecordResults({ fit }: { fit: DoneFit }) {
  return (
    <View style={{ gap: space(3) }}>
      <ParameterRows fit={fit} />
      {fit.warnings.map((w) => (
        <Notice key={w.code} kind="person">
          <Text size="small">{w.message}</Text>
        </Notice>
      ))}
      <Residuals fit={fit} />
    </View>
  );
}

/** Largest first; a press shows the mark where it lies. */
function Residuals({ fit }: { fit: DoneFit }) {
  const { showPlace } = useSession();
  const { color } = useTheme();
  const { data } = useFitMarks(fit.id);
  const [all, setAll] = useState(false);
  const sorted = byLargest(fit);
  const shown = all ? sorted : sorted.slice(0, FIRST);
  return (
    <View>
      <SectionTitle level={3}>Residuals by mark</SectionTitle>
      <View role="list" aria-label="Residuals by mark, largest first">
        {shown.map((r) => {
          const mark = data?.marks[r.mark];
          const off = `${labelOf(r.degrees, 3)}°`;
          const where = mark
            ? `${velocityLabel(mark.velocity, data!.channelWidth)} km/s`
            : `mark ${r.mark + 1}`;
          return (
            <View key={r.mark} role="listitem">
              <Press
                disabled={!mark}
                onPress={() => mark && showPlace(mark)}
                style={({ hovered }: PressState) => ({
                  flexDirection: 'row',
                  alignItems: 'center',
                  justifyContent: 'space-between',
                  minHeight: touch,
                  gap: space(3),
                  paddingHorizontal: space(2),
                  borderBottomWidth: hairline,
                  borderBottomColor: color.line,
                  backgroundColor: hovered ? color.selected : 'transparent',
                })}
              >
                <Text mono tone="quiet">
                  {where}
                </Text>
                <Text size="small" tone="quiet">
                  {r.weight === 0 ? 'set aside' : ''}
                </Text>
                <Text mono>{off}</Text>
              </Press>
            </View>
          );
        })}
      </View>
      {sorted.length > FIRST && (
        <Button
          kind="quiet"
          label={all ? 'Fewer' : `All ${sorted.length} marks`}
          aria-expanded={all}
          onPress={() => setAll(!all)}
        />
      )}
    </View>
  );
}
