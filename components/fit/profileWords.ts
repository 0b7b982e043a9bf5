import type { Profile } from '@/shared/contract/fits';
import { plainNumber } from '@/shared/physics/quantity';
import { unitOf } from './parameterWords';

/** Where a profile lies below a level, linear between its points; an end that the curve never reaches is null. */
export function crossings({ values, deltaChi2 }: Profile, level: number): [number | null, number | null] {
  const least = deltaChi2.indexOf(Math.min(...deltaChi2));
  const meet = (from: number, step: 1 | -1): number | null => {
    for (let i = from; i + step >= 0 && i + step < values.length; i += step) {
      const [a, b] = [deltaChi2[i]!, deltaChi2[i + step]!];
      if (a <= level && b > level)
        return values[i]! + ((level - a) / (b - a)) * (values[i + step]! - values[i]!);
    }
    return null;
  };
  return [meet(least, -1), meet(least, 1)];
}

/** 'χ² rises by 1 at 9.4 and 11.2 km/s'. */
export function below(profile: Profile, level: number): string {
  const [low, high] = crossings(profile, level);
  const rises = `χ² rises by ${plainNumber(level)}`;
  const number = (v: number) => plainNumber(v, 4);
  const unit = unitOf(profile.parameter);
  const end = unit === '°' ? unit : ` ${unit}`;
  if (low !== null && high !== null) return `${rises} at ${number(low)}${end} and ${number(high)}${end}`;
  if (low !== null) return `${rises} below ${number(low)}${end}, and never above`;
  if (high !== null) return `${rises} above ${number(high)}${end}, and never below`;
  return `${rises} nowhere on the curve`;
}
