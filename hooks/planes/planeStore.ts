import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { pace, type Pace } from '@/hooks/planes/pace';

/** Longest side of a plane as asked for; null: as it is in the cube. */
export type PlaneSize = number | null;

export interface PlaneStoreOptions {
  load: (channel: number, size: PlaneSize, signal: AbortSignal) => Promise<ChannelPlane>;
  /** The cube's longest side in pixels. */
  side: number;
  channels: number;
  /** What the planes held may take together. */
  budgetBytes: number;
  /** Requests at a time. */
  lanes?: number;
  /** Milliseconds; given by tests. */
  now?: () => number;
}

export interface PlaneStore {
  /** The finest plane held of a channel. */
  best(channel: number): ChannelPlane | null;
  /** The plane of a channel at one size, where it is held. */
  at(channel: number, size: PlaneSize): ChannelPlane | null;
  /** The sizes there are, small to whole. */
  sizes: readonly PlaneSize[];
  /**
   * Show this channel next, sharp enough for an image that is `sidePx` device pixels long, and these others with it;
   * neighbours follow.
   */
  want(channel: number, sidePx: number, others?: readonly number[]): void;
  problem(channel: number): unknown;
  retry(): void;
  subscribe(listener: () => void): () => void;
  /** Counts changes, for `useSyncExternalStore`. */
  version(): number;
  close(): void;
}

/** Reduced sizes on the way to the whole plane: the first is there soon, the second serves cubes of survey size. */
const STEPS = [256, 1024];
const NEIGHBOUR_BYTES = 24e6;
const MOST_NEIGHBOURS = 12;
/** Full planes wait until the hand has rested for this long. */
const REST_MS = 140;

/**
 * Planes in memory: the least recently used go first when they no longer fit.
 *
 * What is wanted is loaded first, small before large; then its neighbours, more of them on the side to which the hand
 * moves and the farther the faster, so that the next step is there before it is asked for. While the hand moves on,
 * only small planes are asked for. What is no longer wanted is given up.
 */
export function planeStore(options: PlaneStoreOptions): PlaneStore {
  const { load, side, channels, budgetBytes, lanes = 4, now = () => performance.now() } = options;
  const sizes: PlaneSize[] = [...STEPS.filter((step) => step < side / 1.5), null];
  const held = new Map<string, ChannelPlane>();
  const loading = new Map<string, AbortController>();
  const failed = new Map<string, unknown>();
  const listeners = new Set<() => void>();
  let bytes = 0;
  let version = 0;
  let wanted: { channel: number; size: PlaneSize; others: readonly number[] } | null = null;
  let moving: Pace | null = null;
  let resting: ReturnType<typeof setTimeout> | undefined;
  let closed = false;

  const keyOf = (channel: number, size: PlaneSize) => `${channel}/${size ?? 'whole'}`;
  const bytesOf = (size: PlaneSize) => 2 * Math.min(size ?? side, side) ** 2;
  const tell = () => {
    version++;
    for (const listener of [...listeners]) listener();
  };

  const keep = (key: string, plane: ChannelPlane) => {
    bytes += plane.values.byteLength - (held.get(key)?.values.byteLength ?? 0);
    held.delete(key);
    held.set(key, plane);
    for (const [old, { values }] of held) {
      if (bytes <= budgetBytes) break;
      if (old === key) continue;
      held.delete(old);
      bytes -= values.byteLength;
    }
  };

  /** What should be there, most urgent first. */
  const wishes = (): { channel: number; size: PlaneSize }[] => {
    if (!wanted) return [];
    const { channel, others } = wanted;
    const fast = moving?.fast ?? false;
    const size = fast ? sizes[0]! : wanted.size;
    const steps = sizes.slice(0, sizes.indexOf(size) + 1);
    const list = steps.flatMap((s) => [channel, ...others].map((c) => ({ channel: c, size: s })));
    const most = Math.min(
      MOST_NEIGHBOURS,
      Math.max(2, Math.floor(NEIGHBOUR_BYTES / 2 / bytesOf(wanted.size))),
    );
    const ahead = Math.max(most, moving?.ahead ?? 0);
    const way = moving?.way ?? 1;
    for (let d = 1; d <= ahead; d++)
      for (const c of d <= most / (fast ? 4 : 1)
        ? [channel + d * way, channel - d * way]
        : [channel + d * way])
        if (c >= 0 && c < channels) list.push({ channel: c, size: d <= 2 ? size : sizes[0]! });
    return list;
  };

  const covered = (channel: number, size: PlaneSize) =>
    sizes.slice(sizes.indexOf(size)).some((s) => held.has(keyOf(channel, s)));

  const pump = () => {
    if (closed) return;
    const list = wishes();
    const keys = new Set(list.map((w) => keyOf(w.channel, w.size)));
    for (const [key, controller] of loading)
      if (!keys.has(key)) {
        loading.delete(key);
        controller.abort();
      }
    // until something of the wanted channel is there, nothing else competes with it for the line
    const blank = wanted !== null && !sizes.some((s) => held.has(keyOf(wanted!.channel, s)));
    for (const { channel, size } of list) {
      if (loading.size >= (blank && !moving?.fast ? 1 : lanes)) break;
      const key = keyOf(channel, size);
      if (covered(channel, size) || loading.has(key) || failed.has(key)) continue;
      const controller = new AbortController();
      loading.set(key, controller);
      load(channel, size, controller.signal).then(
        (plane) => {
          if (loading.get(key) !== controller) return; // given up meanwhile
          loading.delete(key);
          keep(key, plane);
          tell();
          pump();
        },
        (problem: unknown) => {
          if (loading.get(key) !== controller) return;
          loading.delete(key);
          failed.set(key, problem);
          tell();
          pump();
        },
      );
    }
  };

  const touched = (key: string) => {
    const plane = held.get(key);
    if (!plane) return null;
    held.delete(key); // to the end of the line of those that must go
    held.set(key, plane);
    return plane;
  };

  return {
    sizes,
    best(channel) {
      for (let i = sizes.length - 1; i >= 0; i--) {
        const plane = touched(keyOf(channel, sizes[i]!));
        if (plane) return plane;
      }
      return null;
    },
    at: (channel, size) => touched(keyOf(channel, size)),
    want(channel, sidePx, others = []) {
      // The smallest step that still has a pixel for each of the screen's.
      const size = sizes.find((s) => s === null || s >= sidePx * 0.75) ?? null;
      if (wanted?.channel === channel && wanted.size === size && `${wanted.others}` === `${others}`) return;
      if (wanted?.channel !== channel) {
        for (const s of sizes) failed.delete(keyOf(channel, s));
        moving = wanted ? pace(moving, wanted.channel, channel, now()) : null;
        clearTimeout(resting);
        if (moving?.fast)
          resting = setTimeout(() => {
            if (moving) moving = { ...moving, fast: false, ahead: 0 };
            pump();
          }, REST_MS);
      }
      wanted = { channel, size, others };
      pump();
    },
    problem(channel) {
      for (const s of sizes) if (failed.has(keyOf(channel, s))) return failed.get(keyOf(channel, s));
      return null;
    },
    retry() {
      failed.clear();
      tell();
      pump();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    version: () => version,
    close() {
      closed = true;
      clearTimeout(resting);
      for (const controller of loading.values()) controller.abort();
      loading.clear();
    },
  };
}
