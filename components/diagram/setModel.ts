import type { DiagramDomain, DiagramLayout } from '@/components/diagram/diagramScale';
import type { RingParameters } from '@/shared/shell/channelCurve';

/** What can be taken hold of: the crown sets theta and v_sys, either foot v_exp. */
export type Handle = 'crown' | 'low' | 'high';

/** Steps of a key: of theta as a share of it, of velocities in channels; with Shift five times as far. */
const THETA_STEP = 0.02;
const FAR = 5;
/** Radii smaller than this share of the axis cannot be told from none. */
const LEAST_RADIUS = 0.01;

const held = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);

/** Where a handle lies, px. */
export function handleAt(handle: Handle, { theta, vSys, vExp }: RingParameters, l: DiagramLayout) {
  if (handle === 'crown') return { x: l.x(vSys), y: l.y(theta) };
  return { x: l.x(handle === 'low' ? vSys - vExp : vSys + vExp), y: l.y(0) };
}

/** What a handle brought to a place says of the model. The place is held within the axes, v_exp above half a channel. */
export function draggedTo(
  handle: Handle,
  at: { x: number; y: number },
  model: RingParameters,
  l: DiagramLayout,
  domain: DiagramDomain,
  channelWidth: number,
): Partial<RingParameters> {
  const [v0, v1] = domain.velocity;
  const velocity = held(v0 + ((at.x - l.left) / (l.right - l.left)) * (v1 - v0), v0, v1);
  if (handle !== 'crown')
    return {
      vExp: Math.max(handle === 'low' ? model.vSys - velocity : velocity - model.vSys, channelWidth / 2),
    };
  const radius = ((l.floor - at.y) / (l.floor - l.top)) * domain.radius;
  return { vSys: velocity, theta: held(radius, domain.radius * LEAST_RADIUS, domain.radius) };
}

/** What an arrow key on a handle says of the model; null: not one of its keys. */
export function keyed(
  handle: Handle,
  key: string,
  shift: boolean,
  { theta, vSys, vExp }: RingParameters,
  channelWidth: number,
): Partial<RingParameters> | null {
  const far = shift ? FAR : 1;
  const along = key === 'ArrowRight' ? far : key === 'ArrowLeft' ? -far : 0;
  const up = key === 'ArrowUp' ? far : key === 'ArrowDown' ? -far : 0;
  if (along === 0 && up === 0) return null;
  if (handle === 'crown')
    return along !== 0 ? { vSys: vSys + along * channelWidth } : { theta: theta * (1 + THETA_STEP) ** up };
  const outward = up + (handle === 'high' ? along : -along);
  return { vExp: Math.max(vExp + outward * channelWidth, channelWidth / 2) };
}
