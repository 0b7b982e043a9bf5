import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { brightness, coordinateDigits, degrees, frameWords } from '@/components/cube/words';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';
import { ALL_CHANNELS, brightnessAt } from '@/hooks/planes/decodePlane';
import { useValue } from '@/hooks/valueStore';
import { pixelAt, type ImagePoint } from '@/shared/image/viewport';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { separation } from '@/shared/sky/greatCircle';

const itself = (at: ImagePoint | null) => at;

/** Longitude, latitude, velocity and brightness under the pointer. Renders with the pointer, and nothing else does. */
export function Readout() {
  const { wcs, axes, store, velocity, channel, planes, view, unit } = useSession();
  const { color } = useTheme();
  const at = useValue(store.hover, itself);
  const pixel = at && pixelAt(axes, at);
  if (!at || !pixel) return null;
  const digits = coordinateDigits(degreesPerPixel(axes, wcs));
  const galactic = wcs.pixelToGalactic(at.x, at.y);
  const sky = axes.frame === 'galactic' ? null : wcs.pixelToSky(at.x, at.y);
  const own = frameWords(axes.frame);
  const plane = planes.plane?.channel === (view === 'channel' ? channel : ALL_CHANNELS) ? planes.plane : null;
  const value = plane ? brightnessAt(plane, pixel.i, pixel.j) : NaN;
  const channelWords =
    view === 'channel' ? `${velocityLabel(velocity, axes.spectral.channelWidth)} km/s  ` : '';
  return (
    <View
      pointerEvents="none"
      testID="readout"
      style={{
        position: 'absolute',
        top: space(2),
        right: space(2),
        maxWidth: '94%',
        paddingHorizontal: space(2),
        paddingVertical: space(1),
        borderRadius: radius.small,
        backgroundColor: color.image,
        alignItems: 'flex-end',
      }}
    >
      <Text mono size="small" tone="onImage" align="right">
        {galactic
          ? `l ${degrees(galactic.l, digits)}  b ${degrees(galactic.b, digits)}`
          : 'outside the projection'}
      </Text>
      {sky && (
        <Text mono size="small" tone="onImage" align="right">
          {`${own.lon} ${degrees(sky.lon, digits)}  ${own.lat} ${degrees(sky.lat, digits)}  ${own.name}`}
        </Text>
      )}
      <Text mono size="small" tone="onImage" align="right">
        {`${channelWords}${plane ? brightness(value) : '…'}${plane && Number.isFinite(value) && unit ? ` ${unit}` : ''}`}
      </Text>
    </View>
  );
}

/** Degrees from one pixel to the next in the middle of the image. */
export function degreesPerPixel(
  axes: { nx: number; ny: number },
  wcs: { pixelToSky(x: number, y: number): { lon: number; lat: number } | null },
): number {
  const [x, y] = [(axes.nx - 1) / 2, (axes.ny - 1) / 2];
  const [a, b, c] = [wcs.pixelToSky(x, y), wcs.pixelToSky(x + 1, y), wcs.pixelToSky(x, y + 1)];
  return a && b && c ? Math.max(separation(a, b), separation(a, c)) : 0.01;
}
