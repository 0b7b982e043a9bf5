import { useRef } from 'react';
import { View } from 'react-native';
import { coordinateDigits, degrees } from '@/components/cube/words';
import { degreesPerPixel } from '@/components/cube/Readout';
import { useSession } from '@/components/cube/session';
import { IconButton } from '@/components/ui/Button';
import { count } from '@/components/ui/format';
import { SectionTitle } from '@/components/ui/Panel';
import { Press, type PressState } from '@/components/ui/Press';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space, touch } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

const ARROWS: Record<string, readonly [number, number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};
/** Nudges this close together are one step of undo. */
const ONE_STEP_MS = 800;

/** The marks of the channel shown as a list: the map's marks for the keyboard and for the ear. */
export function MarkList() {
  const { marks, channel, velocity, selected, select, moveMark, removeMarks, marking, wcs, axes } =
    useSession();
  const { color } = useTheme();
  const burst = useRef({ name: '', time: 0 });
  const own = marks.filter((m) => m.channel === channel);
  const perPixel = degreesPerPixel(axes, wcs);
  const digits = coordinateDigits(perPixel);
  // A tenth of the beam, or half a pixel where the file does not say how wide it is.
  const step = axes.beam ? Math.max(axes.beam.major / 10 / perPixel, 0.05) : 0.5;
  const title = `Marks at ${velocityLabel(velocity, axes.spectral.channelWidth)} km/s`;
  if (own.length === 0) return null;

  const onKeyDown =
    (id: string, x: number, y: number) =>
    (e: {
      key: string;
      shiftKey: boolean;
      timeStamp: number;
      preventDefault(): void;
      stopPropagation(): void;
    }) => {
      const arrow = ARROWS[e.key];
      if (!marking || (!arrow && e.key !== 'Delete' && e.key !== 'Backspace')) return;
      e.preventDefault();
      e.stopPropagation();
      if (!arrow) return removeMarks([id]);
      const again = burst.current.name.startsWith(id) && e.timeStamp - burst.current.time < ONE_STEP_MS;
      burst.current = { name: again ? burst.current.name : `${id} ${e.timeStamp}`, time: e.timeStamp };
      const by = step * (e.shiftKey ? 10 : 1);
      moveMark(id, { x: x + arrow[0] * by, y: y + arrow[1] * by }, `nudge ${burst.current.name}`);
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
          const current = mark.id === selected?.id;
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
              <Press
                onPress={() => select(mark.id)}
                onFocus={() => select(mark.id)}
                aria-label={`Mark ${i + 1}, ${place}${marking ? '. Arrow keys nudge it, Delete removes it' : ''}`}
                aria-pressed={current}
                {...({ onKeyDown: onKeyDown(mark.id, mark.x, mark.y) } as object)}
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
              </Press>
              {marking && (
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
