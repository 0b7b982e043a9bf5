import { cubeCommands } from '@/components/cube/cubeCommands';
import type { CubeSession } from '@/components/cube/cubeSession';
import { commandFor } from '@/components/ui/commands/command';

const session = (more: object = {}) =>
  ({
    shell: { id: 's' },
    mayMark: true,
    tool: 'mark',
    chosen: [{ id: 'm' }],
    marks: [],
    ghosts: [],
    next: [],
    channel: 0,
    order: { channels: [0, 1, 2] },
    velocity: 1,
    live: {
      readings: [
        { velocity: 0, channel: 0 },
        { velocity: 2, channel: 2 },
      ],
    },
    look: { palette: 'Ink', tone: 'even', setPalette: jest.fn(), setTone: jest.fn() },
    reading: { state: { ready: true }, dispatch: jest.fn() },
    store: {},
    stepChannel: jest.fn(),
    showChannel: jest.fn(),
    removeMarks: jest.fn(),
    setTool: jest.fn(),
    selectMany: jest.fn(),
    describeMarks: jest.fn(),
    setSuggesting: jest.fn(),
    takeGhosts: jest.fn(),
    select: jest.fn(),
    ...more,
  }) as unknown as CubeSession;
const press = (key: string, held: object = {}) => ({
  key,
  shiftKey: false,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  ...held,
});
const view = { onLook: jest.fn(), onRun: null };

test('no two commands share a key or a name', () => {
  const commands = cubeCommands(session(), { ...view, onRun: jest.fn() });
  const keys = commands.flatMap((c) => c.keys ?? []);
  expect(new Set(keys).size).toBe(keys.length);
  expect(new Set(commands.map((c) => c.name)).size).toBe(commands.length);
});

test('arrows step channels, with Shift five at a time; undo and redo answer both ways', () => {
  const s = session();
  const run = (key: string, held = {}) => commandFor(cubeCommands(s, view), press(key, held))?.perform();
  run('ArrowRight');
  run('ArrowLeft', { shiftKey: true });
  expect(s.stepChannel).toHaveBeenNthCalledWith(1, 1);
  expect(s.stepChannel).toHaveBeenNthCalledWith(2, -5);
  run('z', { ctrlKey: true });
  run('Z', { ctrlKey: true, shiftKey: true });
  run('z');
  run('Z', { shiftKey: true });
  expect((s.reading.dispatch as jest.Mock).mock.calls.map(([a]) => a.type)).toEqual([
    'undo',
    'redo',
    'undo',
    'redo',
  ]);
  run('.');
  run(',');
  expect((s.showChannel as jest.Mock).mock.calls).toEqual([[2], [0]]);
  run('Delete');
  expect(s.removeMarks).toHaveBeenCalledWith(['m']);
});

test('who may not mark has no marking keys', () => {
  const s = session({ mayMark: false });
  for (const key of ['m', 'Delete', 'z']) expect(commandFor(cubeCommands(s, view), press(key))).toBeNull();
});
