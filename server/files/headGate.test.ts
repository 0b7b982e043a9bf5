import { randomBytes } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { HeadGate } from './headGate';

const CUBE = [
  ...['BITPIX  = -32', 'NAXIS   = 3', 'NAXIS1  = 64', 'NAXIS2  = 64', 'NAXIS3  = 16'],
  ...[
    "CTYPE1  = 'GLON-CAR'",
    "CTYPE2  = 'GLAT-CAR'",
    "CTYPE3  = 'VRAD'",
    'CDELT3  = 1000.0',
    "BUNIT   = 'K'",
  ],
];
const SIMPLE = 'SIMPLE  =                    T';
const data = randomBytes(64 * 64 * 16 * 4);
const cube = Buffer.concat([headerBytesOf([SIMPLE, ...CUBE]), data]);
const flat = Buffer.concat([
  headerBytesOf([SIMPLE, ...CUBE.map((c) => c.replace('= 3', '= 2'))]),
  data.subarray(0, 64 * 64 * 4),
]);
const empty = headerBytesOf([SIMPLE, 'BITPIX  = 8', 'NAXIS   = 0']);
const table = (bytes: number) =>
  Buffer.concat([
    headerBytesOf([
      "XTENSION= 'BINTABLE'",
      ...['BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 1', `NAXIS2  = ${bytes}`, 'PCOUNT  = 0', 'GCOUNT  = 1'],
    ]),
    Buffer.alloc(Math.ceil(bytes / 2880) * 2880),
  ]);
const extension = Buffer.concat([headerBytesOf(["XTENSION= 'IMAGE'", ...CUBE]), data]);

/** Send the bytes in chunks; how many had passed when the gate had decided. */
async function send(bytes: Buffer, chunk: number, limit = 2 ** 40) {
  const gate = new HeadGate(bytes.length, limit);
  async function* chunks() {
    for (let at = 0; at < bytes.length; at += chunk) yield bytes.subarray(at, at + chunk);
  }
  const passed: Buffer[] = [];
  let decidedAt: number | null = null;
  let length = 0;
  for await (const piece of gate.pass(chunks())) {
    passed.push(piece);
    length += piece.length;
    if (decidedAt === null && gate.accepted) decidedAt = length;
  }
  return { gate, passed: Buffer.concat(passed), decidedAt };
}

describe('a gzip file on its way', () => {
  it.each([1, 100, 4096, 1e9])('passes unchanged in chunks of %i when it holds a cube', async (chunk) => {
    const bytes = gzipSync(cube);
    const { gate, passed, decidedAt } = await send(
      bytes.subarray(0, chunk === 1 ? 5000 : bytes.length),
      chunk,
    );
    expect(gate.problem).toBeNull();
    if (chunk > 1) expect(passed.equals(bytes)).toBe(true);
    if (chunk <= 4096) expect(decidedAt).toBeLessThan(bytes.length / 4);
  });

  it.each([
    ['a picture', gzipSync(Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47]), data])), 'not-fits'],
    ['gzip again', gzipSync(gzipSync(cube)), 'not-fits'],
    [
      'no deflate',
      Buffer.concat([Buffer.from([0x1f, 0x8b, 8, 0, 0, 0, 0, 0, 0, 3]), data]),
      'compressed-damaged',
    ],
    [
      'a header that never ends',
      gzipSync(Buffer.concat([Buffer.from(SIMPLE.padEnd(80)), Buffer.alloc(12e6, 'COMMENT '.padEnd(80))])),
      'fits-card',
    ],
  ])('is refused early when it holds %s', async (_what, bytes, type) => {
    const { gate, passed } = await send(bytes, 4096);
    expect(gate.problem).toMatchObject({ type });
    expect(passed.length).toBeLessThan(0.3 * bytes.length + 8192);
  });

  it('is refused at its end when it holds a flat image and nothing more', async () => {
    expect((await send(gzipSync(flat), 4096)).gate.problem).toMatchObject({ type: 'fits-shape' });
  });

  it('is refused early when its header claims more than the limit, or than gzip can hold', async () => {
    expect((await send(gzipSync(cube), 4096, 100_000)).gate.problem).toMatchObject({ type: 'too-large' });
    const huge = headerBytesOf([SIMPLE, ...CUBE.map((c) => c.replace('= 64', '= 64000'))]);
    const { gate } = await send(gzipSync(Buffer.concat([huge, data])), 4096);
    expect(gate.problem).toMatchObject({ type: 'fits-truncated' });
  });

  it('is passed on without judgement when the cube lies far inside, with little memory', async () => {
    const bytes = gzipSync(Buffer.concat([empty, table(80e6), extension]));
    const before = process.memoryUsage.rss();
    const { gate, passed } = await send(bytes.subarray(0, bytes.length), 65_536);
    expect(gate).toMatchObject({ problem: null, accepted: false });
    expect(passed.length).toBe(bytes.length);
    expect(process.memoryUsage.rss() - before).toBeLessThan(150e6);
  });
});

it('judges a plain file as before', async () => {
  expect((await send(cube, 1000)).gate.accepted).toBe(true);
  expect((await send(flat, 1000)).gate.problem).toMatchObject({ type: 'fits-shape' });
});
