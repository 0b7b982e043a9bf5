import { closeSync, openSync, writeSync } from 'node:fs';
import { seededRandom } from '@/shared/random';
import { cubeFile, STEP } from '../api/cubeFile';

/** A side of the cubes that ingest is measured with, and their channels: 512 MiB in float32. */
export const SIDE = 512;

export type Order = 'spectral-last' | 'spectral-first' | 'int16';
export const ORDERS: Order[] = ['spectral-last', 'spectral-first', 'int16'];

const TABLE = 2 ** 20;
const NOISE = 0.5;
const SCALE = 0.001;
const BLANK_SIDE = 60;
const BLANK = -32768;

const CARDS = {
  lon: { CTYPE: 'GLON-CAR', CRVAL: 120, CRPIX: (SIDE + 1) / 2, CDELT: -0.05, CUNIT: 'deg' },
  lat: { CTYPE: 'GLAT-CAR', CRVAL: 0, CRPIX: (SIDE + 1) / 2, CDELT: 0.05, CUNIT: 'deg' },
  spec: { CTYPE: 'VRAD', CRVAL: -56000, CRPIX: 1, CDELT: STEP * 1000, CUNIT: 'm/s' },
};

function headerOf(order: Order): Buffer {
  const axes = order === 'spectral-first' ? ['spec', 'lon', 'lat'] : ['lon', 'lat', 'spec'];
  const cards: Record<string, string | number> = {};
  axes.forEach((axis, i) => {
    for (const [name, value] of Object.entries(CARDS[axis as keyof typeof CARDS]))
      cards[`${name}${i + 1}`] = value;
  });
  const scaled: Record<string, number> =
    order === 'int16' ? { BITPIX: 16, BSCALE: SCALE, BZERO: 0, BLANK } : {};
  const one = cubeFile({
    nx: 1,
    ny: 1,
    channels: 1,
    cards: { ...cards, ...scaled, NAXIS1: SIDE, NAXIS2: SIDE, NAXIS3: SIDE },
  });
  return one.subarray(0, one.length - 2880);
}

/**
 * Write one of the cubes of the ingest benchmark: the same sky each time, a line that drifts over it, noise, a blank
 * corner. Normal numbers are drawn once and read from another place for each run.
 */
export function writeIngestCube(path: string, order: Order): void {
  const random = seededRandom(2026);
  const normals = Float32Array.from({ length: TABLE }, () => NOISE * random.normal());
  const line = (x: number, y: number, k: number) => {
    const off = (k * STEP - 240 - 8 * Math.sin(x / 90) - 6 * Math.cos(y / 70)) / 18;
    return off * off > 40 ? 0 : 12 * Math.exp(-0.5 * off * off);
  };
  const file = openSync(path, 'w');
  try {
    writeSync(file, headerOf(order));
    const size = order === 'int16' ? 2 : 4;
    const bytes = Buffer.alloc(SIDE * SIDE * size);
    const put =
      order === 'int16' ? putScaled : (b: Buffer, v: number, at: number) => void b.writeFloatBE(v, at);
    for (let slow = 0; slow < SIDE; slow++) {
      let at = 0;
      for (let middle = 0; middle < SIDE; middle++) {
        const start = Math.floor(random.uniform() * (TABLE - SIDE));
        for (let fast = 0; fast < SIDE; fast++, at += size) {
          const [x, y, k] = order === 'spectral-first' ? [middle, slow, fast] : [fast, middle, slow];
          put(bytes, x + y < BLANK_SIDE ? NaN : normals[start + fast]! + line(x, y, k), at);
        }
      }
      writeSync(file, bytes);
    }
    const over = (SIDE ** 3 * size) % 2880;
    if (over > 0) writeSync(file, Buffer.alloc(2880 - over));
  } finally {
    closeSync(file);
  }
}

const putScaled = (bytes: Buffer, value: number, at: number) =>
  void bytes.writeInt16BE(Number.isNaN(value) ? BLANK : Math.round(value / SCALE), at);
