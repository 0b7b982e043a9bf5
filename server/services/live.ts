import { Client } from 'pg';
import type { Logger } from 'pino';
import type { LiveEvent } from '@/shared/contract/events';
import { LIVE_CHANNEL } from '../store/events';

type Listener = (event: LiveEvent) => void;

/** Fans what the database announces out to the open pages of each team. */
export class LiveFeed {
  private readonly listeners = new Map<string, Set<Listener>>();
  private client: Client | null = null;
  private stopped = false;
  private retry: NodeJS.Timeout | undefined;

  constructor(
    private readonly url: string,
    private readonly log: Logger,
  ) {}

  /** LISTEN needs a connection of its own; a lost one is opened again. */
  async start(): Promise<void> {
    const client = new Client({ connectionString: this.url, application_name: 'outswell-live' });
    client.on('error', (error) => this.lost(client, error));
    client.on('end', () => this.lost(client));
    client.on('notification', ({ payload }) => {
      const { teamId, event } = JSON.parse(payload ?? '{}') as { teamId: string; event: LiveEvent };
      for (const listener of this.listeners.get(teamId) ?? []) listener(event);
    });
    await client.connect();
    await client.query(`listen ${LIVE_CHANNEL}`);
    this.client = client;
  }

  private lost(client: Client, error?: Error) {
    if (this.stopped || this.client !== client) return;
    this.client = null;
    this.log.warn({ error: error?.message }, 'the live feed lost the database and tries again');
    const again = () => {
      if (!this.stopped) this.start().catch(() => (this.retry = setTimeout(again, 1000)));
    };
    this.retry = setTimeout(again, 500);
  }

  subscribe(teamId: string, listener: Listener): () => void {
    const set = this.listeners.get(teamId) ?? new Set();
    this.listeners.set(teamId, set.add(listener));
    return () => {
      set.delete(listener);
      if (set.size === 0) this.listeners.delete(teamId);
    };
  }

  async stop(): Promise<void> {
    this.stopped = true;
    clearTimeout(this.retry);
    await this.client?.end().catch(() => undefined);
  }
}
