import { useId } from 'react';
import { View } from 'react-native';
import type { ChoiceProps } from './SegmentedChoice';
import { Text } from './Text';
import { useTheme } from './theme';
import { fonts, hairline, radius, space, touch, typeScale } from './tokens';

/** One of many: the machine's own list, which every phone and screen reader knows. */
export function Select<T extends string>({
  label,
  value,
  options,
  onChange,
  hideLabel,
  disabled,
}: ChoiceProps<T>) {
  const { color } = useTheme();
  const id = useId();
  return (
    <View style={{ gap: space(1) }}>
      {!hideLabel && (
        <Text size="small" tone="quiet" weight="semibold">
          {label}
        </Text>
      )}
      <select
        id={id}
        aria-label={label}
        value={value}
        disabled={disabled}
        onChange={(e) => onChange(e.target.value as T)}
        style={{
          minHeight: touch,
          minWidth: 0,
          maxWidth: '100%',
          padding: `0 ${space(3)}px`,
          borderRadius: radius.small,
          border: `${hairline}px solid ${color.control}`,
          backgroundColor: color.raised,
          color: color.text,
          fontFamily: fonts.regular,
          fontSize: typeScale.body[0],
          cursor: 'pointer',
        }}
      >
        {options.map((o) => (
          <option key={o.value} value={o.value} disabled={o.disabled}>
            {o.label}
          </option>
        ))}
      </select>
    </View>
  );
}
