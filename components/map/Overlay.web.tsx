import { useCallback, useEffect, useMemo } from 'react';
import { drawOverlay } from '@/components/map/drawOverlay';
import { drawTools } from '@/components/map/drawTools';
import type { OverlayProps } from '@/components/map/Overlay';
import type { SceneColours } from '@/components/map/scene';
import { useCanvasLayer } from '@/components/map/useCanvasLayer';
import { useTheme } from '@/components/ui/theme';
import { fonts, typeScale } from '@/components/ui/tokens';
import type { Viewport } from '@/shared/image/viewport';

/** Marks, rings and coordinates over the picture, on a canvas of their own: moving them never repaints the picture. */
export function Overlay({ store, scene, tools }: OverlayProps) {
  const { color } = useTheme();
  const colours = useMemo<SceneColours>(
    () => ({
      person: color.personOnImage,
      model: color.modelOnImage,
      edge: color.edgeOnImage,
      text: color.onImage,
      shade: color.imageShade,
      font: `${typeScale.small[0]}px ${fonts.mono}, monospace`,
    }),
    [color],
  );
  const draw = useCallback(
    (ctx: CanvasRenderingContext2D, v: Viewport, ratio: number) => {
      drawOverlay(ctx, scene, v, colours, ratio, store.crosshair.get());
      if (!tools) return;
      const draft = store.ring.get();
      const ring = draft && tools.ring(draft);
      drawTools(ctx, tools, { ring, lasso: store.lasso.get() }, v, colours);
    },
    [scene, tools, colours, store],
  );
  const { canvas, schedule } = useCanvasLayer(store.viewport, draw);
  useEffect(() => {
    const stops = [store.crosshair, store.lasso, store.ring].map((value) => value.subscribe(schedule));
    return () => stops.forEach((stop) => stop());
  }, [store, schedule]);
  return (
    <canvas
      ref={canvas}
      data-testid="overlay"
      style={{ position: 'absolute', inset: 0, width: '100%', height: '100%', pointerEvents: 'none' }}
    />
  );
}
