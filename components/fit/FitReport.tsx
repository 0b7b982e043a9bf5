import { View } from 'react-native';
import { RadiusVelocity } from '../diagram/RadiusVelocity';
import { DefinitionRows } from '../ui/DefinitionRows';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Notice } from '../ui/ProblemNotice';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { CorrelationTable } from './CorrelationTable';
import { chi2PerDof, modelNames, modelOf, ringsOf, type DoneFit } from './fitFacts';
import { Provenance } from './Provenance';
import { ResidualTable } from './ResidualTable';
import { RingTable } from './RingTable';

/** The numbers with their errors and limits, and the curve they draw. */
export function FitSummary({
  fit,
  name,
  channelWidth,
}: {
  fit: DoneFit;
  name: string;
  channelWidth: number;
}) {
  const { wide } = useWide();
  return (
    <View style={{ gap: space(4) }}>
      <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4), alignItems: 'stretch' }}>
        <Panel
          title="Parameters"
          aside={
            <Text tone="quiet" size="small">
              {modelNames[fit.model]}
            </Text>
          }
          style={wide ? { flex: 1 } : undefined}
        >
          <ParameterRows fit={fit} />
        </Panel>
        <Panel title="Radius–velocity" style={wide ? { flex: 1, minWidth: 0 } : undefined}>
          <Measured height={space(72)}>
            {(width) => (
              <RadiusVelocity
                width={width}
                height={space(72)}
                rings={ringsOf(fit)}
                model={modelOf(fit)}
                channelWidth={channelWidth}
                name={name}
              />
            )}
          </Measured>
        </Panel>
      </View>
      {fit.warnings.map((w) => (
        <Notice key={w.code} kind="person">
          {w.message}
        </Notice>
      ))}
    </View>
  );
}

/** What the numbers rest on: residuals by mark, rings by channel, correlation, provenance. */
export function FitDetails({ fit, channelWidth }: { fit: DoneFit; channelWidth: number }) {
  const { wide } = useWide();
  return (
    <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4), alignItems: 'flex-start' }}>
      <View style={[{ gap: space(4), alignSelf: 'stretch' }, wide && { flex: 1, minWidth: 0 }]}>
        <ResidualTable fit={fit} />
      </View>
      <View style={[{ gap: space(4), alignSelf: 'stretch' }, wide && { flex: 1, minWidth: 0 }]}>
        <RingTable fit={fit} channelWidth={channelWidth} />
        <CorrelationTable correlation={fit.correlation} />
        <Provenance fit={fit} />
      </View>
    </View>
  );
}

const order = ['l', 'b', 'theta', 'vSys', 'vExp'];

export function ParameterRows({ fit }: { fit: DoneFit }) {
  const names = Object.keys(fit.parameters).sort((a, b) => rank(a) - rank(b));
  const quality = chi2PerDof(fit);
  return (
    <View style={{ gap: space(2) }}>
      <DefinitionRows
        rows={[
          ...names.map((n) => ({
            key: n,
            name: <ParameterName name={n} long />,
            value: <Quantity quantity={fit.parameters[n]} align="right" />,
          })),
          {
            key: 'chi2',
            name: 'χ² / degrees of freedom',
            value: `${fit.chi2.toFixed(1)} / ${fit.dof}${quality === null ? '' : ` = ${quality.toFixed(2)}`}`,
          },
        ]}
      />
      <Text size="small" tone="quiet">
        {fit.errorBars === 'bootstrap'
          ? 'Errors from the bootstrap: +a −b bound the central 68 %.'
          : 'Errors: one standard error from the four-source covariance; +a −b where the central 68 % is lopsided.'}
      </Text>
    </View>
  );
}

const rank = (name: string): number => (order.includes(name) ? order.indexOf(name) : order.length);
