/** Each gesture on the map by mouse, by finger and by keyboard, and what it leaves in the reading. */
import { marksOnRing, SHELL } from '../api/cubeFile';
import { newRegion, readyCube, saveMarks } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { openStage, shot, violations, type Stage } from './browser';
import {
  click,
  drag,
  finger,
  onPage,
  openShell,
  PHONE,
  readingOf,
  take,
  tap,
  WIDE,
  type Marked,
} from './markingHands';

jest.setTimeout(90_000);
let stage: Stage;
let lead: SignedIn;
let field: { regionId: string; cubeId: string };
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  const regionId = await newRegion(lead);
  field = { regionId, cubeId: await readyCube(stage.product, lead, regionId) };
});
afterAll(() => stage.close());

const saved = (shellId: string, done: (r: Marked) => boolean) => until(() => readingOf(lead, shellId), done);
const open = (screen = WIDE, shell?: string) =>
  openShell(stage, lead, field, { screen, ...(shell && { shell }) });
/** A shell whose channel 16 carries these marks already. */
async function marked(count: number, screen = WIDE) {
  const opened = await open(screen);
  await saveMarks(lead, opened.shellId, field.cubeId, marksOnRing(16, count));
  await opened.page.reload();
  await opened.page.getByRole('button', { name: 'Mark', exact: true }).waitFor();
  await opened.page.getByLabel(new RegExp(`, ${count} marks\\.`)).waitFor();
  return opened;
}
const at = (i: number, count: number) => marksOnRing(16, count)[i]!;

test('mouse: click places with half the beam as error, drag moves, Delete deletes, undo goes on after a reload', async () => {
  const { page, context, shellId, errors } = await open();
  await click(page, { x: 20, y: 40 });
  await click(page, { x: 44, y: 20 });
  const placed = await saved(shellId, (r) => r.marks.length === 2);
  expect(placed.marks[0]).toMatchObject({ channel: 16, placed: 'hand', sigma: 0.075 });
  expect(Math.hypot(placed.marks[0]!.x - 20, placed.marks[0]!.y - 40)).toBeLessThan(0.1);
  await drag(page, { x: 20, y: 40 }, { x: 25, y: 45 });
  const moved = await saved(shellId, (r) => Math.abs(r.marks[0]!.x - 25) < 0.1);
  expect(moved.marks[0]!.y).toBeCloseTo(45, 1);
  await page.keyboard.press('Delete');
  await saved(shellId, (r) => r.marks.length === 1);
  await page.reload();
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await saved(shellId, (r) => r.marks.length === 2 && Math.abs(r.marks[0]!.x - 20) < 0.1);
  await page.getByRole('button', { name: 'Redo', exact: true }).click();
  await saved(shellId, (r) => Math.abs(r.marks[0]!.x - 25) < 0.1);
  expect(errors).toEqual([]);
  await context.close();
});

test('mouse: a lasso, by its tool or with Shift, holds marks that are moved, called unsure, noted and deleted together', async () => {
  const { page, context, shellId } = await marked(8);
  const [right] = [at(0, 8)];
  await take(page, 'Lasso');
  const above = [
    { x: 5, y: 33 },
    { x: 60, y: 33 },
    { x: 60, y: 56 },
    { x: 5, y: 56 },
  ];
  await drag(page, ...above, above[0]!);
  await page.getByText('3 marks selected', { exact: true }).waitFor();
  await page.getByTestId('mark-details').getByRole('checkbox', { name: 'Unsure' }).click();
  await page.getByLabel('Note', { exact: true }).fill('behind a bright filament');
  await page.getByLabel('Note', { exact: true }).press('Enter');
  await page.getByLabel('Position error, °').fill('0.2');
  await page.getByLabel('Position error, °').press('Enter');
  const said = await saved(shellId, (r) => r.marks.filter((m) => m.sigma === 0.2).length === 3);
  for (const m of said.marks) expect([m.unsure ?? false, m.note !== undefined]).toEqual([m.y > 33, m.y > 33]);
  await shot(page, WIDE, 'marking-lasso');
  expect(await violations(page)).toEqual([]);
  await drag(page, at(2, 8), { x: at(2, 8).x, y: at(2, 8).y - 4 });
  const moved = await saved(
    shellId,
    (r) => r.marks.filter((m) => Math.abs(m.y - (at(1, 8).y - 4)) < 0.2).length === 2,
  );
  expect(moved.marks.find((m) => Math.abs(m.x - right!.x) < 0.1)!.y).toBeCloseTo(right!.y, 1);
  await take(page, 'Mark');
  await page.keyboard.press('Delete');
  await saved(shellId, (r) => r.marks.length === 5);
  await click(page, { x: 2, y: 2 }, ['Shift']); // nothing is placed with Shift
  const { x, y } = await onPage(page, { x: 4, y: 4 });
  await page.keyboard.down('Shift');
  await page.mouse.move(x, y);
  await page.mouse.down();
  for (const corner of [
    { x: 60, y: 4 },
    { x: 60, y: 31 },
    { x: 4, y: 31 },
  ]) {
    const to = await onPage(page, corner);
    await page.mouse.move(to.x, to.y, { steps: 4 });
  }
  await page.mouse.up();
  await page.keyboard.up('Shift');
  await page.getByText('5 marks selected', { exact: true }).waitFor();
  for (let i = 0; i < 5; i++) await page.getByRole('button', { name: 'Undo', exact: true }).click();
  const back = await saved(shellId, (r) => r.marks.length === 8 && r.marks.every((m) => !m.unsure));
  expect(back.marks.every((m) => m.sigma === 0.05 && m.note === undefined)).toBe(true);
  await context.close();
});

