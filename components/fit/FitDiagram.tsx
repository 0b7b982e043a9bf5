import { useMemo } from 'react';
import { useFitMarks } from '@/hooks/useFits';
import type { FitDraws } from '@/shared/contract/fits';
import { RadiusVelocity } from '../diagram/RadiusVelocity';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { radiusBand } from './drawColumns';
import { markPoints, modelOf, ringsOf, type DoneFit } from './fitFacts';

/** Rings, single marks, the model with its 68 % band, residuals under it. */
export function FitDiagram({
  fit,
  name,
  draws,
  height = space(72),
  fill,
}: {
  fit: DoneFit;
  name: string;
  /** Give the band its true, lopsided ends. */
  draws?: FitDraws | undefined;
  height?: number;
  /** Take a share of a row. */
  fill?: boolean;
}) {
  const frozen = useFitMarks(fit.id).data;
  const points = useMemo(() => (frozen ? markPoints(fit, frozen) : []), [fit, frozen]);
  const rings = useMemo(() => ringsOf(fit), [fit]);
  const model = useMemo(() => {
    const plain = modelOf(fit);
    const bandAt = draws && radiusBand(draws);
    return plain && bandAt ? { ...plain, bandAt } : plain;
  }, [fit, draws]);
  return (
    <Panel title="Radius–velocity" style={fill ? { flex: 1, minWidth: 0 } : undefined}>
      <Measured height={height}>
        {(width) => (
          <RadiusVelocity
            width={width}
            height={height}
            rings={rings}
            points={points}
            model={model}
            channelWidth={frozen?.channelWidth ?? 0}
            name={name}
          />
        )}
      </Measured>
      <Text size="small" tone="quiet">
        {`Dots with bars: rings. Small dots: single marks. Line: the model, shaded where ${
          model?.bandAt
            ? '68 % of the draws run'
            : model?.errorAt
              ? 'one standard error reaches'
              : 'its error is known'
        }.`}
      </Text>
    </Panel>
  );
}
