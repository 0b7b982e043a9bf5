import { View, type TextStyle } from 'react-native';
import { formatQuantity, plainNumber, type QuantityInput } from '@/shared/physics/quantity';
import { Sub, Text } from './Text';
import { space, type Colors, type TypeSize } from './tokens';

export interface QuantityProps {
  /** null where there is nothing to show yet: a dash, read as "not known". */
  quantity: QuantityInput | null | undefined;
  /** Leave the unit to the column's head. */
  hideUnit?: boolean;
  size?: TypeSize;
  tone?: keyof Colors;
  align?: 'left' | 'right';
}

const oneLine = { whiteSpace: 'nowrap' } as TextStyle;

/** Value, error and unit, rounded by the error and aligned in tabular figures; read aloud in words. */
export function Quantity({
  quantity,
  hideUnit,
  size = 'body',
  tone = 'text',
  align = 'left',
}: QuantityProps) {
  if (!quantity)
    return (
      <Text mono size={size} tone="quiet" align={align} aria-label="not known">
        –
      </Text>
    );
  const q = formatQuantity(quantity);
  return (
    <View
      role="img"
      aria-label={q.spoken}
      style={{
        flexDirection: 'row',
        flexWrap: 'wrap',
        columnGap: space(1.5),
        alignItems: 'baseline',
        justifyContent: align === 'right' ? 'flex-end' : 'flex-start',
      }}
    >
      <Text mono size={size} tone={tone} style={oneLine}>
        {q.value}
      </Text>
      {q.error && (
        <Text
          mono
          size={size}
          tone="quiet"
          align={align}
          style={q.error.includes('bound') ? undefined : oneLine}
        >
          {q.error}
        </Text>
      )}
      {!hideUnit && q.unit ? (
        <Text size={size} tone="quiet">
          {q.unit}
        </Text>
      ) : null}
    </View>
  );
}

/** A plain number in tabular figures, to a fixed number of decimals or four digits. */
export function Figure({
  value,
  unit,
  size = 'body',
  tone = 'text',
}: {
  value: number | string;
  unit?: string;
  size?: TypeSize;
  tone?: keyof Colors;
}) {
  return (
    <Text mono size={size} tone={tone}>
      {typeof value === 'number' ? plainNumber(value) : value}
      {unit ? (
        <Text size={size} tone="quiet">
          {' '}
          {unit}
        </Text>
      ) : null}
    </Text>
  );
}

const symbols: Record<string, { main: string; sub?: string; name: string }> = {
  l: { main: 'l', name: 'Centre l' },
  b: { main: 'b', name: 'Centre b' },
  theta: { main: 'Θ', name: 'Radius Θ' },
  vSys: { main: 'v', sub: 'sys', name: 'v sys' },
  vExp: { main: 'v', sub: 'exp', name: 'v exp' },
  driftL: { main: 'drift', sub: 'l', name: 'Drift in l' },
  driftB: { main: 'drift', sub: 'b', name: 'Drift in b' },
  axisRatio: { main: 'q', name: 'Axis ratio q' },
  positionAngle: { main: 'PA', name: 'Position angle' },
  radius: { main: 'R', name: 'Radius R' },
  age: { main: 'age', name: 'Kinematic age' },
};

/** The name of a parameter as it is written, with its index lowered; unknown names as they are. */
export function ParameterName({
  name,
  long,
  size = 'body',
  tone = 'text',
}: {
  name: string;
  long?: boolean;
  size?: TypeSize;
  tone?: keyof Colors;
}) {
  const s = symbols[name] ?? { main: name, name };
  return (
    <Text size={size} tone={tone} aria-label={s.name}>
      {s.sub ? s.main : long ? s.name : s.main}
      {s.sub && (
        <Sub size={size} tone={tone}>
          {s.sub}
        </Sub>
      )}
    </Text>
  );
}
