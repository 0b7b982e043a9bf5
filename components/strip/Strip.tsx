// Where there is no canvas (native, tests); the web build takes Strip.web.tsx.
import { View } from 'react-native';
import type { StripPicture } from '@/components/strip/drawStrip';
import type { StripOrder } from '@/components/strip/stripOrder';
import { labelOf } from '@/shared/image/ticks';

export interface StripProps {
  order: StripOrder;
  channel: number;
  onChannel: (channel: number) => void;
  picture: StripPicture | null;
  spectrum: readonly (number | null)[];
  marks: ReadonlyMap<number, number>;
  span: { low: number; middle: number; high: number } | null;
}

/** What the slider says of itself: "−42.2 km/s, channel 20 of 48". */
export function stripText({
  order,
  channel,
  marks,
}: Pick<StripProps, 'order' | 'channel' | 'marks'>): string {
  const velocity = order.velocities[order.positions[channel] ?? 0] ?? 0;
  const count = marks.get(channel) ?? 0;
  const own = count > 0 ? `, ${count} mark${count === 1 ? '' : 's'}` : '';
  return `${labelOf(velocity, 1)} km/s, channel ${channel + 1} of ${order.channels.length}${own}`;
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
