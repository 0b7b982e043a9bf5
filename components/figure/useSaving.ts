import { useEffect, useRef, useState } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import { fileName, type Choices } from '@/components/figure/choices';
import { drawnSvg, pngBytes } from '@/components/figure/drawnSvg';
import { loopGif, pictureSvg, sheetSvg, type Work } from '@/components/figure/makeFigure';
import { saveFile } from '@/components/figure/saveFile';
import { velocityOf } from '@/components/figure/channelPanel';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { COLUMN_MM } from '@/shared/image/figure/figure';
import { pngWithDensity } from '@/shared/image/figure/pngDensity';

export type Format = 'svg' | 'png' | 'gif';
/** Twice the 300 dots an inch that print asks for. */
const DOTS_PER_INCH = 600;

export interface Saving {
  under: { words: string; share: number } | null;
  problem: ApiProblem | null;
  /** The name of the file that was saved last. */
  saved: string | null;
  save: (format: Format) => Promise<void>;
  /** An SVG of the choices, for a look before saving. */
  preview: (signal: AbortSignal) => Promise<string>;
}

/** Makes the file that was chosen; leaving gives up what is under way. */
export function useSaving(s: CubeSession, choices: Choices): Saving {
  const [under, setUnder] = useState<Saving['under']>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [saved, setSaved] = useState<string | null>(null);
  const running = useRef<AbortController | null>(null);
  useEffect(() => () => running.current?.abort(), []);

  const workOf = (signal: AbortSignal): Work => ({
    signal,
    say: (words, done, of) => setUnder({ words, share: done / of }),
  });
  const svgOf = (work: Work) =>
    choices.kind === 'sheet' ? sheetSvg(s, choices, work) : pictureSvg(s, choices);

  async function save(format: Format) {
    const controller = new AbortController();
    running.current?.abort();
    running.current = controller;
    setProblem(null);
    setSaved(null);
    setUnder({ words: 'Drawing', share: 0 });
    try {
      const work = workOf(controller.signal);
      const name = nameOf(s, choices, format);
      if (format === 'gif') saveFile(name, 'image/gif', await loopGif(s, choices, work));
      else {
        const svg = await svgOf(work);
        controller.signal.throwIfAborted();
        if (format === 'svg') saveFile(name, 'image/svg+xml', svg);
        else {
          const canvas = await drawnSvg(svg, (COLUMN_MM[choices.columns] / 25.4) * DOTS_PER_INCH);
          saveFile(name, 'image/png', pngWithDensity(await pngBytes(canvas), DOTS_PER_INCH));
        }
      }
      setSaved(name);
    } catch (error) {
      if (!controller.signal.aborted) setProblem(asProblem(error));
    } finally {
      if (running.current === controller) setUnder(null);
    }
  }
  return {
    under,
    problem,
    saved,
    save,
    preview: (signal) => svgOf({ signal, say: () => undefined }),
  };
}

function nameOf(s: CubeSession, { kind }: Choices, format: Format): string {
  const what =
    kind === 'sheet'
      ? 'channels'
      : kind === 'loop'
        ? 'loop'
        : s.view === 'channel'
          ? velocityOf(s, s.channel)
          : s.view;
  return fileName([s.cube.name, ...(s.shell ? [s.shell.name] : []), what], format);
}
