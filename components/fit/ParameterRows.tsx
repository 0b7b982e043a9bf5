import { View } from 'react-native';
import type { Parameter } from '@/shared/contract/fits';
import { DefinitionRows } from '../ui/DefinitionRows';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { errorBarOf, limitsOf, type Limit } from './errorBarWords';
import { chi2PerDof, type DoneFit } from './fitFacts';
import { constraintWords, inOrder, writtenValue } from './parameterWords';

/** The numbers, each with what was said of it and what limits it; then the error bar by name and what it covers. */
export function ParameterRows({ fit, limits = true }: { fit: DoneFit; limits?: boolean }) {
  const quality = chi2PerDof(fit);
  const bar = errorBarOf(fit);
  const known = limits ? limitsOf(fit) : [];
  return (
    <View style={{ gap: space(2) }}>
      <DefinitionRows
        rows={[
          ...inOrder(Object.keys(fit.parameters)).map((name) => ({
            key: name,
            name: <ParameterName name={name} long />,
            value: <Value parameter={fit.parameters[name]!} />,
            note: (
              <Notes
                name={name}
                parameter={fit.parameters[name]!}
                limits={known.filter((l) => l.beside.includes(name))}
              />
            ),
          })),
          {
            key: 'chi2',
            name: 'χ² / degrees of freedom',
            value: `${fit.chi2.toFixed(1)} / ${fit.dof}${quality === null ? '' : ` = ${quality.toFixed(2)}`}`,
          },
        ]}
      />
      <Text size="small">
        <Text size="small" weight="semibold">
          Error bars: {bar.name}.
        </Text>{' '}
        <Text size="small" tone="quiet">
          {bar.covers}
        </Text>
      </Text>
      {known
        .filter((l) => l.beside.length === 0)
        .map((l) => (
          <Text key={l.key} size="small" tone="person">
            {l.text}
          </Text>
        ))}
    </View>
  );
}

function Value({ parameter }: { parameter: Parameter }) {
  if (parameter.constraint?.fixed === undefined) return <Quantity quantity={parameter} align="right" />;
  return <Quantity quantity={{ value: parameter.value, se: null, unit: parameter.unit }} align="right" />;
}

function Notes({ name, parameter, limits }: { name: string; parameter: Parameter; limits: Limit[] }) {
  const { constraint, atBound } = parameter;
  if (!constraint && !atBound && limits.length === 0) return null;
  const bound = atBound && constraint?.[atBound];
  return (
    <View style={{ paddingBottom: space(1) }}>
      {constraint && (
        <Text size="small" tone="person">
          {constraintWords(name, constraint)}
          {constraint.prior && ', counted as a datum'}
        </Text>
      )}
      {atBound && (
        <Text size="small" tone="person">
          {`ended at its ${atBound === 'low' ? 'lower' : 'upper'} bound${
            typeof bound === 'number' ? ` of ${writtenValue(name, bound)}` : ''
          }`}
        </Text>
      )}
      {limits.map((l) => (
        <Text key={l.key} size="small" tone="quiet">
          {l.text}
        </Text>
      ))}
    </View>
  );
}
