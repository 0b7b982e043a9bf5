import type { Cube } from '@/shared/contract/cubes';
import type { Region } from '@/shared/contract/regions';
import type { Client } from './demo/client';
import { cubeInRegion, untilReady } from './demo/cubes';
import { PLAN, UPLOADER, type PlannedCube, type PlannedRegion } from './demo/plan';
import { makeShell } from './demo/shells';
import { gatherTeam } from './demo/team';

const say = (line: string) => process.stdout.write(`${line}\n`);

/**
 * Fill an empty installation through its own API, as its people would: team, regions, cubes, marks, fits, a distance.
 * Started again after it was stopped half-way, it goes on with what is missing.
 */
async function main(base: string | undefined): Promise<void> {
  if (!base) throw new Error('OUTSWELL_URL has to say where Outswell is served');
  const people = await gatherTeam(base);
  say(`${people.size} people have signed in and are one team.`);
  const work: Promise<void>[] = [];
  for (const planned of PLAN) {
    const region = await regionNamed(people.get('ansa')!, planned);
    for (const cube of planned.cubes) {
      const sent = await cubeInRegion(people.get(UPLOADER)!, region.id, cube);
      say(`${cube.fileName} is in ${region.name}.`);
      // the next cube is made while the worker reads this one
      const rest = finishCube(people, region, cube, sent);
      rest.catch(() => undefined); // heard below, with the others
      work.push(rest);
    }
  }
  await Promise.all(work);
}

async function regionNamed(who: Client, { draft }: PlannedRegion): Promise<Region> {
  const regions = await who.list<Region>('/regions');
  return regions.find((region) => region.name === draft.name) ?? who.send('POST', '/regions', draft);
}

async function finishCube(people: Map<string, Client>, region: Region, cube: PlannedCube, sent: Cube) {
  const ready = await untilReady(people.get(UPLOADER)!, sent);
  for (const planned of cube.shells) {
    const shell = await makeShell(planned, { regionId: region.id, cubeId: ready.id, cube, people });
    say(
      `${shell.name}: ${shell.designation ?? (planned.fit ? 'fitted, nothing adopted' : 'marked, not fitted')}.`,
    );
  }
}

main(process.env.OUTSWELL_URL).catch((error: unknown) => {
  const why = error instanceof Error ? error.message : String(error);
  process.stderr.write(`The demo could not be made: ${why}\n`);
  process.exitCode = 1;
});
