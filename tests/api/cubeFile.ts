/** Small cubes made in the test: the sky is invented, the header is what common software writes. */

import { seededRandom } from '@/shared/random';

const card = (keyword: string, value: string | number | boolean) => {
  const text =
    typeof value === 'string'
      ? `'${value.padEnd(8)}'`
      : typeof value === 'boolean'
        ? (value ? 'T' : 'F').padStart(20)
        : (Number.isInteger(value) ? `${value}` : value.toExponential(12).toUpperCase()).padStart(20);
  return `${keyword.padEnd(8)}= ${text}`.padEnd(80);
};

export interface CubeSpec {
  nx: number;
  ny: number;
  channels: number;
  /** Added to or put in place of the usual cards; null leaves a card out. */
  cards?: Record<string, string | number | boolean | null>;
  value?: (x: number, y: number, channel: number) => number;
}

/** Degrees a pixel and km/s a channel of these cubes. */
export const PIXEL = 0.05;
export const STEP = 1;
export const SHELL = { x: 32, y: 30, theta: 1, vSys: -40, vExp: 10 };

/** An expanding shell of unit brightness on nothing: enough to see and to fit. */
const shellAt = (x: number, y: number, channel: number): number => {
  const u = (channel * STEP - 56 - SHELL.vSys) / SHELL.vExp;
  if (Math.abs(u) >= 1) return 0;
  const ring = (SHELL.theta / PIXEL) * Math.sqrt(1 - u * u);
  const off = (Math.hypot(x - SHELL.x, y - SHELL.y) - ring) / 1.5;
  return Math.exp(-0.5 * off * off);
};

/** The same with a noise of 0.02, for what has to tell the shell from it. */
export const noisyShell = (x: number, y: number, channel: number): number => {
  const random = seededRandom((channel * 64 + y) * 64 + x);
  return shellAt(x, y, channel) + 0.02 * random.normal();
};

export function cubeFile({ nx, ny, channels, cards = {}, value = shellAt }: CubeSpec): Buffer {
  const header: Record<string, string | number | boolean | null> = {
    SIMPLE: true,
    BITPIX: -32,
    NAXIS: 3,
    NAXIS1: nx,
    NAXIS2: ny,
    NAXIS3: channels,
    CTYPE1: 'GLON-CAR',
    CRVAL1: 120,
    CRPIX1: (nx + 1) / 2,
    CDELT1: -PIXEL,
    CUNIT1: 'deg',
    CTYPE2: 'GLAT-CAR',
    CRVAL2: 0,
    CRPIX2: (ny + 1) / 2,
    CDELT2: PIXEL,
    CUNIT2: 'deg',
    CTYPE3: 'VRAD',
    CRVAL3: -56000,
    CRPIX3: 1,
    CDELT3: STEP * 1000,
    CUNIT3: 'm/s',
    SPECSYS: 'LSRK',
    RESTFRQ: 1420405751.768,
    BUNIT: 'K',
    BMAJ: 0.15,
    BMIN: 0.15,
    BPA: 0,
    ...cards,
  };
  const lines = Object.entries(header).flatMap(([k, v]) => (v === null ? [] : [card(k, v)]));
  const text = [...lines, 'END'.padEnd(80)].join('');
  const head = Buffer.from(text.padEnd(Math.ceil(text.length / 2880) * 2880));
  const data = Buffer.alloc(Math.ceil((nx * ny * channels * 4) / 2880) * 2880);
  let at = 0;
  for (let k = 0; k < channels; k++)
    for (let y = 0; y < ny; y++) for (let x = 0; x < nx; x++) at = data.writeFloatBE(value(x, y, k), at);
  return Buffer.concat([head, data]);
}

/** Marks around the shell's ring on a channel, in pixels. */
export const marksOnRing = (channel: number, count = 8) => {
  const u = (channel * STEP - 56 - SHELL.vSys) / SHELL.vExp;
  const ring = (SHELL.theta / PIXEL) * Math.sqrt(1 - u * u);
  return Array.from({ length: count }, (_, i) => ({
    channel,
    x: SHELL.x + ring * Math.cos((2 * Math.PI * i) / count),
    y: SHELL.y + ring * Math.sin((2 * Math.PI * i) / count),
    sigma: 0.05,
  }));
};
