import { View } from 'react-native';
import { Press, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch } from './tokens';

export interface Option<T extends string> {
  value: T;
  label: string;
  disabled?: boolean;
}
export interface ChoiceProps<T extends string> {
  label: string;
  value: T;
  options: readonly Option<T>[];
  onChange: (value: T) => void;
  hideLabel?: boolean;
  disabled?: boolean;
  /** Tighter, for many options in a narrow place. */
  small?: boolean;
}

/** One of a few, all in sight; arrow keys move as in any group of radio buttons. */
export function SegmentedChoice<T extends string>({
  label,
  value,
  options,
  onChange,
  hideLabel,
  disabled,
  small,
}: ChoiceProps<T>) {
  const { color } = useTheme();
  const step = (key: string) => {
    const by =
      key === 'ArrowRight' || key === 'ArrowDown' ? 1 : key === 'ArrowLeft' || key === 'ArrowUp' ? -1 : 0;
    const usable = options.filter((o) => !o.disabled);
    const at = usable.findIndex((o) => o.value === value);
    const next = usable[(at + by + usable.length) % usable.length];
    if (by === 0 || !next) return false;
    onChange(next.value);
    return true;
  };
  return (
    <View style={{ gap: space(1) }}>
      {!hideLabel && (
        <Text size="small" tone="quiet" weight="semibold">
          {label}
        </Text>
      )}
      <View
        role="radiogroup"
        aria-label={label}
        style={{
          flexDirection: 'row',
          alignSelf: 'flex-start',
          borderRadius: radius.small,
          borderWidth: hairline,
          borderColor: color.control,
          overflow: 'hidden',
        }}
      >
        {options.map((option, i) => {
          const selected = option.value === value;
          const keys = {
            onKeyDown: (e: { key: string; preventDefault(): void; currentTarget: unknown }) => {
              if (!step(e.key)) return;
              e.preventDefault();
              const group = (e.currentTarget as HTMLElement).parentElement;
              setTimeout(() => group?.querySelector<HTMLElement>('[aria-checked="true"]')?.focus());
            },
          } as object;
          return (
            <Press
              key={option.value}
              role="radio"
              aria-label={option.label}
              aria-checked={selected}
              disabled={disabled || option.disabled}
              tabIndex={selected ? 0 : -1}
              onPress={() => onChange(option.value)}
              {...keys}
              style={({ hovered }: PressState) => ({
                minHeight: touch,
                minWidth: touch,
                paddingHorizontal: space(small ? 1.5 : 3),
                alignItems: 'center',
                justifyContent: 'center',
                backgroundColor: selected ? color.action : hovered ? color.chip : color.panel,
                borderLeftWidth: i === 0 ? 0 : hairline,
                borderLeftColor: color.control,
                opacity: disabled || option.disabled ? 0.5 : 1,
              })}
            >
              <Text
                size={small ? 'small' : 'body'}
                weight={selected ? 'semibold' : 'regular'}
                tone={selected ? 'onAction' : 'text'}
              >
                {option.label}
              </Text>
            </Press>
          );
        })}
      </View>
    </View>
  );
}
