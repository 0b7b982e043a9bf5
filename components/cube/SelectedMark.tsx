import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { coordinateDigits, degrees } from '@/components/cube/words';
import { degreesPerPixel } from '@/components/cube/Readout';
import { IconButton } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';

/** What can be done with the mark that is selected, within a thumb's reach on the map. */
export function SelectedMark() {
  const { selected, marks, channel, wcs, axes, removeMarks, select, marking } = useSession();
  const { color } = useTheme();
  if (!selected) return null;
  const own = marks.filter((m) => m.channel === channel);
  const at = wcs.pixelToGalactic(selected.x, selected.y);
  const digits = coordinateDigits(degreesPerPixel(axes, wcs));
  return (
    <View
      style={{
        position: 'absolute',
        left: space(2),
        top: space(2),
        flexDirection: 'row',
        alignItems: 'center',
        paddingLeft: space(3),
        borderRadius: radius.small,
        backgroundColor: color.image,
      }}
    >
      <View>
        <Text size="small" tone="onImage" weight="semibold">
          {`Mark ${own.findIndex((m) => m.id === selected.id) + 1} of ${own.length}`}
        </Text>
        {at && (
          <Text mono size="small" tone="onImage">
            {`${degrees(at.l, digits)} ${degrees(at.b, digits)}`}
          </Text>
        )}
      </View>
      {marking && (
        <IconButton
          icon="trash"
          label="Delete this mark"
          tone="onImage"
          onPress={() => removeMarks([selected.id])}
        />
      )}
      <IconButton icon="close" label="Deselect the mark" tone="onImage" onPress={() => select(null)} />
    </View>
  );
}
