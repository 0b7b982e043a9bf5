import type { Project } from '@/shared/image/skyPath';
import type { ImagePoint } from '@/shared/image/viewport';
import { destination, type LonLat } from '@/shared/sky/greatCircle';

/** The full width at half maximum of a beam: degrees, the angle from north through east. */
export interface Beam {
  major: number;
  minor: number;
  angle: number;
}

const POINTS = 48;

/** The beam's outline about (0, 0) in image pixels, as the projection shows it at a place on the sky. */
export function beamOutline(beam: Beam, at: LonLat, project: Project): ImagePoint[] | null {
  const centre = project(at);
  if (!centre) return null;
  const outline: ImagePoint[] = [];
  for (let i = 0; i <= POINTS; i++) {
    const t = (2 * Math.PI * i) / POINTS;
    const along = (beam.major / 2) * Math.cos(t);
    const across = (beam.minor / 2) * Math.sin(t);
    const turn = (Math.atan2(across, along) * 180) / Math.PI;
    const point = project(destination(at, beam.angle + turn, Math.hypot(along, across)));
    if (!point) return null;
    outline.push({ x: point.x - centre.x, y: point.y - centre.y });
  }
  return outline;
}
