import { basename, extname } from 'node:path';

/** A name to show, never a path: what the browser calls the file, without folders and control characters. */
export const safeName = (name: string | null | undefined, fallback: string): string =>
  basename((name ?? '').replaceAll('\\', '/'))
    .replace(/[\u0000-\u001f\u007f]/g, '')
    .slice(0, 200) || fallback;

/** The file's name without its endings: `field.fits.gz` is called `field`. */
export function bareName(fileName: string): string {
  const bare = fileName.replace(/\.(gz|fz)$/i, '');
  return basename(bare, extname(bare)) || fileName;
}
