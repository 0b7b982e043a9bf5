export interface Box {
  left: number;
  top: number;
  width: number;
  height: number;
}

const GAP = 12;

/**
 * Where a card stands beside a control: below it, above it, to its right or left, or over its middle, whichever first
 * leaves the card whole on the page.
 */
export function placeCard(
  target: Box,
  card: { width: number; height: number },
  page: { width: number; height: number },
): { left: number; top: number } {
  const within = (at: number, size: number, all: number) => Math.min(Math.max(at, GAP), all - size - GAP);
  const left = within(target.left + target.width / 2 - card.width / 2, card.width, page.width);
  const top = within(target.top + target.height / 2 - card.height / 2, card.height, page.height);
  const below = target.top + target.height + GAP;
  const above = target.top - card.height - GAP;
  const right = target.left + target.width + GAP;
  const before = target.left - card.width - GAP;
  if (below + card.height + GAP <= page.height) return { left, top: below };
  if (above >= GAP && above + card.height + GAP <= page.height) return { left, top: above };
  if (right + card.width + GAP <= page.width) return { left: right, top };
  if (before >= GAP && before + card.width + GAP <= page.width) return { left: before, top };
  return { left, top: within(below, card.height, page.height) };
}
