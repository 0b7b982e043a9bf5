import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { startWords } from '@/components/fit/parameterWords';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** Setting a model by hand, and the way back to what the marks say. */
export function TrialPanel() {
  const { trial, beginTrial, endTrial, fitStart, model, live, axes } = useSession();
  const shown = (velocity: number) => velocityLabel(velocity, axes.spectral.channelWidth);
  const row = { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space(2) } as const;
  if (trial)
    return (
      <View role="group" aria-label="Trial model" style={{ gap: space(1) }}>
        <Text mono size="small" tone="model">
          {`Θ ${trial.theta.toPrecision(3)}° · v_sys ${shown(trial.vSys)} · v_exp ${shown(trial.vExp)} km/s`}
        </Text>
        <View style={row}>
          {live.fit && <Button label="Fit from here" onPress={() => endTrial(true)} />}
          <Button
            label={live.fit ? 'Back to the fit' : 'Put the trial away'}
            onPress={() => endTrial(false)}
          />
        </View>
      </View>
    );
  if (fitStart && live.fit)
    return (
      <View style={row}>
        <Text size="small" tone="quiet">
          {`Started from ${startWords(fitStart)}; a fit of record will too.`}
        </Text>
        <Button kind="quiet" label="Usual start" onPress={() => endTrial(false)} />
      </View>
    );
  return model ? (
    <Text size="small" tone="quiet">
      Drag the crown or the feet of the curve to try another model.
    </Text>
  ) : (
    <View style={row}>
      <Button kind="quiet" label="Try a model by hand" onPress={beginTrial} />
    </View>
  );
}
