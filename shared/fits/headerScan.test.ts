import fc from 'fast-check';
import { isProblem } from '@/shared/contract/problem';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { BLOCK, MAX_HEADER_BYTES, headerText, scanHeader } from './headerScan';

const SIMPLE = 'SIMPLE  =                    T';
const problemOf = (act: () => unknown) => {
  try {
    act();
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  return null;
};
const bytesOf = (text: string) => new TextEncoder().encode(text);

describe('scanHeader', () => {
  it('finds END in whichever block it stands, and says incomplete before', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 120 }),
        fc.integer({ min: 0, max: 12_000 }),
        (blanks, arrived) => {
          const header = headerBytesOf([SIMPLE, ...Array.from({ length: blanks }, () => 'HISTORY ENDED')]);
          const scan = scanHeader(header.subarray(0, arrived));
          if (arrived >= header.length)
            expect(scan).toEqual({ status: 'complete', headerBytes: header.length });
          else expect(scan).toEqual({ status: 'incomplete' });
        },
      ),
    );
  });

  it.each([
    ['one wrong byte', 'T', 'plain text'],
    ['a web page', '<!DOCTYPE html><html>', 'a web page'],
    ['a lone extension', "XTENSION= 'IMAGE'", 'without the primary header'],
    ['text', 'Dear all,', 'plain text'],
  ])('refuses %s at once', (_what, text, message) => {
    const problem = problemOf(() => scanHeader(bytesOf(text)));
    expect(problem?.type).toBe('not-fits');
    expect(problem?.detail).toContain(message);
  });

  it('says how to expand a gzip file', () => {
    expect(problemOf(() => scanHeader(new Uint8Array([0x1f, 0x8b, 8])))?.detail).toContain('gunzip');
  });

  it('waits for more of what may still be FITS', () => {
    expect(scanHeader(bytesOf(''))).toEqual({ status: 'incomplete' });
    expect(scanHeader(bytesOf('SIMP'))).toEqual({ status: 'incomplete' });
  });

  it('refuses a header that runs into its data', () => {
    const bytes = new Uint8Array(2 * BLOCK).fill(32);
    bytes.set(bytesOf(SIMPLE));
    bytes[BLOCK + 7] = 0;
    expect(problemOf(() => scanHeader(bytes))?.extra.card).toBe('END');
  });

  it('refuses a header without end', () => {
    const bytes = new Uint8Array(MAX_HEADER_BYTES + BLOCK).fill(32);
    bytes.set(bytesOf(SIMPLE));
    expect(problemOf(() => scanHeader(bytes))?.detail).toContain('36000 cards');
  });
});

it('shows bytes that are no ASCII harmlessly', () => {
  expect(headerText(new Uint8Array([65, 0xe9, 7, 66]))).toBe('A\ufffd\ufffdB');
});
