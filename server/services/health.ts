import type { Health } from '@/shared/contract/events';
import { queueCounts } from '../store/queue';
import type { Parts } from './context';

/** Whether the parts run. Degraded: the database is away, or no worker is connected. */
export async function health({ db, config }: Parts): Promise<Health> {
  try {
    const queue = await queueCounts(db);
    return {
      status: queue.workers > 0 ? 'ok' : 'degraded',
      database: 'ok',
      queue,
      version: config.codeVersion,
    };
  } catch {
    return { status: 'degraded', database: 'down', queue: null, version: config.codeVersion };
  }
}
