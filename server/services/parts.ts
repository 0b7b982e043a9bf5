import pino from 'pino';
import type { Config } from '../config';
import { makeCubeStore } from '../files/cubeStore';
import { openDatabase } from '../store/db';
import type { Parts } from './context';

/** Open what every service needs. Whoever calls this closes `db` and `cubeFiles` at the end. */
export function makeParts(config: Config, name: 'server' | 'worker'): Parts {
  return {
    config,
    db: openDatabase(config.databaseUrl),
    log: pino({ name, level: config.logLevel, base: { name }, errorKey: 'error' }),
    cubeFiles: makeCubeStore(config),
  };
}
