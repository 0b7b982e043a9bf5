const SIGNATURE = [137, 80, 78, 71, 13, 10, 26, 10];
/** Signature, length, type, 13 bytes and check of the first chunk. */
const AFTER_HEADER = 8 + 8 + 13 + 4;

/**
 * A PNG file that says how large it is on paper: with a pHYs chunk after its header (PNG specification, 11.3.4.3).
 *
 * @param dotsPerInch written as dots a metre, rounded
 * @throws RangeError for bytes that are no PNG file
 */
export function pngWithDensity(png: Uint8Array, dotsPerInch: number): Uint8Array<ArrayBuffer> {
  if (!SIGNATURE.every((b, i) => png[i] === b)) throw new RangeError('These bytes are no PNG file.');
  const perMetre = Math.round(dotsPerInch / 0.0254);
  const chunk = new Uint8Array(21);
  const view = new DataView(chunk.buffer);
  view.setUint32(0, 9);
  chunk.set([0x70, 0x48, 0x59, 0x73], 4); // pHYs
  view.setUint32(8, perMetre);
  view.setUint32(12, perMetre);
  chunk[16] = 1; // the unit is the metre
  view.setUint32(17, crc32(chunk.subarray(4, 17)));
  const out = new Uint8Array(png.length + chunk.length);
  out.set(png.subarray(0, AFTER_HEADER));
  out.set(chunk, AFTER_HEADER);
  out.set(png.subarray(AFTER_HEADER), AFTER_HEADER + chunk.length);
  return out;
}

/** The check of PNG's chunks (its specification, annex D): polynomial 0xEDB88320, bits reversed. */
export function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (const byte of bytes) {
    crc ^= byte;
    for (let k = 0; k < 8; k++) crc = crc & 1 ? (crc >>> 1) ^ 0xedb88320 : crc >>> 1;
  }
  return (crc ^ 0xffffffff) >>> 0;
}
