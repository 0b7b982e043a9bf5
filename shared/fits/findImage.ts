import { Problem } from '@/shared/contract/problem';
import { readHdu, type Hdu, type ReadBytes } from './findCube';
import { describeImage, type ImageHead } from './imageHead';

const MAX_HDUS = 1000;

export interface FoundImage {
  head: ImageHead;
  hdu: Hdu;
}

/**
 * Find the first image of the sky in a FITS file (or look at the chosen HDU) and describe it, reading headers only.
 *
 * @param read bytes of the file; offsets are asked for in rising order
 * @param size bytes of the whole file
 * @throws Problem not-fits, fits-card, fits-image, fits-truncated; invalid-input (field hdu) when there is no such HDU;
 *         of several HDUs without an image of the sky, the first image's refusal
 */
export async function findImage(
  read: ReadBytes,
  size: number,
  { hdu }: { hdu?: number } = {},
): Promise<FoundImage> {
  if (size === 0) throw new Problem('not-fits', 'The file is empty.');
  let offset = 0;
  let refusal: Problem | null = null;
  for (let n = 0; n < MAX_HDUS; n++) {
    const found = await readHdu(read, offset, size, n);
    if (found === null) break;
    if (hdu === undefined ? found.hasImage || n === 0 : n === hdu) {
      const head = tryDescribe(found, size);
      if (!(head instanceof Problem)) return { head, hdu: found };
      if (hdu !== undefined || head.type !== 'fits-image') throw head;
      if (found.hasImage || head.extra.card === 'GROUPS') refusal ??= head;
    }
    offset = found.end;
  }
  if (hdu !== undefined) {
    throw new Problem('invalid-input', `The file has no HDU ${hdu} (they count from 0).`, { field: 'hdu' });
  }
  throw (
    refusal ??
    new Problem('fits-image', 'The file holds no image. Send a FITS file with an image of the sky.', {
      card: 'NAXIS',
    })
  );
}

function tryDescribe({ header, start, index }: Hdu, size: number): ImageHead | Problem {
  try {
    return describeImage(header, size, { offset: start, hdu: index });
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
}