test('keyboard: the crosshair places, takes up, nudges by a tenth of the beam and with Shift by all of it', async () => {
  const { page, context, shellId } = await open();
  await page.getByTestId('map').focus();
  for (const key of ['ArrowUp', 'Enter']) await page.keyboard.press(key);
  const placed = await saved(shellId, (r) => r.marks.length === 1);
  await page.keyboard.press('Enter'); // takes up the mark under the crosshair
  await page.getByText('Mark 1 of 1', { exact: true }).waitFor();
  await page.keyboard.press('ArrowRight');
  await saved(shellId, (r) => Math.abs(r.marks[0]!.x - placed.marks[0]!.x - 0.3) < 1e-6);
  await page.keyboard.press('Shift+ArrowDown');
  await saved(shellId, (r) => Math.abs(placed.marks[0]!.y - r.marks[0]!.y - 3) < 1e-6);
  await page.keyboard.press('u');
  await saved(shellId, (r) => r.marks[0]!.unsure === true);
  expect(await page.getByRole('list', { name: /^Marks at/ }).innerText()).toContain('unsure');
  await page.keyboard.press('Escape');
  await page.keyboard.press('ArrowUp'); // the crosshair again
  await page.keyboard.press('Enter');
  await saved(shellId, (r) => r.marks.length === 2);
  await page.getByTestId('map').press('a');
  await page.getByText('2 marks selected', { exact: true }).waitFor();
  await page.keyboard.press('Delete');
  await saved(shellId, (r) => r.marks.length === 0);
  await context.close();
});

test('touch: a tap places, a long press magnifies and places where it is lifted, and takes a mark along', async () => {
  const { page, context, shellId, errors } = await open(PHONE);
  await tap(page, { x: 20, y: 40 });
  await saved(shellId, (r) => r.marks.length === 1);
  const hand = await finger(page);
  await hand.down({ x: 40, y: 30 });
  await page.getByTestId('magnifier').waitFor();
  await hand.to({ x: 44, y: 33 }, { x: 40, y: 30 });
  await shot(page, PHONE, 'marking-magnifier');
  await hand.up();
  const placed = await saved(shellId, (r) => r.marks.length === 2);
  expect(Math.hypot(placed.marks[1]!.x - 44, placed.marks[1]!.y - 33)).toBeLessThan(0.3);
  await page.getByTestId('magnifier').waitFor({ state: 'detached' });
  await hand.down({ x: 20, y: 40 });
  await page.getByTestId('magnifier').waitFor();
  await hand.to({ x: 24, y: 36 }, { x: 20, y: 40 });
  await hand.up();
  await saved(shellId, (r) => Math.hypot(r.marks[0]!.x - 24, r.marks[0]!.y - 36) < 0.3);
  expect(errors).toEqual([]);
  await context.close();
});

