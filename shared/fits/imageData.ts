import { Problem } from '@/shared/contract/problem';
import { required } from './cubeAxes';
import type { Bitpix } from './cubeHead';
import type { Header } from './header';

/** @throws Problem when the HDU is no image: fits-card for SIMPLE = F, fits-shape for tables and random groups */
export function requireImage(header: Header): void {
  if (header.logical('SIMPLE') === false) {
    throw new Problem(
      'fits-card',
      'SIMPLE = F: the file says itself that it does not follow the FITS standard.',
      {
        card: 'SIMPLE',
      },
    );
  }
  const extension = header.text('XTENSION');
  if (extension !== null && extension !== 'IMAGE') {
    throw new Problem('fits-shape', `This part of the file is a table (${extension}), not an image.`, {
      card: 'XTENSION',
    });
  }
  if (header.logical('GROUPS') === true && header.integer('NAXIS1') === 0) {
    throw new Problem('fits-shape', 'The file holds random groups (visibilities), not an image.', {
      card: 'GROUPS',
    });
  }
}

/** @throws Problem fits-card */
export function bitpixOf(header: Header): Bitpix {
  const bitpix = required(header, 'BITPIX');
  if (![8, 16, 32, 64, -32, -64].includes(bitpix)) {
    throw new Problem('fits-card', `BITPIX must be 8, 16, 32, 64, -32 or -64; the header says ${bitpix}.`, {
      card: 'BITPIX',
    });
  }
  return bitpix as Bitpix;
}

/**
 * Bytes of the pixels of an image; nothing of that size is allocated here.
 *
 * @throws Problem fits-shape without axes, fits-card when an axis has no length or the product is beyond any file
 */
export function pixelBytes(naxis: number[], bitpix: Bitpix): number {
  if (naxis.length === 0) {
    throw new Problem('fits-shape', 'The file has a header and no image (NAXIS = 0).', { card: 'NAXIS' });
  }
  const empty = naxis.indexOf(0);
  if (empty >= 0) {
    const card = `NAXIS${empty + 1}`;
    throw new Problem('fits-card', `${card} = 0: the image has no pixels.`, { card });
  }
  return naxis.reduce((product, n) => product * n, Math.abs(bitpix) / 8);
}

/** @throws Problem fits-truncated, naming the bytes that a file of this size lacks; fits-card beyond any size */
export function requireBytes(dataOffset: number, dataBytes: number, fileSize: number | undefined): void {
  if (fileSize !== undefined && dataOffset + dataBytes > fileSize) {
    const missingBytes = dataOffset + dataBytes - fileSize;
    throw new Problem(
      'fits-truncated',
      `The header declares ${dataBytes} bytes of data after byte ${dataOffset}; the file ends ${missingBytes} bytes too early. Send the whole file.`,
      { missingBytes },
    );
  }
  if (!Number.isSafeInteger(dataOffset + dataBytes)) {
    throw new Problem(
      'fits-card',
      `The axes declare ${dataBytes.toPrecision(2)} bytes, more than any file has.`,
      { card: 'NAXIS' },
    );
  }
}

/** BSCALE, BZERO and BLANK. @throws Problem fits-card */
export function scalingOf(header: Header, bitpix: Bitpix, cautions: string[]) {
  const bscale = header.number('BSCALE') ?? 1;
  if (bscale === 0) {
    throw new Problem('fits-card', 'BSCALE = 0: all pixels would have one value.', { card: 'BSCALE' });
  }
  const bzero = header.number('BZERO') ?? 0;
  if (bitpix > 0 && Math.abs(bscale) * 2 ** bitpix + Math.abs(bzero) > 1e38) {
    const card = Math.abs(bzero) > 1e37 ? 'BZERO' : 'BSCALE';
    throw new Problem('fits-card', `${card} makes pixels larger than any number that is kept.`, { card });
  }
  if (bitpix < 0 && header.has('BLANK'))
    cautions.push('BLANK has no meaning for floating-point pixels and is ignored.');
  return {
    bscale,
    bzero,
    blank: bitpix > 0 ? (header.wideInteger('BLANK')?.toString() ?? null) : null,
  };
}
