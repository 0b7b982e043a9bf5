import { useCallback } from 'react';
import { useSession } from '@/components/cube/session';
import { boxOf, drawAxes, xOn, yOn, type PlotAxis } from '@/components/slices/plot';
import { PlotCanvas } from '@/components/slices/PlotCanvas';
import { useTheme } from '@/components/ui/theme';
import { fonts, typeScale } from '@/components/ui/tokens';
import type { Spectrum } from '@/shared/contract/cubes';

/** Brightness against velocity, with the model's caps and middle, and the velocity shown on the map. */
export function SpectrumPlot({ spectrum, height }: { spectrum: Spectrum | null; height: number }) {
  const { model, order, velocity, showChannel, axes } = useSession();
  const { color } = useTheme();
  const v = order.velocities;
  const draw = useCallback(
    (ctx: CanvasRenderingContext2D, width: number, tall: number) => {
      const box = boxOf(width, tall);
      const across: PlotAxis = { low: v[0]!, high: v[v.length - 1]!, name: 'velocity, km/s' };
      const known = spectrum?.brightness.filter((b): b is number => b !== null) ?? [];
      const [low, high] = [Math.min(0, ...known), Math.max(...known, 1e-9)];
      const margin = (high - low) * 0.05 || 1;
      const up: PlotAxis = {
        low: low - margin,
        high: high + margin,
        name: `brightness${axes.unit ? `, ${axes.unit}` : ''}`,
      };
      const vertical = (at: number, colour: string, dash: number[]) => {
        if (at < across.low || at > across.high) return;
        ctx.beginPath();
        ctx.setLineDash(dash);
        ctx.moveTo(xOn(box, across, at), box.top);
        ctx.lineTo(xOn(box, across, at), box.top + box.height);
        ctx.strokeStyle = colour;
        ctx.lineWidth = 1.5;
        ctx.stroke();
        ctx.setLineDash([]);
      };
      vertical(velocity, color.quiet, [4, 4]);
      if (model) {
        for (const cap of [model.vSys - model.vExp, model.vSys + model.vExp]) vertical(cap, color.model, []);
        vertical(model.vSys, color.model, [2, 4]);
      }
      if (spectrum) {
        ctx.beginPath();
        let pen = false;
        order.channels.forEach((channel, position) => {
          const value = spectrum.brightness[channel] ?? null;
          if (value === null) {
            pen = false;
            return;
          }
          const [x, y] = [xOn(box, across, v[position]!), yOn(box, up, value)];
          if (pen) ctx.lineTo(x, y);
          else ctx.moveTo(x, y);
          pen = true;
        });
        ctx.strokeStyle = color.text;
        ctx.lineWidth = 1.5;
        ctx.stroke();
      }
      drawAxes(ctx, box, across, up, {
        text: color.text,
        line: color.control,
        font: `${typeScale.small[0]}px ${fonts.mono}, monospace`,
      });
    },
    [v, spectrum, axes.unit, velocity, model, order, color],
  );
  return (
    <PlotCanvas
      label={`Spectrum${spectrum ? ` of ${spectrum.over}` : ''}${model ? ', with the velocities of the model’s caps' : ''}. A press shows the channel of that velocity.`}
      height={height}
      draw={draw}
      onPoint={(x, _, width, tall) => {
        const box = boxOf(width, tall);
        const share = Math.min(Math.max((x - box.left) / box.width, 0), 1);
        const channel = order.channels[Math.round(share * (order.channels.length - 1))];
        if (channel !== undefined) showChannel(channel);
      }}
    />
  );
}