test('touch: a lasso from the menu of tools selects', async () => {
  const { page, context, shellId } = await marked(8, PHONE);
  await take(page, 'Lasso');
  await page.getByText('Draw around marks to select them.').waitFor();
  const hand = await finger(page);
  const line = [
    { x: 4, y: 33 },
    { x: 60, y: 33 },
    { x: 60, y: 56 },
    { x: 4, y: 56 },
  ];
  await hand.down(line[0]!);
  for (let i = 1; i < line.length; i++) await hand.to(line[i]!, line[i - 1]);
  await hand.up();
  await page.getByText('3 marks selected', { exact: true }).waitFor();
  await shot(page, PHONE, 'marking-lasso');
  expect(await violations(page)).toEqual([]);
  await page.getByRole('button', { name: 'Delete these marks' }).click();
  await saved(shellId, (r) => r.marks.length === 5);
  await context.close();
});

const centre = { x: SHELL.x, y: SHELL.y };
const onRim = (angle: number, r = 20) => ({
  x: SHELL.x + r * Math.cos((angle * Math.PI) / 180),
  y: SHELL.y + r * Math.sin((angle * Math.PI) / 180),
});

test('mouse: a ring from centre to rim is adjusted, partly erased, and becomes marks in one step', async () => {
  const { page, context, shellId } = await open();
  await take(page, 'Ring');
  await drag(page, { x: 31, y: 29 }, { x: 31 + 16, y: 29 });
  await page.getByRole('group', { name: 'Ring' }).getByText('8 marks').waitFor();
  await drag(page, { x: 31, y: 29 }, centre);
  await drag(page, onRim(0, 16), onRim(0));
  await drag(page, ...[100, 120, 140, 160, 180, 200].map((a) => onRim(a)));
  await page.getByText(/° seen/).waitFor();
  await page.getByRole('button', { name: 'More marks' }).click();
  await shot(page, WIDE, 'marking-ring');
  expect(await violations(page)).toEqual([]);
  await page.getByRole('button', { name: 'Place marks' }).click();
  const { marks } = await saved(shellId, (r) => r.marks.length === 9);
  for (const m of marks) {
    expect(Math.abs(Math.hypot(m.x - SHELL.x, m.y - SHELL.y) - 20)).toBeLessThan(0.4);
    const angle = (Math.atan2(m.y - SHELL.y, m.x - SHELL.x) * 180) / Math.PI;
    expect(angle > 98 || angle < -158).toBe(false);
    expect(m.placed).toBe('ring');
    expect(m.sigma).toBeGreaterThan(0.075); // nine marks on three quarters of a circle tell less each than eight on all of it
  }
  await page.getByRole('button', { name: 'Undo', exact: true }).click();
  await saved(shellId, (r) => r.marks.length === 0);
  await context.close();
});

test('touch: a ring by one finger', async () => {
  const { page, context, shellId } = await open(PHONE);
  await take(page, 'Ring');
  const hand = await finger(page);
  await hand.down(centre);
  await hand.to(onRim(-30), centre);
  await hand.up();
  await page.getByRole('button', { name: 'Place marks' }).waitFor();
  await shot(page, PHONE, 'marking-ring');
  expect(await violations(page)).toEqual([]);
  await page.getByRole('button', { name: 'Place marks' }).click();
  const { marks } = await saved(shellId, (r) => r.marks.length === 8);
  for (const m of marks) expect(Math.abs(Math.hypot(m.x - SHELL.x, m.y - SHELL.y) - 20)).toBeLessThan(1);
  await context.close();
});

test('keyboard: a ring is begun at the crosshair, moved, widened, partly erased and confirmed', async () => {
  const { page, context, shellId } = await open();
  await page.keyboard.press('r');
  await page.getByTestId('map').focus();
  for (const key of [
    'Enter',
    'ArrowRight',
    'Shift+ArrowUp',
    'Shift+ArrowUp',
    'e',
    'Shift+ArrowLeft',
    'e',
    ']',
  ])
    await page.keyboard.press(key);
  const bar = page.getByRole('group', { name: 'Ring' });
  await bar.getByText('9 marks').waitFor();
  await bar.getByText(/350° seen/).waitFor();
  await page.keyboard.press('Enter');
  const { marks } = await saved(shellId, (r) => r.marks.length === 9);
  expect(marks.every((m) => m.placed === 'ring')).toBe(true);
  await context.close();
});

