import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { brightness, frameWords } from '@/components/cube/words';
import { coordinateWords } from '@/components/seeing/coordinateWords';
import { skyMapping } from '@/components/seeing/skyMapping';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';
import { brightnessAt } from '@/hooks/planes/decodePlane';
import { useValue } from '@/hooks/valueStore';
import { pixelAt, type ImagePoint } from '@/shared/image/viewport';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { positionAngle, separation } from '@/shared/sky/greatCircle';

const itself = (at: ImagePoint | null) => at;

/** Longitude, latitude, velocity and brightness under the pointer. Renders with the pointer, and nothing else does. */
export function Readout() {
  const { wcs, axes, store, velocity, planes, view, unit, seen, seeing, coordinates } = useSession();
  const { color } = useTheme();
  const at = useValue(store.hover, itself);
  const pixel = at && pixelAt(seen, at);
  if (!at || !pixel) return null;
  const perPixel = degreesPerPixel(axes, wcs);
  const galactic = skyMapping(seen.sky, axes.frame, 'galactic').unproject(at.x, at.y);
  const equatorial =
    axes.frame === 'galactic' && coordinates.grid !== 'equatorial'
      ? null
      : skyMapping(seen.sky, axes.frame, 'equatorial').unproject(at.x, at.y);
  const own = frameWords(axes.frame === 'galactic' ? 'icrs' : axes.frame);
  const words = (of: { lon: number; lat: number }, grid: 'galactic' | 'equatorial') =>
    coordinateWords(of, grid, coordinates.notation, perPixel);
  const g = galactic && words(galactic, 'galactic');
  const e = equatorial && words(equatorial, 'equatorial');
  const { plane } = planes;
  const value = plane && !plane.standIn ? brightnessAt(plane, pixel.i, pixel.j) : NaN;
  const channelWords =
    view === 'channel' && seen.lie !== 'stacked'
      ? `${velocityLabel(velocity, axes.spectral.channelWidth)} km/s  `
      : '';
  const { about } = seeing;
  const fromCentre =
    about && galactic && seen.lie !== 'image'
      ? `${Math.round(positionAngle(about, galactic))}° azimuth, ${separation(about, galactic).toFixed(2)}° out`
      : null;
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
        {g ? `l ${g.lon}  b ${g.lat}` : 'outside the projection'}
      </Text>
      {e && (
        <Text mono size="small" tone="onImage" align="right">
          {`${own.lon} ${e.lon}  ${own.lat} ${e.lat}  ${own.name}`}
        </Text>
      )}
      {fromCentre && (
        <Text mono size="small" tone="onImage" align="right">
          {fromCentre}
        </Text>
      )}
      <Text mono size="small" tone="onImage" align="right">
        {`${channelWords}${plane && !plane.standIn ? brightness(value) : '…'}${Number.isFinite(value) && unit ? ` ${unit}` : ''}`}
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
