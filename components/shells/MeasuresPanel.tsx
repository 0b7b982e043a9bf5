import type { Shell } from '@/shared/contract/shells';
import { DefinitionRows } from '../ui/DefinitionRows';
import { Panel } from '../ui/Panel';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';

const FITTED = ['l', 'b', 'theta', 'vSys', 'vExp'] as const;

/**
 * What follows from the adopted fit and the distance; the age with the factor it rests on. Brief where the fit's own
 * numbers stand beside it anyway.
 */
export function MeasuresPanel({ shell, brief }: { shell: Shell; brief: boolean }) {
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
          ...(brief ? [] : FITTED).map((key) => ({
            key,
            name: <ParameterName name={key} long />,
            value: <Quantity quantity={m[key]} align="right" />,
          })),
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