test.each([WIDE, PHONE])(
  'suggested marks are taken and refused, one by one and all at once ($name)',
  async (screen) => {
    const { page, context, shellId } = await open(screen);
    const press = screen.touch ? tap : click;
    for (const i of [0, 3, 6]) await press(page, at(i, 8));
    const bar = page.getByRole('group', { name: 'Suggested marks' });
    await bar.waitFor();
    const offered = async () => Number(/^(\d+) mark/.exec(await bar.innerText())![1]);
    const first = await offered();
    expect(first).toBeGreaterThan(4);
    await shot(page, screen, 'marking-suggested');
    expect(await violations(page)).toEqual([]);
    if (!screen.touch) {
      const list = page.getByRole('list', { name: 'Suggested marks' });
      await list.getByRole('button', { name: /^Take/ }).first().click();
      await saved(shellId, (r) => r.marks.length === 4);
      await until(offered, (n) => n === first - 1);
      await list
        .getByRole('button', { name: /^Refuse/ })
        .first()
        .click();
      await until(offered, (n) => n === first - 2);
    }
    await bar.getByRole('button', { name: 'Take all' }).click();
    const { marks } = await saved(shellId, (r) => r.marks.length > 6);
    for (const m of marks.slice(3)) {
      expect(m.placed).toBe('suggested');
      expect(Math.abs(Math.hypot(m.x - SHELL.x, m.y - SHELL.y) - 20)).toBeLessThan(1);
    }
    await page.getByRole('button', { name: 'Undo', exact: true }).click();
    await bar.getByRole('button', { name: 'Refuse all' }).click();
    await bar.waitFor({ state: 'detached' });
    await context.close();
  },
);

test('the diagram sets a trial model by mouse and keyboard, its ring follows on the map, and the fit comes back', async () => {
  const { page, context, shellId } = await open();
  await saveMarks(
    lead,
    shellId,
    field.cubeId,
    [11, 14, 16, 19, 22].flatMap((k) => marksOnRing(k)),
  );
  await page.reload();
  const crown = page.getByTestId('handle-crown');
  await crown.waitFor();
  const fitted = await crown.getAttribute('aria-valuetext');
  const box = (await crown.boundingBox())!;
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width / 2 + 25, box.y + box.height / 2 + 20, { steps: 5 });
  await page.mouse.up();
  await page.getByRole('group', { name: 'Trial model' }).waitFor();
  const dragged = await crown.getAttribute('aria-valuetext');
  expect(dragged).not.toBe(fitted);
  const foot = page.getByTestId('handle-high');
  await foot.focus();
  const before = Number(await foot.getAttribute('aria-valuenow'));
  await page.keyboard.press('ArrowRight');
  await until(
    async () => Number(await foot.getAttribute('aria-valuenow')),
    (v) => Math.abs(v - before - 1) < 0.01,
  );
  await shot(page, WIDE, 'marking-trial');
  expect(await violations(page)).toEqual([]);
  await page.getByRole('button', { name: 'Fit from here' }).click();
  await page.getByText(/^Started from Θ/).waitFor();
  await page.getByRole('button', { name: 'Options of the fit' }).click();
  expect(await page.getByRole('checkbox', { name: /^Begin with Θ .*, set by hand$/ }).isChecked()).toBe(true);
  await shot(page, WIDE, 'marking-start');
  await page.getByRole('button', { name: 'Cancel' }).click();
  expect(await crown.getAttribute('aria-valuetext')).toBe(fitted);
  await page.getByRole('button', { name: 'Usual start' }).click();
  await foot.press('ArrowLeft');
  await page.getByRole('button', { name: 'Back to the fit' }).click();
  expect(await crown.getAttribute('aria-valuetext')).toBe(fitted);
  await context.close();
});

test('before any fit a trial model can be set', async () => {
  const { page, context } = await open();
  await page.getByRole('button', { name: 'Try a model by hand' }).click();
  await page.getByTestId('handle-low').focus();
  await page.keyboard.press('Shift+ArrowLeft');
  await page
    .getByRole('group', { name: 'Trial model' })
    .getByText(/v_exp 12\.\d/)
    .waitFor();
  await page.getByRole('button', { name: 'Put the trial away' }).click();
  await page.getByTestId('handle-low').waitFor({ state: 'detached' });
  await context.close();
});
