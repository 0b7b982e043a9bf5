import { separation, type LonLat } from '@/shared/sky/greatCircle';

/** A sphere on the sky: galactic degrees, km/s. */
export interface TrackShell {
  l: number;
  b: number;
  theta: number;
  vSys: number;
  vExp: number;
}

/**
 * The velocities at which lines of sight meet a thin expanding shell:
 *
 *     v = vSys ± vExp · √(1 − (sin d / sin Θ)²)
 *
 * with d the angle from the shell's centre; null beyond its rim.
 *
 * Source: the shell's equation sin d = sin Θ √(1 − u²) solved for u = (v − vSys)/vExp.
 */
export function trackAt(place: LonLat, shell: TrackShell): { near: number; far: number } | null {
  const d = separation({ lon: shell.l, lat: shell.b }, place);
  if (d > shell.theta) return null;
  const share = Math.sin((d * Math.PI) / 180) / Math.sin((shell.theta * Math.PI) / 180);
  const off = shell.vExp * Math.sqrt(Math.max(1 - share * share, 0));
  return { near: shell.vSys - off, far: shell.vSys + off };
}
