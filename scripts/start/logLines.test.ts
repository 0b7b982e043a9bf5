import { readable } from './logLines.mjs';

const at = new Date(2026, 4, 3, 17, 4, 9);
const json = (fields: object) =>
  JSON.stringify({ level: 30, time: at.getTime(), pid: 1, hostname: 'h', ...fields });

test.each([
  ['a message', json({ msg: 'listening' }), 'listening'],
  ['its fields', json({ msg: 'fit done', fitId: 'f1', seconds: 2.5 }), 'fit done  fitId=f1 seconds=2.5'],
  ['a list or record among them', json({ msg: 'x', axes: [1, 2] }), 'x  axes=[1,2]'],
  ['nothing for null', json({ msg: 'x', cubeId: null }), 'x'],
  ['a warning by name', json({ level: 40, msg: 'slow' }), 'WARN  slow'],
  [
    'a request as one reads it',
    json({
      req: { id: 3, method: 'GET', url: '/api/v1/regions' },
      res: { statusCode: 200 },
      responseTime: 12,
      msg: 'request completed',
    }),
    'GET /api/v1/regions 200 12 ms',
  ],
  ['text that is no JSON', 'plain text', 'plain text'],
  ['JSON that is not one of our lines', '{"a":1}', '{"a":1}'],
  ['JSON cut off', '{"level":30,', '{"level":30,'],
])('shows %s', (_, line, shown) => {
  expect(readable('server', line, at)).toBe(`17:04:09 server ${shown}`);
});

test.each(['err', 'error'])('shows the trace under %s below it', (key) => {
  const line = json({
    level: 50,
    msg: 'ingest failed',
    [key]: { message: 'no', stack: 'Error: no\n  at x' },
  });
  expect(readable('worker', line)).toBe(
    '17:04:09 worker ERROR  ingest failed\n         | Error: no\n         |   at x',
  );
});
