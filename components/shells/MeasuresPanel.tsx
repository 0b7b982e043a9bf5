import type { Shell } from '@/shared/contract/shells';
import { DefinitionRows } from '../ui/DefinitionRows';
import { Panel } from '../ui/Panel';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';

/** What follows from the adopted fit and the distance; the age with the factor it rests on. */
export function MeasuresPanel({ shell }: { shell: Shell }) {
  const m = shell.adopted;
  if (!m) return null;
  return (
    <Panel
      title="Adopted numbers"
      aside={
        <Text mono size="small" tone="model">
          {shell.designation}
        </Text>
      }
    >
      <DefinitionRows
        rows={[
          {
            key: 'l',
            name: <ParameterName name="l" long />,
            value: <Quantity quantity={m.l} align="right" />,
          },
          {
            key: 'b',
            name: <ParameterName name="b" long />,
            value: <Quantity quantity={m.b} align="right" />,
          },
          {
            key: 'theta',
            name: <ParameterName name="theta" long />,
            value: <Quantity quantity={m.theta} align="right" />,
          },
          {
            key: 'vSys',
            name: <ParameterName name="vSys" />,
            value: <Quantity quantity={m.vSys} align="right" />,
          },
          {
            key: 'vExp',
            name: <ParameterName name="vExp" />,
            value: <Quantity quantity={m.vExp} align="right" />,
          },
          {
            key: 'radius',
            name: <ParameterName name="radius" long />,
            value: <Quantity quantity={m.radius} align="right" />,
          },
          { key: 'age', name: `Age, ${m.ageFactor} R/v`, value: <Quantity quantity={m.age} align="right" /> },
        ]}
      />
    </Panel>
  );
}
