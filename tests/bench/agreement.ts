import sharp from 'sharp';
import type { Channel, Cube, Spectrum } from '@/shared/contract/cubes';
import { cookieOf } from '../api/uploading';
import type { NumpyReduction } from './numpyReduction';
import type { BenchProduct } from './product';

/** Largest difference found, and what is allowed: the precision in which one of the two works or stores it. */
export interface Agreement {
  what: string;
  difference: number;
  allowed: number;
}

/** Compare what ingest stored, read through the API, with what numpy found. */
export async function agreements(
  { lead, url }: BenchProduct,
  cubeId: string,
  numpy: NumpyReduction,
): Promise<Agreement[]> {
  const get = async <T>(path: string) => (await lead.get(`/cubes/${cubeId}${path}`).expect(200)).body as T;
  const raw = async (path: string) =>
    fetch(`${url}/api/v1/cubes/${cubeId}${path}`, { headers: { Cookie: cookieOf(lead, url) } });
  const cube = await get<Cube>('');
  const { items } = await get<{ items: Channel[] }>('/channels');
  const { brightness } = await get<Spectrum>('/spectrum');
  const ours = items.map((c) => [c.minimum, c.maximum, c.mean, c.rmsAboutZero, c.rms, c.blanks]);
  const scale = Math.max(...numpy.stats.map((s) => Math.abs(s[1] ?? 0)));
  const float32 = scale * 2 ** -23; // numpy's medians are float32
  const columns = ['minimum', 'maximum', 'mean', 'rms about zero', 'noise', 'blanks'];
  return [
    ...columns.map((what, i) => ({
      what,
      difference: largest(
        ours.map((row) => row[i]!),
        numpy.stats.map((row) => row[i]!),
      ),
      allowed: what === 'noise' ? 2 * float32 : i === 2 || i === 3 ? scale * 1e-12 : 0,
    })),
    {
      what: 'mean spectrum',
      difference: largest(brightness, numpy.spectrum),
      allowed: scale * 1e-12,
    },
    { what: 'brightness window', difference: largest(cube.window!, numpy.window), allowed: float32 },
    await totals(await raw('/maps/total'), numpy.total),
    await thumbnails(raw, items.length, numpy),
  ];
}

function largest(a: ArrayLike<number | null>, b: ArrayLike<number | null>): number {
  if (a.length !== b.length) return Infinity;
  let worst = 0;
  for (let i = 0; i < a.length; i++) {
    const [x, y] = [a[i] ?? NaN, b[i] ?? NaN];
    if (Number.isNaN(x) && Number.isNaN(y)) continue;
    const off = Math.abs(x - y);
    worst = off <= worst ? worst : Number.isNaN(off) ? Infinity : off;
  }
  return worst;
}

/** Stored as 16-bit numbers, right to half a step, of a map in float32. */
async function totals(answer: Response, expected: Float64Array): Promise<Agreement> {
  const header = (name: string) => Number(answer.headers.get(name));
  const [scale, offset, blank] = [header('Plane-Scale'), header('Plane-Offset'), header('Plane-Blank')];
  const stored = new Uint16Array(await answer.arrayBuffer());
  const values = Float64Array.from(stored, (n) => (n === blank ? NaN : offset + scale * n));
  const brightest = expected.reduce((most, v) => (Math.abs(v) > most ? Math.abs(v) : most), 0);
  return {
    what: 'total intensity',
    difference: largest(values, expected),
    allowed: scale / 2 + brightest * 2 ** -23,
  };
}

/** Ours have been through a lossy encoder: compared by the mean over all pixels, in grey levels of 255. */
async function thumbnails(
  raw: (path: string) => Promise<Response>,
  channels: number,
  { levels, thumbnail: [width, height] }: NumpyReduction,
): Promise<Agreement> {
  let sum = 0;
  for (let channel = 0; channel < channels; channel++) {
    const bytes = await (await raw(`/channels/${channel}/thumbnail`)).arrayBuffer();
    const { data, info } = await sharp(bytes).raw().toBuffer({ resolveWithObject: true });
    if (info.width !== width || info.height !== height) return { what, difference: Infinity, allowed: 4 };
    const at = channel * width * height;
    for (let i = 0; i < width * height; i++) sum += Math.abs(data[i * info.channels]! - levels[at + i]!);
  }
  return { what, difference: sum / levels.length, allowed: 4 };
}
const what = 'thumbnails, mean grey level of 255';
