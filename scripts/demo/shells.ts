import type { Fit, ModelName } from '@/shared/contract/fits';
import type { Reading } from '@/shared/contract/readings';
import type { Distance, Shell } from '@/shared/contract/shells';
import type { Trace } from '@/shared/contract/traces';
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
  if (planned.fit) await fitted(person(planned.fit.of), shell, planned);
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

/** The fits of a plan: of the marks, of other models, of the traced rim. What is there already is not made again. */
async function fitted(who: Client, { id, name }: Shell, { fit: plan, compare = {} }: PlannedShell) {
  const { id: readingId } = await who.get<Reading>(`/shells/${id}/readings/mine`);
  const first = await fitOf(who, id, { readingId: readingId!, model: 'sphere' });
  if (plan!.adopt && !first.adopted) await who.send('PATCH', `/shells/${id}`, { adoptedFitId: first.id });
  for (const model of compare.models ?? []) await fitOf(who, id, { readingId: readingId!, model });
  if (!compare.traced) return;
  const trace = await finished(
    `the rim of ${name}`,
    await usable<Trace>(who, `/shells/${id}/traces`, { fitId: first.id }),
    (traceId) => who.get<Trace>(`/traces/${traceId}`),
  );
  await fitOf(who, id, { readingId: trace.readingId!, model: 'sphere' });
}

/** A fit of that reading and model that is done. */
const fitOf = async (who: Client, shellId: string, draft: { readingId: string; model: ModelName }) =>
  finished(
    `the ${draft.model} fit of ${shellId}`,
    await usable<Fit>(who, `/shells/${shellId}/fits`, draft),
    (fitId) => who.get<Fit>(`/fits/${fitId}`),
  );

interface Job {
  id: string;
  status: Fit['status'];
  problem: { detail: string } | null;
}

/** The job of a list that was made from the draft and can still be used, or one begun now. */
async function usable<T extends Job>(who: Client, list: string, draft: object): Promise<T> {
  const same = (job: T) => Object.entries(draft).every(([key, value]) => job[key as keyof T] === value);
  const there = await who.list<T>(list);
  return (
    there.find((job) => same(job) && job.status !== 'failed' && job.status !== 'cancelled') ??
    who.send<T>('POST', list, draft)
  );
}

const finished = <T extends Job>(what: string, { id }: T, look: (id: string) => Promise<T>): Promise<T> =>
  until(what, async () => {
    const now = await look(id);
    if (now.status === 'failed' || now.status === 'cancelled')
      throw new Error(`${what} ended as ${now.status}: ${now.problem?.detail ?? ''}`);
    return now.status === 'done' ? now : null;
  });
