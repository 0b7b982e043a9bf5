import { View } from 'react-native';
import { MAP_TOOLS } from '@/components/cube/mapTools';
import { RingBar } from '@/components/cube/RingBar';
import { useSession } from '@/components/cube/session';
import { IconButton } from '@/components/ui/Button';
import { count } from '@/components/ui/format';
import { Press, type PressState } from '@/components/ui/Press';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space, touch } from '@/components/ui/tokens';
import { useValue } from '@/hooks/valueStore';
import type { RingDraft } from '@/shared/shell/suggest/ringDraft';

const itself = (draft: RingDraft | null) => draft;

/** What the tool in hand asks for, at the foot of the map: a hint, the circle's numbers, or the marks it offers. */
export function ToolBar() {
  const { mapTool, setTool, ghosts, takeGhosts, refuse, store, ring } = useSession();
  const draft = useValue(store.ring, itself);
  const { hint } = MAP_TOOLS[mapTool];
  if (mapTool === 'ring' && draft)
    return (
      <Bar label="Ring">
        <RingBar draft={draft} ring={ring} />
      </Bar>
    );
  if (hint)
    return (
      <Bar label={MAP_TOOLS[mapTool].label}>
        <Text size="small" tone="onImage" style={{ paddingHorizontal: space(2), flexShrink: 1 }}>
          {hint}
        </Text>
        <IconButton
          icon="close"
          label={`Put the ${MAP_TOOLS[mapTool].label.toLowerCase()} down`}
          tone="onImage"
          onPress={() => setTool('mark')}
        />
      </Bar>
    );
  if (mapTool === 'move' || ghosts.length === 0) return null;
  const all = ghosts.map((ghost) => ghost.id);
  return (
    <Bar label="Suggested marks">
      <Text size="small" tone="onImage" style={{ paddingHorizontal: space(2) }}>
        {`${count(ghosts.length, 'mark')} suggested`}
      </Text>
      <BarButton label="Take all" onPress={() => takeGhosts(all)} />
      <BarButton label="Refuse all" onPress={() => refuse(all)} />
    </Bar>
  );
}

function Bar({ label, children }: { label: string; children: React.ReactNode }) {
  const { color } = useTheme();
  return (
    <View
      pointerEvents="box-none"
      style={{
        position: 'absolute',
        left: space(2),
        right: space(2),
        bottom: space(2),
        alignItems: 'center',
      }}
    >
      <View
        role="group"
        aria-label={label}
        testID="tool-bar"
        style={{
          flexDirection: 'row',
          flexWrap: 'wrap',
          alignItems: 'center',
          justifyContent: 'center',
          maxWidth: '100%',
          paddingHorizontal: space(1),
          borderRadius: radius.small,
          borderWidth: hairline,
          borderColor: color.personOnImage,
          backgroundColor: color.image,
        }}
      >
        {children}
      </View>
    </View>
  );
}

/** A button in words on the dark of the map, in both themes. */
export function BarButton({
  label,
  strong,
  disabled,
  onPress,
}: {
  label: string;
  strong?: boolean;
  disabled?: boolean;
  onPress: () => void;
}) {
  const { color } = useTheme();
  return (
    <Press
      onPress={onPress}
      disabled={disabled}
      aria-label={label}
      style={({ hovered }: PressState) => ({
        minHeight: touch,
        justifyContent: 'center',
        paddingHorizontal: space(2),
        opacity: disabled ? 0.5 : 1,
        backgroundColor: hovered ? color.imageShade : 'transparent',
      })}
    >
      <Text
        size="small"
        weight="semibold"
        style={{ color: strong ? color.personOnImage : color.onImage, textDecorationLine: 'underline' }}
      >
        {label}
      </Text>
    </Press>
  );
}
