import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { coordinateDigits, degrees } from '@/components/cube/words';
import { degreesPerPixel } from '@/components/cube/Readout';
import { IconButton } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';

/** What can be done with the marks that are selected, within a thumb's reach on the map. */
export function SelectedMark() {
  const { chosen, selected, marks, channel, wcs, axes, removeMarks, select, canMark, describeMarks } =
    useSession();
  const { color } = useTheme();
  const [first] = chosen;
  if (!first) return null;
  const ids = chosen.map((mark) => mark.id);
  const unsure = chosen.every((mark) => mark.unsure);
  const own = marks.filter((m) => m.channel === channel);
  const at = selected && wcs.pixelToGalactic(selected.x, selected.y);
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
          {selected
            ? `Mark ${own.indexOf(selected) + 1} of ${own.length}`
            : `${chosen.length} marks selected`}
        </Text>
        {at && (
          <Text mono size="small" tone="onImage">
            {`${degrees(at.l, digits)} ${degrees(at.b, digits)}`}
          </Text>
        )}
      </View>
      {canMark && (
        <>
          <IconButton
            icon={unsure ? 'doubt' : 'check'}
            label={unsure ? 'Unsure: say sure' : 'Sure: say unsure'}
            tone="onImage"
            onPress={() => describeMarks(ids, { unsure: !unsure })}
          />
          <IconButton
            icon="trash"
            label={selected ? 'Delete this mark' : 'Delete these marks'}
            tone="onImage"
            onPress={() => removeMarks(ids)}
          />
        </>
      )}
      <IconButton icon="close" label="Deselect" tone="onImage" onPress={() => select(null)} />
    </View>
  );
}
