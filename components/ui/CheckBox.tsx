import { View } from 'react-native';
import { Icon } from './Icon';
import { Press, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch } from './tokens';

/** A box to tick; its words are heard, and seen where `showLabel` is set. */
export function CheckBox({
  label,
  checked,
  onChange,
  disabled,
  showLabel,
}: {
  label: string;
  checked: boolean;
  onChange: (checked: boolean) => void;
  disabled?: boolean;
  showLabel?: boolean;
}) {
  const { color } = useTheme();
  return (
    <Press
      role="checkbox"
      aria-label={label}
      aria-checked={checked}
      disabled={disabled}
      onPress={() => onChange(!checked)}
      style={{
        minWidth: touch,
        minHeight: touch,
        flexDirection: 'row',
        alignItems: 'center',
        gap: space(2),
        opacity: disabled ? 0.45 : 1,
      }}
    >
      {({ hovered }: PressState) => (
        <>
          <View
            style={{
              width: space(5),
              height: space(5),
              borderRadius: radius.small,
              borderWidth: hairline * 1.5,
              borderColor: checked ? color.person : hovered ? color.text : color.control,
              backgroundColor: checked ? color.person : 'transparent',
              alignItems: 'center',
              justifyContent: 'center',
            }}
          >
            {checked && <Icon name="check" size={14} tone="onPerson" />}
          </View>
          {showLabel && <Text>{label}</Text>}
        </>
      )}
    </Press>
  );
}
