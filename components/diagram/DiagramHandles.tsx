import type { DiagramDomain, DiagramLayout, DiagramModel } from '@/components/diagram/diagramScale';
import type { RingParameters } from '@/shared/shell/channelCurve';

export interface DiagramHandlesProps {
  layout: DiagramLayout;
  domain: DiagramDomain;
  model: DiagramModel;
  channelWidth: number;
  onModel: (by: Partial<RingParameters>) => void;
  /** A handle is held, or let go. */
  onHold: (holding: boolean) => void;
}

// Where there is no pointer (native, tests); the web build takes DiagramHandles.web.tsx.
export function DiagramHandles(_: DiagramHandlesProps) {
  return null;
}
