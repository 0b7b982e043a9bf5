// Where there is no canvas (native, tests); the web build takes Strip.web.tsx.
import { View } from 'react-native';
import type { StripPicture } from '@/components/strip/drawStrip';
import type { StripOrder } from '@/components/strip/stripOrder';
import { stripText } from '@/components/strip/stripText';

export interface StripProps {
  order: StripOrder;
  channel: number;
  onChannel: (channel: number) => void;
  picture: StripPicture | null;
  spectrum: readonly (number | null)[];
  marks: ReadonlyMap<number, number>;
  span: { low: number; middle: number; high: number } | null;
  /** Channels where marks would help most, the best first. */
  next?: readonly number[];
}

export function Strip(props: StripProps) {
  return (
    <View
      role="slider"
      aria-label="Channel"
      aria-valuemin={1}
      aria-valuemax={props.order.channels.length}
      aria-valuenow={(props.order.positions[props.channel] ?? 0) + 1}
      aria-valuetext={stripText(props)}
    />
  );
}
