import type { ViewStyle } from 'react-native';
import { ActivityIndicator } from 'react-native';
import { Icon, type IconName } from './Icon';
import { Press, type PressProps, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch, type Colors } from './tokens';

export type ButtonKind = 'primary' | 'plain' | 'quiet' | 'person' | 'danger';

interface Look {
  ground?: keyof Colors;
  edge?: keyof Colors;
  text: keyof Colors;
}
const looks: Record<ButtonKind, Look> = {
  primary: { ground: 'action', edge: 'action', text: 'onAction' },
  plain: { ground: 'panel', edge: 'control', text: 'text' },
  quiet: { text: 'text' },
  person: { ground: 'person', edge: 'person', text: 'onPerson' },
  danger: { ground: 'panel', edge: 'error', text: 'error' },
};

export interface ButtonProps extends Omit<PressProps, 'children' | 'style'> {
  label: string;
  kind?: ButtonKind;
  icon?: IconName;
  /** Shows that its action is under way, and takes no second press. */
  busy?: boolean;
  /** Pressed in, for switches such as tools. */
  selected?: boolean;
  wide?: boolean;
  style?: ViewStyle;
}

export function Button({
  label,
  kind = 'plain',
  icon,
  busy,
  selected,
  wide,
  disabled,
  style,
  ...rest
}: ButtonProps) {
  const { color } = useTheme();
  const look = looks[selected ? 'person' : kind];
  const off = Boolean(disabled || busy);
  return (
    <Press
      {...rest}
      aria-label={rest['aria-label'] ?? label}
      aria-busy={busy || undefined}
      {...(selected !== undefined && { 'aria-pressed': selected })}
      disabled={off}
      style={({ hovered, pressed }: PressState) => [
        {
          minHeight: touch,
          minWidth: touch,
          maxWidth: '100%', // in a narrow column the label takes a second line
          paddingHorizontal: space(4),
          gap: space(2),
          flexDirection: 'row',
          alignItems: 'center',
          justifyContent: 'center',
          borderRadius: radius.small,
          borderWidth: hairline,
          borderColor: look.edge ? color[look.edge] : 'transparent',
          backgroundColor: look.ground ? color[look.ground] : hovered ? color.chip : 'transparent',
          opacity: disabled && !busy ? 0.55 : pressed || (hovered && look.ground) ? 0.94 : 1,
        },
        wide && { alignSelf: 'stretch' },
        style,
      ]}
    >
      {busy ? (
        <ActivityIndicator size="small" color={color[look.text]} />
      ) : (
        icon && <Icon name={icon} size={18} tone={look.text} />
      )}
      <Text weight="semibold" tone={look.text} numberOfLines={2} style={{ flexShrink: 1 }}>
        {label}
      </Text>
    </Press>
  );
}

export interface IconButtonProps extends Omit<PressProps, 'children' | 'style'> {
  icon: IconName;
  label: string;
  tone?: keyof Colors;
  selected?: boolean;
  size?: number;
  style?: ViewStyle;
}

/** A button with a picture alone; its label is its name and its tip. */
export function IconButton({
  icon,
  label,
  tone = 'text',
  selected,
  size = 20,
  disabled,
  style,
  ...rest
}: IconButtonProps) {
  const { color } = useTheme();
  const tip = { title: label } as object;
  const onMap = tone === 'onImage'; // dark in both themes
  return (
    <Press
      {...rest}
      {...tip}
      aria-label={label}
      {...(selected !== undefined && { 'aria-pressed': selected })}
      disabled={disabled}
      style={({ hovered }: PressState) => [
        {
          width: touch,
          height: touch,
          alignItems: 'center',
          justifyContent: 'center',
          borderRadius: radius.small,
          backgroundColor: selected
            ? color.person
            : hovered
              ? color[onMap ? 'imageShade' : 'chip']
              : 'transparent',
          opacity: disabled ? 0.4 : 1,
        },
        style,
      ]}
    >
      <Icon name={icon} size={size} tone={selected ? 'onPerson' : tone} />
    </Press>
  );
}
