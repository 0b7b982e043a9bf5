import type { Fit } from '@/shared/contract/fits';
import type { Reading } from '@/shared/contract/readings';
import type { Distance, Shell } from '@/shared/contract/shells';
import { marksOf } from '@/shared/synthetic/marksOf';
import type { Client } from './client';
import type { PlannedCube, PlannedShell } from './plan';
import { until } from './until';

export interface ShellPlace {
  regionId: string;
  cubeId: string;
  cube: PlannedCube;
  people: Map<string, Client>;
}

/**
 * One planned shell: named, marked, fitted, adopted, its distance entered. What is there already, by name, stays as it
 * is. The cube must have been read.
 */
export async function makeShell(planned: PlannedShell, place: ShellPlace): Promise<Shell> {
  const person = (login: string) => place.people.get(login)!;
  const owner = person(planned.readings[0]!.by);
  const shell = await namedShell(owner, place.regionId, planned);
  for (const { by, style } of planned.readings) await markedBy(person(by), shell, planned, place, style);
  if (planned.fit) await fitted(person(planned.fit.of), shell, planned.fit.adopt);
  if (planned.distance) {
    const entries = await owner.list<Distance>(`/shells/${shell.id}/distances`);
    if (entries.length === 0) await owner.send('POST', `/shells/${shell.id}/distances`, planned.distance);
  }
  return owner.get<Shell>(`/shells/${shell.id}`);
}

async function namedShell(who: Client, regionId: string, { name, note = '' }: PlannedShell): Promise<Shell> {
  const there = await who.list<Shell>(`/regions/${regionId}/shells`);
  return (
    there.find((s) => s.name === name) ?? who.send('POST', `/regions/${regionId}/shells`, { name, note })
  );
}

async function markedBy(
  who: Client,
  { id }: Shell,
  { name }: PlannedShell,
  { cubeId, cube }: ShellPlace,
  style: PlannedShell['readings'][number]['style'],
): Promise<void> {
  const mine = await who.get<Reading>(`/shells/${id}/readings/mine`);
  if (mine.marks.length > 0) return;
  const truth = cube.recipe.shells.find((s) => s.name === name);
  if (!truth) throw new Error(`there is no shell ${name} in the recipe of ${cube.fileName}`);
  const marks = marksOf(cube.recipe, truth, style).map((mark, i) => ({ id: `demo-${i}`, ...mark }));
  await who.send('PUT', `/shells/${id}/readings/mine`, { cubeId, marks, revision: mine.revision });
}

/** A fit of record that is done, run now where there is none, and adopted where it should be. */
async function fitted(who: Client, { id, name }: Shell, adopt: boolean): Promise<void> {
  const fits = await who.list<Fit>(`/shells/${id}/fits`);
  const usable = fits.find((fit) => fit.status !== 'failed' && fit.status !== 'cancelled');
  const { id: fitId } = usable ?? (await runFit(who, id));
  const fit = await until(`the fit of ${name}`, async () => {
    const now = await who.get<Fit>(`/fits/${fitId}`);
    if (now.status === 'failed' || now.status === 'cancelled')
      throw new Error(`the fit of ${name} ended as ${now.status}: ${now.problem?.detail ?? ''}`);
    return now.status === 'done' ? now : null;
  });
  if (adopt && !fit.adopted) await who.send('PATCH', `/shells/${id}`, { adoptedFitId: fit.id });
}

async function runFit(who: Client, shellId: string): Promise<Fit> {
  const reading = await who.get<Reading>(`/shells/${shellId}/readings/mine`);
  return who.send('POST', `/shells/${shellId}/fits`, { readingId: reading.id });
}
