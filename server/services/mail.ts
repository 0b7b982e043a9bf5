import { makeMailer, type Mailer } from '../mail/mailer';
import { cubeFailed, cubeReady } from '../mail/messages';
import { findCube } from '../store/cubes';
import type { Db } from '../store/db';
import { findPerson } from '../store/people';
import { addJob } from '../store/queue';
import { findRegion } from '../store/regions';
import type { Parts } from './context';

export { makeMailer, type Mailer };

export interface MailTask {
  kind: 'cube-ready' | 'cube-failed';
  cubeId: string;
}

/** Queue a message with the change that it tells of; nothing where this installation sends no mail. */
export async function queueMail(db: Db, parts: Parts, task: MailTask): Promise<void> {
  if (parts.config.mail) await addJob(db, 'mail', { ...task }, `mail:${task.kind}:${task.cubeId}`);
}

/** Tell whoever uploaded the cube, if they gave an address. Throws when the mail server does not take it. */
export async function sendMail(parts: Parts, task: MailTask, mailer: Mailer): Promise<void> {
  const cube = await findCube(parts.db, task.cubeId);
  const person = cube?.createdById ? await findPerson(parts.db, cube.createdById) : undefined;
  const found = cube && (await findRegion(parts.db, cube.regionId));
  if (!cube || !found || !person?.email) return;
  const news = {
    to: person.email,
    name: person.name,
    cubeName: cube.name,
    regionName: found.region.name,
    url: `${parts.config.publicUrl ?? `http://${parts.config.host}:${parts.config.port}`}/cubes/${cube.id}`,
  };
  if (task.kind === 'cube-ready') await mailer.send(cubeReady(news));
  else if (cube.problem) await mailer.send(cubeFailed({ ...news, problem: cube.problem }));
}
