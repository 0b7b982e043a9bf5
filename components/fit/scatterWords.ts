import { plainNumber } from '@/shared/physics/quantity';
import type { FitExtra } from './fitExtra';

export interface ScatterSource {
  key: 'mark' | 'spread' | 'ring' | 'shift';
  title: string;
  sentence: string;
  /** In units of the mark error; null where none is seen, or where it is not of that kind. */
  ratio: number | null;
}

/** Below this share of a mark's error a difference is not worth a number. */
const NOTHING = 0.05;

/**
 * The four sources of scatter behind the error bars, in words and in units of a mark's error.
 *
 * @param scales factors on sigma² and on the variance within a channel; rms offsets of rings, degrees, negative where
 *               the estimated variance is
 * @param sigmaDeg the median error of a mark, degrees
 * @param stated false where the marks carried none, and it was taken from their scatter
 * @param traced the marks are a traced rim, whose errors nobody stated
 */
export function scatterSources(
  scales: NonNullable<FitExtra['scales']>,
  sigmaDeg: number,
  stated: boolean,
  traced = false,
): ScatterSource[] {
  const error = traced ? 'the error of a traced point' : stated ? 'your stated error' : 'the error of a mark';
  const rings = traced ? 'Traced rings' : 'Your rings';
  const ofRings = traced ? 'traced rings' : 'your rings';
  const size = `${plainNumber(sigmaDeg, 2)}°`;
  const mark = Math.sqrt(Math.max(scales.mark, 0));
  const spread = Math.sqrt(Math.max(scales.spread, 0));
  const ring = scales.ringDeg / sigmaDeg;
  const shift = scales.shiftDeg / sigmaDeg;
  return [
    {
      key: 'mark',
      title: 'Single marks',
      ratio: stated ? mark : 1,
      sentence: stated
        ? `${traced ? 'Points' : 'Marks'} scatter about their own ring by ${times(mark)} ${error} of ${size}${traced ? '' : judged(mark)}.`
        : `The marks carry no error of their own. From their scatter about their rings it is ${size}.`,
    },
    {
      key: 'spread',
      title: 'Within a channel',
      ratio: null,
      sentence:
        spread < NOTHING
          ? 'The radius is not seen to change within the width of a channel: the rim is smooth there.'
          : `Across the width of a channel the radius spreads by ${times(spread)} what the model expects of it.`,
    },
    {
      key: 'ring',
      title: 'Ring to ring',
      ratio: ring > NOTHING ? ring : null,
      sentence:
        ring > NOTHING
          ? `${rings} differ in radius by ${ratio(ring)} of ${error}. This is part of the error bars.`
          : `${rings} agree in radius: no more difference is seen than single marks make.`,
    },
    {
      key: 'shift',
      title: 'Centres of the rings',
      ratio: shift > NOTHING ? shift : null,
      sentence:
        shift > NOTHING
          ? `The centres of ${ofRings} lie off by ${ratio(shift)} of ${error}. This is part of the error bars.`
          : `${rings} share one centre: no more shift is seen than single marks make.`,
    },
  ];
}

const ratio = (x: number): string => x.toFixed(x < 9.5 ? 1 : 0);
const times = (x: number): string => `${ratio(x)} times`;

function judged(mark: number): string {
  if (mark > 1.5) return ', so you were less sure than you said';
  if (mark < 0.65) return ', so you were surer than you said';
  return mark > 0.85 && mark < 1.2 ? ', as stated' : '';
}
