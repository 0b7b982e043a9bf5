import type { Request, Response } from 'express';
import { contextOf } from '../auth/requests';
import { requireTeam } from '../services/access';
import type { LiveFeed } from '../services/live';

/** Proxies close a silent connection after a minute or so. */
const KEEP_ALIVE_MS = 20_000;

/** Server-sent events (HTML Living Standard, 9.2): what changed in the person's team. */
export const eventsRoute = (feed: LiveFeed) => (req: Request, res: Response) => {
  const teamId = requireTeam(contextOf(req).actor);
  res.writeHead(200, {
    'Content-Type': 'text/event-stream',
    'Cache-Control': 'no-store',
    'X-Accel-Buffering': 'no',
  });
  res.write('retry: 2000\n\n');
  const unsubscribe = feed.subscribe(teamId, (event) => res.write(`data: ${JSON.stringify(event)}\n\n`));
  const beat = setInterval(() => res.write(':\n\n'), KEEP_ALIVE_MS);
  req.on('close', () => {
    clearInterval(beat);
    unsubscribe();
  });
};
