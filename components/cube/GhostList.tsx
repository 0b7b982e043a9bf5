import { View } from 'react-native';
import { degreesPerPixel } from '@/components/cube/Readout';
import { useSession } from '@/components/cube/session';
import { coordinateDigits, degrees } from '@/components/cube/words';
import { IconButton } from '@/components/ui/Button';
import { SectionTitle } from '@/components/ui/Panel';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space, touch } from '@/components/ui/tokens';

/** The marks that are offered, to take or to refuse one by one; on the map a press on one takes it. */
export function GhostList() {
  const { ghosts, takeGhosts, refuse, wcs, axes } = useSession();
  const { color } = useTheme();
  if (ghosts.length === 0) return null;
  const digits = coordinateDigits(degreesPerPixel(axes, wcs));
  return (
    <View style={{ gap: space(1) }}>
      <SectionTitle>Suggested marks</SectionTitle>
      <View role="list" aria-label="Suggested marks">
        {ghosts.map((ghost, i) => {
          const at = wcs.pixelToGalactic(ghost.x, ghost.y);
          return (
            <View
              key={ghost.id}
              role="listitem"
              style={{
                flexDirection: 'row',
                alignItems: 'center',
                minHeight: touch,
                paddingLeft: space(2),
                borderBottomWidth: hairline,
                borderBottomColor: color.line,
              }}
            >
              <View style={{ flex: 1, flexDirection: 'row', flexWrap: 'wrap', columnGap: space(2) }}>
                {at && <Text mono size="small">{`l ${degrees(at.l, digits)}`}</Text>}
                {at && <Text mono size="small">{`b ${degrees(at.b, digits)}`}</Text>}
                <Text mono size="small" tone="quiet">{`± ${degrees(ghost.sigma, digits + 1)}`}</Text>
              </View>
              <IconButton
                icon="check"
                label={`Take suggestion ${i + 1}`}
                size={18}
                onPress={() => takeGhosts([ghost.id])}
              />
              <IconButton
                icon="close"
                label={`Refuse suggestion ${i + 1}`}
                tone="quiet"
                size={18}
                onPress={() => refuse([ghost.id])}
              />
            </View>
          );
        })}
      </View>
    </View>
  );
}
