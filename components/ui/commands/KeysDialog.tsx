import { View } from 'react-native';
import { Button } from '../Button';
import { Dialog } from '../Dialog';
import { SectionTitle } from '../Panel';
import { Text } from '../Text';
import { useTheme } from '../theme';
import { hairline, radius, space } from '../tokens';
import { readable, type Command } from './command';

/** The `?` list, made from the commands that are live on this screen. */
export function KeysDialog({ commands, onClose }: { commands: readonly Command[]; onClose: () => void }) {
  const groups = new Map<string, Command[]>();
  for (const command of commands) {
    if (!command.keys?.length) continue;
    const group = command.group ?? 'Everywhere';
    groups.set(group, [...(groups.get(group) ?? []), command]);
  }
  groups.set('Everywhere', [
    ...(groups.get('Everywhere') ?? []),
    { name: 'keys', label: 'This list', keys: ['?'], perform: onClose },
  ]);
  const help = commands
    .filter((c) => !c.keys?.length && c.enabled !== false)
    .map((c) => (
      <Button
        key={c.name}
        label={c.label}
        onPress={() => {
          onClose();
          c.perform();
        }}
      />
    ));
  return (
    <Dialog title="Keys" onClose={onClose} actions={help.length > 0 && help}>
      {[...groups].map(([group, list]) => (
        <View key={group} style={{ gap: space(1) }}>
          <SectionTitle level={3}>{group}</SectionTitle>
          {list.map((c) => (
            <View
              key={c.name}
              style={{
                flexDirection: 'row',
                justifyContent: 'space-between',
                gap: space(4),
                minHeight: space(8),
                alignItems: 'center',
              }}
            >
              <Text tone={c.enabled === false ? 'quiet' : 'text'} style={{ flexShrink: 1 }}>
                {c.label}
              </Text>
              <View style={{ flexDirection: 'row', gap: space(3) }}>
                {c.keys!.map((k) => (
                  <View key={k} style={{ flexDirection: 'row', gap: space(1) }}>
                    {readable(k).map((part) => (
                      <KeyCap key={part}>{part}</KeyCap>
                    ))}
                  </View>
                ))}
              </View>
            </View>
          ))}
        </View>
      ))}
    </Dialog>
  );
}

function KeyCap({ children }: { children: string }) {
  const { color } = useTheme();
  return (
    <View
      style={{
        minWidth: space(6),
        alignItems: 'center',
        paddingHorizontal: space(1.5),
        paddingVertical: space(0.5),
        borderWidth: hairline,
        borderColor: color.control,
        borderRadius: radius.small,
      }}
    >
      <Text size="small" mono>
        {children}
      </Text>
    </View>
  );
}
