import type { StripProps } from '@/components/strip/Strip';
import { channelStep } from '@/components/strip/stripOrder';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** What the slider says of itself: "−42.2 km/s, channel 20 of 48". */
export function stripText({
  order,
  channel,
  marks,
  next,
}: Pick<StripProps, 'order' | 'channel' | 'marks' | 'next'>): string {
  const velocity = order.velocities[order.positions[channel] ?? 0] ?? 0;
  const count = marks.get(channel) ?? 0;
  const own = count > 0 ? `, ${count} mark${count === 1 ? '' : 's'}` : '';
  const wanted = next?.includes(channel) ? ', marks here would help most' : '';
  return `${velocityLabel(velocity, channelStep(order))} km/s, channel ${channel + 1} of ${order.channels.length}${own}${wanted}`;
}
