import type { Compared } from '@/hooks/useCompared';
import { ringResidual } from '../diagram/RadiusVelocity';
import { domainOf, type DiagramDomain, type DiagramModel, type DiagramRing } from '../diagram/diagramScale';
import { isDone, modelOf, ringsOf } from '../fit/fitFacts';

export interface Drawn {
  rings: DiagramRing[];
  model: DiagramModel | null;
  channelWidth: number;
}

/** What the diagram of a shell shows; centred: velocities from its own v_sys, so that shells at other velocities compare. */
export function drawnOf({ fit, channelWidth }: Compared, centred: boolean): Drawn {
  if (!fit || !isDone(fit)) return { rings: [], model: null, channelWidth: channelWidth ?? 0 };
  const model = modelOf(fit);
  const shift = centred && model ? model.vSys : 0;
  const errorAt = model?.errorAt;
  return {
    rings: ringsOf(fit).map((ring) => ({ ...ring, velocity: ring.velocity - shift })),
    model: model && {
      ...model,
      vSys: model.vSys - shift,
      ...(errorAt && { errorAt: (velocity: number) => errorAt(velocity + shift) }),
    },
    channelWidth: channelWidth ?? 0,
  };
}

/** One pair of axes for all of them. */
export function commonDomain(drawn: readonly Drawn[]): DiagramDomain {
  const widthOf = new Map(drawn.map((d) => [d.model, d.channelWidth]));
  return domainOf(drawn, (ring, model) => ringResidual(ring, model, widthOf.get(model) ?? 0));
}
