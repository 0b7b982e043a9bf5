import { View } from 'react-native';
import { Icon, type IconName } from './Icon';
import { Press, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space, touch, type Colors } from './tokens';

interface Look {
  ground: keyof Colors;
  text: keyof Colors;
}
const looks = {
  plain: { ground: 'chip', text: 'text' },
  quiet: { ground: 'chip', text: 'quiet' },
  person: { ground: 'personWash', text: 'person' },
  model: { ground: 'modelWash', text: 'model' },
  error: { ground: 'errorWash', text: 'error' },
} as const satisfies Record<string, Look>;
export type ChipKind = keyof typeof looks;

/** A word in a lozenge: a state, a count. Not to be pressed. */
export function Chip({
  label,
  kind = 'plain',
  icon,
  mono,
}: {
  label: string;
  kind?: ChipKind;
  icon?: IconName;
  mono?: boolean;
}) {
  const { color } = useTheme();
  const look = looks[kind];
  return (
    <View
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        width: 'fit-content' as 'auto', // as wide as its word in rows and columns alike
        gap: space(1),
        paddingHorizontal: space(2),
        paddingVertical: space(0.5),
        borderRadius: radius.round,
        backgroundColor: color[look.ground],
      }}
    >
      {icon && <Icon name={icon} size={14} tone={look.text} />}
      <Text size="small" tone={look.text} mono={mono} numberOfLines={1}>
        {label}
      </Text>
    </View>
  );
}

const statuses: Record<string, { kind: ChipKind; icon?: IconName; label?: string }> = {
  draft: { kind: 'quiet' },
  'in review': { kind: 'plain' },
  returned: { kind: 'person' },
  accepted: { kind: 'plain', icon: 'check' },
  withdrawn: { kind: 'quiet' },
  uploaded: { kind: 'quiet', label: 'waiting to be read' },
  ingesting: { kind: 'model', label: 'being read' },
  ready: { kind: 'plain', icon: 'check' },
  failed: { kind: 'error', icon: 'caution' },
  cancelled: { kind: 'quiet', label: 'stopped' },
  queued: { kind: 'quiet', label: 'waiting' },
  running: { kind: 'model' },
  done: { kind: 'plain', icon: 'check' },
};

/** The state of a shell, a cube or a fit, in one look everywhere. */
export function StatusChip({ status }: { status: string }) {
  const look = statuses[status] ?? { kind: 'plain' as const };
  return <Chip label={look.label ?? status} kind={look.kind} icon={look.icon} />;
}

/** A lozenge that switches something on and off, such as a filter. */
export function ToggleChip({
  label,
  selected,
  onPress,
  disabled,
  role = 'button',
}: {
  label: string;
  selected: boolean;
  onPress: () => void;
  disabled?: boolean;
  role?: 'button' | 'checkbox';
}) {
  const { color } = useTheme();
  return (
    <Press
      onPress={onPress}
      disabled={disabled}
      role={role}
      aria-label={label}
      {...(role === 'checkbox' ? { 'aria-checked': selected } : { 'aria-pressed': selected })}
      style={{ minHeight: touch, justifyContent: 'center', opacity: disabled ? 0.5 : 1 }}
    >
      {({ hovered }: PressState) => (
        <View
          style={{
            paddingHorizontal: space(3),
            paddingVertical: space(1),
            borderRadius: radius.round,
            borderWidth: hairline,
            borderColor: selected ? color.person : hovered ? color.control : 'transparent',
            backgroundColor: selected ? color.person : color.chip,
          }}
        >
          <Text
            size="small"
            tone={selected ? 'onPerson' : 'text'}
            weight={selected ? 'semibold' : 'regular'}
            numberOfLines={1}
          >
            {label}
          </Text>
        </View>
      )}
    </Press>
  );
}
