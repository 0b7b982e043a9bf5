import { useEffect, useRef } from 'react';
import type { ChannelTileProps } from '@/components/about/ChannelTile';

/** One thumbnail cut from the strip, whole and in its own shape. */
export function ChannelTile({ picture, index, count }: ChannelTileProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const target = canvas.current;
    const ctx = target?.getContext?.('2d');
    if (!target || !ctx || !picture) return;
    const width = picture.width / count;
    target.width = Math.round(width);
    target.height = picture.height;
    ctx.drawImage(picture.image, index * width, 0, width, picture.height, 0, 0, target.width, target.height);
  }, [picture, index, count]);
  return (
    <canvas
      ref={canvas}
      aria-hidden
      style={{ display: 'block', width: '100%', height: '100%', objectFit: 'contain' }}
    />
  );
}
