import { View } from 'react-native';
import { useFitMarks } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { plainNumber } from '@/shared/physics/quantity';
import { Button } from '../ui/Button';
import { count } from '../ui/format';
import { Panel } from '../ui/Panel';
import { Press, type PressState } from '../ui/Press';
import { ProblemNotice } from '../ui/ProblemNotice';
import { Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { useStartFit } from './useStartFit';

/** Every mark that took no part, each a way to its place, and one press to fit again with all of them. */
export function OutlierPanel({ fit }: { fit: DoneFit }) {
  const marks = useFitMarks(fit.id).data;
  const may = useMay();
  const { start, busy, problem } = useStartFit(fit.shellId);
  const aside = fit.extra.setAside;
  if (aside.length === 0) return null;
  const off = new Map(fit.residuals.map((r) => [r.mark, r.degrees]));
  return (
    <Panel title={`${count(aside.length, 'mark')} set aside`}>
      <Text>
        {aside.length === 1 ? 'It lies' : 'Each lies'} more than 4.5 robust deviations off the ring of its own
        channel, and took no part in the fit.
      </Text>
      <View role="list" aria-label="Marks set aside">
        {aside.map((index) => {
          const mark = marks?.marks[index];
          const degrees = off.get(index) ?? 0;
          const words = `No. ${index + 1}${
            mark ? ` at ${velocityLabel(mark.velocity, marks.channelWidth)} km/s` : ''
          }, ${plainNumber(Math.abs(degrees), 2)}° ${degrees > 0 ? 'outside' : 'inside'} the model`;
          return (
            <View key={index} role="listitem">
              {mark ? (
                <Press
                  href={`/cubes/${fit.cubeId}?shell=${fit.shellId}&ch=${mark.channel}&mark=${index}`}
                  style={({ hovered }: PressState) => ({
                    minHeight: touch,
                    justifyContent: 'center',
                    opacity: hovered ? 0.75 : 1,
                  })}
                >
                  <Text tone="person" style={{ textDecorationLine: 'underline' }}>
                    {words}
                  </Text>
                </Press>
              ) : (
                <Text>{words}</Text>
              )}
            </View>
          );
        })}
      </View>
      {problem && <ProblemNotice problem={problem} />}
      {may('fit.run') && (
        <View style={{ gap: space(1), alignItems: 'flex-start' }}>
          <Button
            label="Put them back: fit again with every mark"
            icon="undo"
            busy={busy}
            onPress={() =>
              void start({
                readingId: fit.readingId,
                model: fit.model,
                options: { ...fit.options, setAside: false },
              })
            }
          />
          <Text size="small" tone="quiet">
            A new fit; this one stays. It takes the marks as they are now.
          </Text>
        </View>
      )}
    </Panel>
  );
}
