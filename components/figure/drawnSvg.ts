/** Draws an SVG file on a canvas of a width in pixels. */
export async function drawnSvg(svg: string, widthPx: number): Promise<HTMLCanvasElement> {
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  await image.decode();
  const canvas = document.createElement('canvas');
  canvas.width = Math.round(widthPx);
  canvas.height = Math.round((widthPx * image.naturalHeight) / image.naturalWidth);
  const ctx = canvas.getContext('2d');
  if (!ctx) throw new Error('This browser cannot draw the picture.');
  ctx.drawImage(image, 0, 0, canvas.width, canvas.height);
  return canvas;
}

/** A canvas as the bytes of a PNG file. */
export const pngBytes = (canvas: HTMLCanvasElement): Promise<Uint8Array<ArrayBuffer>> =>
  new Promise((resolve, reject) =>
    canvas.toBlob((blob) => {
      if (!blob) return reject(new Error('This browser could not write the picture; try a smaller width.'));
      blob.arrayBuffer().then((buffer) => resolve(new Uint8Array(buffer)), reject);
    }, 'image/png'),
  );
