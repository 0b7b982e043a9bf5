// Where there is no canvas (native, tests); the web build takes PlotCanvas.web.tsx.
import { View } from 'react-native';

export interface PlotCanvasProps {
  label: string;
  height: number;
  draw: (ctx: CanvasRenderingContext2D, width: number, height: number) => void;
  /** A press or a drag on it, px from its upper left corner. */
  onPoint?: (x: number, y: number, width: number, height: number) => void;
}

export function PlotCanvas({ label }: PlotCanvasProps) {
  return <View role="img" aria-label={label} />;
}
