import { useDeferredValue, useMemo } from 'react';
import { advice } from '@/hooks/reading/advice';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import { readingByChannel, skyMarks, type ChannelReading, type SkyRimMark } from '@/hooks/reading/skyMarks';
import { isProblem, Problem } from '@/shared/contract/problem';
import type { RingParameters } from '@/shared/shell/channelCurve';
import { liveFit } from '@/shared/shell/fit';
import { LEAST_CHANNELS, LEAST_MARKS } from '@/shared/shell/fitInput';
import type { FitResult } from '@/shared/shell/fitResult';
import type { Wcs } from '@/shared/sky/wcs';

export interface LiveFit {
  marks: readonly SkyRimMark[];
  readings: readonly ChannelReading[];
  fit: FitResult | null;
  /** Why marks that are enough in number make no fit. */
  problem: Problem | null;
  sentence: string;
}

/** Rings and the shell's fit as the marks stand, worked out in the browser by the code that the worker runs too. */
export function useLiveFit(
  marks: readonly PlacedMark[],
  wcs: Wcs,
  channelWidth: number,
  start: RingParameters | null = null,
): LiveFit {
  // The map follows the finger first; the fit follows when there is time.
  const later = useDeferredValue(marks);
  const deferred = later.length === 0 ? marks : later; // the first marks, of a reading just loaded, at once
  return useMemo(() => {
    const onSky = skyMarks(deferred, wcs);
    const readings = readingByChannel(onSky);
    const { fit, problem } = fitted(onSky, readings.length, channelWidth, start);
    const sentence = advice({
      readings,
      marks: onSky.length,
      fitted: fit !== null,
      problem: problem?.detail ?? null,
      channelWidth,
    });
    return { marks: onSky, readings, fit, problem, sentence };
  }, [deferred, wcs, channelWidth, start]);
}

function fitted(
  marks: readonly SkyRimMark[],
  channels: number,
  channelWidth: number,
  start: RingParameters | null,
): { fit: FitResult | null; problem: Problem | null } {
  if (marks.length < LEAST_MARKS || channels < LEAST_CHANNELS) return { fit: null, problem: null };
  try {
    return { fit: liveFit({ marks, channelWidth }, start ? { start } : {}), problem: null };
  } catch (error) {
    if (isProblem(error)) return { fit: null, problem: error };
    // A fault of ours must not take the marks from under the person's hand.
    const detail = `The live fit stopped: ${error instanceof Error ? error.message : String(error)}`;
    return { fit: null, problem: new Problem('fit-failed', detail) };
  }
}
