import { View } from 'react-native';
import { coordinateDigits, degrees } from '@/components/cube/words';
import { degreesPerPixel } from '@/components/cube/Readout';
import { useSession } from '@/components/cube/session';
import { IconButton } from '@/components/ui/Button';
import { CheckBox } from '@/components/ui/CheckBox';
import { count } from '@/components/ui/format';
import { SectionTitle } from '@/components/ui/Panel';
import { Press, type PressState } from '@/components/ui/Press';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space, touch } from '@/components/ui/tokens';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import { velocityLabel } from '@/shared/image/velocityDigits';

const ARROWS: Record<string, readonly [number, number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

const PLACED = { hand: 'by hand', suggested: 'suggested', ring: 'from a ring' } as const;

/** What is said of a mark besides its place: sure or not, its error, how it came to be, its note. */
function aboutMark(mark: PlacedMark, digits: number): string[] {
  return [
    mark.unsure ? 'unsure' : 'sure',
    ...(mark.sigma === undefined ? [] : [`± ${degrees(mark.sigma, digits + 1)}`]),
    PLACED[mark.placed ?? 'hand'],
    ...(mark.note ? [mark.note] : []),
  ];
}

/** The marks of the channel shown as a list: the map's marks for the keyboard and for the ear. */
export function MarkList() {
  const { marks, channel, velocity, chosen, select, nudge, seen, removeMarks, canMark, wcs, axes } =
    useSession();
  const { color } = useTheme();
  const own = marks.filter((m) => m.channel === channel);
  const perPixel = degreesPerPixel(axes, wcs);
  const digits = coordinateDigits(perPixel);
  const title = `Marks at ${velocityLabel(velocity, axes.spectral.channelWidth)} km/s`;
  if (own.length === 0) return null;

  const onKeyDown =
    (id: string) =>
    (e: { key: string; shiftKey: boolean; preventDefault(): void; stopPropagation(): void }) => {
      const arrow = ARROWS[e.key];
      if (!canMark || (!arrow && e.key !== 'Delete' && e.key !== 'Backspace')) return;
      e.preventDefault();
      e.stopPropagation();
      if (arrow) nudge(arrow[0], arrow[1], e.shiftKey, seen);
      else removeMarks([id]);
    };

  return (
    <View style={{ gap: space(1) }}>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline' }}>
        <SectionTitle>{title}</SectionTitle>
        <Text size="small" tone="quiet">
          {count(own.length, 'mark')}
        </Text>
      </View>
      <View role="list" aria-label={title}>
        {own.map((mark, i) => {
          const at = wcs.pixelToGalactic(mark.x, mark.y);
          const place = at
            ? `l ${degrees(at.l, digits)} b ${degrees(at.b, digits)}`
            : 'outside the projection';
          const current = chosen.includes(mark);
          const about = aboutMark(mark, digits);
          return (
            <View
              key={mark.id}
              role="listitem"
              style={{
                flexDirection: 'row',
                alignItems: 'center',
                borderBottomWidth: hairline,
                borderBottomColor: color.line,
                backgroundColor: current ? color.selected : 'transparent',
              }}
            >
              {canMark && own.length > 1 && (
                <CheckBox
                  label={`Select mark ${i + 1} with others`}
                  checked={current}
                  onChange={() => select(mark.id, true)}
                />
              )}
              <Press
                onPress={() => select(mark.id)}
                onFocus={() => !current && select(mark.id)}
                aria-label={`Mark ${i + 1}, ${place}, ${about.join(', ')}${canMark ? '. Arrow keys nudge it, Delete removes it' : ''}`}
                aria-pressed={current}
                {...({ onKeyDown: onKeyDown(mark.id) } as object)}
                style={({ hovered }: PressState) => ({
                  flex: 1,
                  minHeight: touch,
                  justifyContent: 'center',
                  paddingHorizontal: space(2),
                  backgroundColor: hovered ? color.selected : 'transparent',
                })}
              >
                {at ? (
                  <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(3) }}>
                    <Text mono size="small">{`l ${degrees(at.l, digits)}`}</Text>
                    <Text mono size="small">{`b ${degrees(at.b, digits)}`}</Text>
                  </View>
                ) : (
                  <Text size="small">{place}</Text>
                )}
                <Text size="small" tone={mark.unsure ? 'person' : 'quiet'}>
                  {about.join(' · ')}
                </Text>
              </Press>
              {canMark && (
                <IconButton
                  icon="trash"
                  label={`Delete mark ${i + 1}`}
                  tone="quiet"
                  size={18}
                  onPress={() => removeMarks([mark.id])}
                />
              )}
            </View>
          );
        })}
      </View>
    </View>
  );
}
