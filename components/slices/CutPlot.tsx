import { useCallback, useMemo } from 'react';
import { useSession } from '@/components/cube/session';
import { boxOf, drawAxes, xOn, yOn, type PlotAxis } from '@/components/slices/plot';
import { PlotCanvas } from '@/components/slices/PlotCanvas';
import { cutLength, placeAlong, type Slice } from '@/components/slices/slice';
import { paintedPlane } from '@/components/slices/paintedPlane';
import { useTheme } from '@/components/ui/theme';
import { fonts, typeScale } from '@/components/ui/tokens';
import type { Cut } from '@/hooks/useCut';
import { trackAt } from '@/shared/shell/modelTrack';

const TRACK_POINTS = 240;

/** Position across, velocity upward, with the model's track and the velocity shown on the map. */
export function CutPlot({
  slice,
  cut,
  height,
}: {
  slice: Exclude<Slice, { kind: 'spectrum' }>;
  cut: Cut | null;
  height: number;
}) {
  const { channelLook, model, order, velocity, showChannel } = useSession();
  const { color } = useTheme();
  const { plane } = cut ?? {};
  const { look } = channelLook;
  const picture = useMemo(
    () => (plane ? paintedPlane(plane, look, order.channels) : null),
    [plane, look, order],
  );
  const velocities = order.velocities;
  const step = (velocities[velocities.length - 1]! - velocities[0]!) / Math.max(velocities.length - 1, 1);
  const up = useMemo<PlotAxis>(
    () => ({
      low: velocities[0]! - step / 2,
      high: velocities[velocities.length - 1]! + step / 2,
      name: 'velocity, km/s',
    }),
    [velocities, step],
  );
  const length = cutLength(slice);
  const across = useMemo<PlotAxis>(() => {
    if (slice.kind === 'ring') return { low: 0, high: 360, name: 'azimuth from north through east, °' };
    return length < 2
      ? { low: 0, high: length * 60, name: 'position along the segment, ′' }
      : { low: 0, high: length, name: 'position along the segment, °' };
  }, [slice.kind, length]);
  const draw = useCallback(
    (ctx: CanvasRenderingContext2D, width: number, tall: number) => {
      const box = boxOf(width, tall);
      ctx.fillStyle = color.image;
      ctx.fillRect(box.left, box.top, box.width, box.height);
      if (picture) {
        ctx.imageSmoothingEnabled = picture.width > box.width || picture.height > box.height;
        ctx.save();
        ctx.translate(box.left, box.top + box.height);
        ctx.scale(1, -1); // the lowest velocity is its first row
        ctx.drawImage(picture, 0, 0, box.width, box.height);
        ctx.restore();
      }
      ctx.save();
      ctx.beginPath();
      ctx.rect(box.left, box.top, box.width, box.height);
      ctx.clip();
      ctx.setLineDash([4, 4]);
      ctx.strokeStyle = color.onImage;
      ctx.lineWidth = 1;
      ctx.beginPath();
      ctx.moveTo(box.left, yOn(box, up, velocity));
      ctx.lineTo(box.left + box.width, yOn(box, up, velocity));
      ctx.stroke();
      ctx.setLineDash([]);
      if (model)
        for (const side of ['near', 'far'] as const) {
          ctx.beginPath();
          let pen = false;
          for (let i = 0; i <= TRACK_POINTS; i++) {
            const share = i / TRACK_POINTS;
            const track = trackAt(placeAlong(slice, share), model);
            if (!track) {
              pen = false;
              continue;
            }
            const x = xOn(box, across, across.low + (across.high - across.low) * share);
            const y = yOn(box, up, track[side]);
            if (pen) ctx.lineTo(x, y);
            else ctx.moveTo(x, y);
            pen = true;
          }
          ctx.strokeStyle = color.edgeOnImage;
          ctx.lineWidth = 4;
          ctx.stroke();
          ctx.strokeStyle = color.modelOnImage;
          ctx.lineWidth = 1.75;
          ctx.stroke();
        }
      ctx.restore();
      drawAxes(ctx, box, across, up, {
        text: color.text,
        line: color.control,
        font: `${typeScale.small[0]}px ${fonts.mono}, monospace`,
      });
    },
    [color, picture, up, across, velocity, model, slice],
  );
  const what =
    slice.kind === 'ring'
      ? `Azimuth against velocity around a ring of ${slice.radius.toFixed(2)}°`
      : `Position against velocity along ${length.toFixed(2)}°`;
  return (
    <PlotCanvas
      label={`${what}${model ? ', with the model’s track' : ''}. A press shows the channel of that velocity.`}
      height={height}
      draw={draw}
      onPoint={(_, y, width, tall) => {
        const box = boxOf(width, tall);
        const v = up.low + (1 - (y - box.top) / box.height) * (up.high - up.low);
        const at = Math.round((v - velocities[0]!) / (step || 1));
        const channel = order.channels[Math.min(Math.max(at, 0), order.channels.length - 1)];
        if (channel !== undefined) showChannel(channel);
      }}
    />
  );
}
