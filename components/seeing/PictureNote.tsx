import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Press } from '@/components/ui/Press';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space, touch } from '@/components/ui/tokens';

/** What was done to the picture, stated on it, with a button to hold for what it is compared with. */
export function PictureNote() {
  const { stated, refused, contours, seeing, view, planes, model, order } = useSession();
  const { color } = useTheme();
  const waiting = planes.plane?.standIn === true;
  const lines = contours.of ? [contours.of] : [];
  const words = [...stated, ...lines, ...refused, ...(waiting ? ['a stand-in: the picture is coming'] : [])];
  const { other, setFlicking, flicking } = seeing;
  const flickable =
    view === 'channel' &&
    (typeof other === 'number' ? other < order.channels.length : other === 'model' && model);
  if (words.length === 0 && !flickable) return null;
  const hold = {
    onPointerDown: (e: { currentTarget: unknown; pointerId: number }) => {
      (e.currentTarget as HTMLElement).setPointerCapture?.(e.pointerId);
      setFlicking(true);
    },
    onPointerUp: () => setFlicking(false),
    onPointerCancel: () => setFlicking(false),
    onBlur: () => setFlicking(false),
    onContextMenu: (e: { preventDefault(): void }) => e.preventDefault(),
    onKeyDown: (e: { key: string; preventDefault(): void }) => {
      if (e.key !== ' ' && e.key !== 'Enter') return;
      e.preventDefault();
      setFlicking(true);
    },
    onKeyUp: () => setFlicking(false),
  } as object;
  return (
    <View
      pointerEvents="box-none"
      style={{
        position: 'absolute',
        left: space(2),
        top: view === 'channel' ? space(2) : space(20), // the note on maps has the corner
        maxWidth: '58%',
        gap: space(1),
        alignItems: 'flex-start',
      }}
    >
      {words.length > 0 && (
        <View
          pointerEvents="none"
          role="status"
          aria-label={`The picture: ${words.join('; ')}`}
          testID="picture-note"
          style={{
            paddingHorizontal: space(2),
            paddingVertical: space(1),
            borderRadius: radius.small,
            backgroundColor: color.imageShade,
          }}
        >
          {words.map((line) => (
            <Text key={line} size="small" tone="onImage">
              {line}
            </Text>
          ))}
        </View>
      )}
      {flickable && (
        <Press
          aria-label={
            typeof other === 'number' ? `Hold to see channel ${other + 1}` : 'Hold to see the model'
          }
          aria-pressed={flicking}
          {...hold}
          style={{
            minHeight: touch,
            justifyContent: 'center',
            paddingHorizontal: space(3),
            borderRadius: radius.small,
            backgroundColor: flicking ? color.person : color.image,
          }}
        >
          <Text size="small" weight="semibold" tone={flicking ? 'onPerson' : 'onImage'}>
            {typeof other === 'number' ? `Hold: channel ${other + 1}` : 'Hold: model'}
          </Text>
        </Press>
      )}
    </View>
  );
}
