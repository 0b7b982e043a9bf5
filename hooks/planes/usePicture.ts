import { useEffect, useMemo, useRef, useState } from 'react';
import { asProblem } from '@/hooks/api';
import { ALL_CHANNELS, type ChannelPlane } from '@/hooks/planes/decodePlane';
import type { PictureJob, PictureView } from '@/hooks/planes/makePicture';
import { pictureInThread } from '@/hooks/planes/pictureThread';
import type { ChannelPlanes, Planes } from '@/hooks/planes/usePlanes';
import type { Covariance } from '@/shared/image/smoothing';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** What is to be seen besides the plane itself. */
export interface Recipe {
  /** Channels that are averaged; of a map of all channels: none. */
  sources: readonly number[];
  /** Subtracted; empty for none. */
  minus: readonly number[];
  smooth: Covariance | null;
  less: Covariance | null;
  view: PictureView | null;
  /** Of a stack: one a source. */
  stretch: readonly number[] | null;
}

/** Whether anything has to be computed at all. */
export const isPlain = (r: Recipe): boolean =>
  r.sources.length <= 1 && r.minus.length === 0 && !r.smooth && !r.less && !r.view;

/** What finished pictures may take together. */
const KEPT_BYTES = 32e6;

/**
 * The picture that a recipe makes of a cube's planes, computed in another thread: from the finest planes that are there
 * of all its channels, and again when finer ones come. While it is being made the one before stays; steps that come
 * faster than pictures are left out.
 *
 * @param shown the plane without a recipe: of the channel, or a map of all channels
 */
export function usePicture(
  shown: Planes,
  channels: ChannelPlanes,
  recipe: Recipe,
  wcs: WcsSpec,
  name: string,
): Planes {
  const [made, setMade] = useState<{ key: string; plane: ChannelPlane } | null>(null);
  const [failed, setFailed] = useState<{ key: string; error: unknown } | null>(null);
  const kept = useRef(new Map<string, ChannelPlane>());
  const line = useRef<{ running: boolean; next: { key: string; job: PictureJob } | null }>({
    running: false,
    next: null,
  });
  const plain = isPlain(recipe);
  const { store, version, thumbnail } = channels;
  const { plane } = shown;

  const asked = useMemo(() => {
    void version; // what the store holds has changed
    if (plain || !plane) return null;
    const found = plane.channel === ALL_CHANNELS ? { planes: [plane], minus: [] } : sourcesOf();
    if (!found) return null;
    const key = JSON.stringify([
      name,
      plane.channel,
      found.planes[0]!.block,
      !!found.planes[0]!.standIn,
      recipe,
    ]);
    return { key, ...found };

    function sourcesOf(): { planes: ChannelPlane[]; minus: ChannelPlane[] } | null {
      const sizes = [...store.sizes].reverse();
      for (const at of [...sizes.map((s) => (c: number) => store.at(c, s)), thumbnail]) {
        const all = [...recipe.sources, ...recipe.minus].map(at);
        if (all.every((p) => p !== null))
          return { planes: all.slice(0, recipe.sources.length), minus: all.slice(recipe.sources.length) };
      }
      return null;
    }
  }, [plain, plane, recipe, store, version, thumbnail, name]);

  const key = asked?.key ?? null;
  const latest = useRef(asked);
  useEffect(() => {
    latest.current = asked;
  });
  useEffect(() => {
    const { current: now } = latest;
    if (!key || !now) return;
    const known = kept.current.get(key);
    if (known) return setMade({ key, plane: known });
    const { smooth, less, view, stretch } = recipe;
    const { planes, minus } = now;
    const job: PictureJob = {
      channel: plane?.channel ?? 0,
      planes,
      minus,
      smooth,
      less,
      view,
      stretch: stretch && [...stretch],
      wcs,
    };
    line.current.next = { key, job };
    run();

    function run() {
      const { next, running } = line.current;
      if (!next || running) return;
      line.current = { running: true, next: null };
      pictureInThread(next.job)
        .then(
          (done) => {
            keep(kept.current, next.key, done);
            setMade({ key: next.key, plane: done });
          },
          (error: unknown) => setFailed({ key: next.key, error }),
        )
        .finally(() => {
          line.current.running = false;
          run();
        });
    }
  }, [key, recipe, wcs, plane?.channel]);

  // the plane itself stands in for the first picture, where it lies alike
  const standIn = useMemo(
    () => (plane && !recipe.view ? { ...plane, standIn: true } : null),
    [plane, recipe.view],
  );
  return useMemo(() => {
    if (plain) return shown;
    const fits = made && sameShape(made.key, key);
    const problem = shown.problem ?? (failed && failed.key === key ? asProblem(failed.error) : null);
    return { plane: fits ? made.plane : problem ? null : standIn, problem, retry: shown.retry };
  }, [plain, shown, made, failed, key, standIn]);
}

/** The newest made may be shown until the one asked for is there, unless it lies differently on the screen. */
function sameShape(made: string, key: string | null): boolean {
  if (!key) return false;
  const viewOf = (text: string) =>
    JSON.stringify((JSON.parse(text) as [string, number, number, boolean, Recipe])[4].view);
  const nameOf = (text: string) => (JSON.parse(text) as [string])[0];
  return made === key || (nameOf(made) === nameOf(key) && viewOf(made) === viewOf(key));
}

function keep(kept: Map<string, ChannelPlane>, key: string, plane: ChannelPlane): void {
  kept.set(key, plane);
  let bytes = 0;
  for (const { values } of kept.values()) bytes += values.byteLength;
  for (const [old, { values }] of kept) {
    if (bytes <= KEPT_BYTES || old === key) break;
    kept.delete(old);
    bytes -= values.byteLength;
  }
}
