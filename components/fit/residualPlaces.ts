import type { FrozenMarks } from '@/shared/contract/fits';
import { DEGREE, positionAngle, separation } from '@/shared/sky/greatCircle';
import type { DoneFit } from './fitFacts';

export interface ResidualPlace {
  mark: number;
  /** Degrees from the fitted centre: east towards larger l, north. */
  east: number;
  north: number;
  /** Angle from the centre less the model's radius, degrees: positive outside. */
  degrees: number;
  setAside: boolean;
}

/** Where each mark lies on the sky about the fitted centre, along great circles. */
export function residualPlaces(fit: DoneFit, frozen: FrozenMarks): ResidualPlace[] {
  const { l, b } = fit.parameters;
  if (!l || !b) return [];
  const centre = { lon: l.value, lat: b.value };
  return fit.residuals.flatMap((r) => {
    const mark = frozen.marks[r.mark];
    if (!mark) return [];
    const place = { lon: mark.l, lat: mark.b };
    const away = separation(centre, place);
    const angle = positionAngle(centre, place) * DEGREE;
    return [
      {
        mark: r.mark,
        east: away * Math.sin(angle),
        north: away * Math.cos(angle),
        degrees: r.degrees,
        setAside: r.weight === 0,
      },
    ];
  });
}

/** Quarters of the sky about the centre with the mean residual of each, for who cannot see the map. */
export function residualWords(places: readonly ResidualPlace[]): string {
  const live = places.filter((p) => !p.setAside);
  const quarters = ['north', 'east', 'south', 'west'] as const;
  const of = (q: (typeof quarters)[number]) =>
    live.filter((p) => {
      const upright = Math.abs(p.north) >= Math.abs(p.east);
      const side = upright ? (p.north >= 0 ? 'north' : 'south') : p.east >= 0 ? 'east' : 'west';
      return side === q;
    });
  const said = quarters.flatMap((q) => {
    const marks = of(q);
    if (marks.length === 0) return [];
    const mean = marks.reduce((sum, p) => sum + p.degrees, 0) / marks.length;
    return [`${q} ${Math.abs(mean).toPrecision(2)} degrees ${mean >= 0 ? 'outside' : 'inside'}`];
  });
  const outside = live.filter((p) => p.degrees > 0).length;
  return `${outside} marks lie outside the model and ${live.length - outside} inside; on average ${said.join(', ')}.`;
}
