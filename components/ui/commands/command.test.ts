import { commandFor, matches, readable, type Command, type KeyPress } from './command';

const press = (key: string, held: Partial<KeyPress> = {}): KeyPress => ({
  key,
  shiftKey: false,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  ...held,
});

test.each([
  ['ArrowRight', press('ArrowRight'), true],
  ['ArrowRight', press('ArrowRight', { shiftKey: true }), false],
  ['Shift+ArrowRight', press('ArrowRight', { shiftKey: true }), true],
  ['Mod+z', press('z', { ctrlKey: true }), true],
  ['Mod+z', press('z', { metaKey: true }), true],
  ['Mod+z', press('Z', { ctrlKey: true, shiftKey: true }), false],
  ['z', press('z', { ctrlKey: true }), false],
  ['?', press('?', { shiftKey: true }), true],
  ['+', press('+', { shiftKey: true }), true],
])('%s against %j: %s', (keys, pressed, expected) => expect(matches(keys, pressed)).toBe(expected));

test('the command registered last answers a key that two share, unless it is switched off', () => {
  const make = (name: string, enabled = true): Command => ({
    name,
    label: name,
    keys: ['u'],
    enabled,
    perform: () => undefined,
  });
  expect(commandFor([make('frame'), make('screen')], press('u'))?.name).toBe('screen');
  expect(commandFor([make('frame'), make('screen', false)], press('u'))?.name).toBe('frame');
  expect(commandFor([make('frame', false)], press('u'))).toBeNull();
});

test('keys are shown as signs', () => {
  expect(readable('Mod+z')).toEqual(['Ctrl', 'Z']);
  expect(readable('Shift+ArrowLeft')).toEqual(['Shift', '←']);
  expect(readable('+')).toEqual(['+']);
});
