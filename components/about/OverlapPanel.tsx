import { View } from 'react-native';
import { Panel } from '@/components/ui/Panel';
import { Press, type PressState } from '@/components/ui/Press';
import { Text } from '@/components/ui/Text';
import { touch } from '@/components/ui/tokens';
import type { Cube } from '@/shared/contract/cubes';

/** Cubes of the region with some of the same sky. */
export function OverlapPanel({ cube }: { cube: Cube }) {
  const { overlaps } = cube;
  if (overlaps.length === 0) return null;
  return (
    <Panel title="The same sky in">
      <View role="list" aria-label="Cubes that show some of the same sky">
        {overlaps.map(({ id, name }) => (
          <View key={id} role="listitem">
            <Press
              href={`/cubes/${id}`}
              style={({ hovered }: PressState) => ({
                minHeight: touch,
                justifyContent: 'center',
                opacity: hovered ? 0.75 : 1,
              })}
            >
              <Text weight="semibold" style={{ textDecorationLine: 'underline' }}>
                {name}
              </Text>
            </Press>
          </View>
        ))}
      </View>
    </Panel>
  );
}
