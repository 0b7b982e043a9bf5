import type { ProblemBody } from '@/shared/contract/problem';

/**
 * One file on its way to a region, as this browser knows it.
 *
 * queued: its turn comes · sending · paused: by the person · lost: no connection, goes on by itself ·
 * refused: the server said why · done: the cube exists.
 */
export interface UploadItem {
  id: string;
  regionId: string;
  fileName: string;
  size: number;
  sent: number;
  status: 'queued' | 'sending' | 'paused' | 'lost' | 'refused' | 'done';
  /** The server's id, once it has one. */
  uploadId: string | null;
  cubeId: string | null;
  problem: ProblemBody | null;
  /** Bytes sent at moments of the last seconds, for the rate. */
  samples: readonly { at: number; sent: number }[];
  /** Failed tries in a row; the wait before the next one grows with it. */
  losses: number;
}

export type UploadEvent =
  | { type: 'added'; items: readonly Pick<UploadItem, 'id' | 'regionId' | 'fileName' | 'size'>[] }
  | { type: 'started'; id: string }
  | { type: 'named'; id: string; uploadId: string }
  | { type: 'progressed'; id: string; sent: number; at: number }
  | { type: 'paused'; id: string }
  | { type: 'queued'; id: string }
  | { type: 'lost'; id: string }
  | { type: 'refused'; id: string; problem: ProblemBody }
  | { type: 'done'; id: string; cubeId: string | null }
  | { type: 'removed'; id: string };

/** Files sent at the same time: one fills most lines, a second one hides the pauses between requests. */
export const AT_ONCE = 2;
const WINDOW_MS = 6_000;

export function uploadsReducer(items: readonly UploadItem[], event: UploadEvent): readonly UploadItem[] {
  if (event.type === 'added')
    return [
      ...items,
      ...event.items.map((item): UploadItem => ({
        ...item,
        sent: 0,
        status: 'queued',
        uploadId: null,
        cubeId: null,
        problem: null,
        samples: [],
        losses: 0,
      })),
    ];
  if (event.type === 'removed') return items.filter((item) => item.id !== event.id);
  return items.map((item) => (item.id === event.id ? change(item, event) : item));
}

function change(item: UploadItem, event: Exclude<UploadEvent, { type: 'added' | 'removed' }>): UploadItem {
  const over = item.status === 'refused' || item.status === 'done';
  switch (event.type) {
    case 'named':
      return { ...item, uploadId: event.uploadId };
    case 'refused':
      return { ...item, status: 'refused', problem: event.problem, samples: [] };
    case 'done':
      return { ...item, status: 'done', sent: item.size, cubeId: event.cubeId, samples: [] };
    case 'progressed': {
      // a request that was stopped may still report what it sent
      if (item.status !== 'sending') return item;
      const recent = item.samples.filter((s) => event.at - s.at <= WINDOW_MS && s.sent <= event.sent);
      const losses = event.sent > item.sent ? 0 : item.losses;
      return { ...item, sent: event.sent, losses, samples: [...recent, { at: event.at, sent: event.sent }] };
    }
    case 'started':
      return over ? item : { ...item, status: 'sending', samples: [] };
    case 'paused':
      return over ? item : { ...item, status: 'paused', samples: [] };
    case 'queued':
      return over ? item : { ...item, status: 'queued' };
    case 'lost':
      return over || item.status === 'paused'
        ? item
        : { ...item, status: 'lost', samples: [], losses: item.losses + 1 };
  }
}

/** The files whose turn it is now. */
export function nextToStart(items: readonly UploadItem[]): UploadItem[] {
  const busy = items.filter((item) => item.status === 'sending' || item.status === 'lost').length;
  return items.filter((item) => item.status === 'queued').slice(0, Math.max(0, AT_ONCE - busy));
}

/** Bytes per second over the last seconds; null while there is too little to tell. */
export function rateOf({ samples }: Pick<UploadItem, 'samples'>): number | null {
  const first = samples[0];
  const last = samples[samples.length - 1];
  if (!first || !last || last.at - first.at < 500) return null;
  return ((last.sent - first.sent) / (last.at - first.at)) * 1000;
}

/** Seconds until the file is over at its present rate. */
export function timeLeft(item: UploadItem): number | null {
  const rate = rateOf(item);
  return rate !== null && rate > 0 ? (item.size - item.sent) / rate : null;
}

/** Milliseconds to wait after so many losses in a row: 1, 2, 4 … 15 s. */
export const waitAfter = (losses: number): number => Math.min(15_000, 1_000 * 2 ** Math.max(0, losses - 1));
