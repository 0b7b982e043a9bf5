import { isProblem, Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { readHdu, type RestOfFile } from '@/shared/fits/findCube';
import type { ExpandedBytes } from './gunzip';

/** Bytes that are no FITS, behind the last HDU of a gzip file, before the file is taken for a trap. */
const MAX_JUNK = 16 * 2 ** 20;
const MAX_HDUS = 1000;
const PIECE = 2 ** 20;

/**
 * Expand what follows a cube, to the end of the gzip file or so far: that compares the checksums. Other HDUs may
 * follow, but not endless bytes that are none.
 *
 * @throws Problem compressed-damaged, too-large, fits-truncated when the cube's own data are cut short
 */
export async function expandRest(
  expanded: ExpandedBytes,
  head: CubeHead,
  rest: RestOfFile,
  { upTo = Infinity, signal }: { upTo?: number; signal?: AbortSignal },
): Promise<void> {
  const dataEnd = head.dataOffset + head.dataBytes;
  let end = Math.max(rest.start, dataEnd);
  for (let n = rest.index, isFits = true; ; n++) {
    const last = end + (isFits ? 0 : MAX_JUNK);
    for (let at = Math.max(expanded.position(), end - PIECE); at < last; at += PIECE) {
      signal?.throwIfAborted();
      if (at > upTo) return;
      if ((await expanded.read(at, PIECE)).length === PIECE) continue;
      requireWhole(dataEnd - expanded.size(), head);
      return;
    }
    if (!isFits) {
      throw new Problem(
        'too-large',
        `The gzip file goes on for more than ${MAX_JUNK} bytes after its FITS data: it is damaged or a trap. Compress the FITS file again.`,
      );
    }
    const next = await readHdu(expanded.read, end, expanded.size, n).catch((error: unknown) => {
      if (isProblem(error) && error.type !== 'compressed-damaged' && error.type !== 'too-large') return null;
      throw error;
    });
    isFits = next !== null && n < MAX_HDUS;
    end = next?.end ?? end;
  }
}

function requireWhole(missingBytes: number, { dataBytes, dataOffset }: CubeHead): void {
  if (missingBytes <= 0) return;
  throw new Problem(
    'fits-truncated',
    `The header declares ${dataBytes} bytes of data after byte ${dataOffset}; the expanded file ends ${missingBytes} bytes too early. Send the whole file.`,
    { missingBytes },
  );
}
