import type { Knex } from 'knex';
import type { Logger } from 'pino';
import type { Role } from '@/shared/contract/permissions';
import type { Config } from '../config';
import type { CubeStore } from '../files/cubeStore';

/** Who asks: a person with the role held in the one team, or with none yet. */
export interface Actor {
  id: string;
  login: string;
  name: string;
  email: string | null;
  team: { id: string; name: string } | null;
  role: Role | null;
}

/** What every service needs, made once a process. */
export interface Parts {
  db: Knex;
  config: Config;
  log: Logger;
  cubeFiles: CubeStore;
}

/** The same with the person whose request this is. */
export interface Context extends Parts {
  actor: Actor;
}
