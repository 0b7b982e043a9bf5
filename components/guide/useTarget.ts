import { useEffect, useState } from 'react';
import type { Box } from '@/components/guide/placeCard';

/** How often the control is looked for: screens load and columns move. */
const LOOK_MS = 200;

/** Where on the page the first of some controls is now; null while none is in sight. */
export function useTarget(selectors: readonly string[]): Box | null {
  const [box, setBox] = useState<Box | null>(null);
  useEffect(() => {
    const look = () => {
      const found = selectors.map(seen).find((rect) => rect !== null) ?? null;
      setBox((before) => (sameBox(before, found) ? before : found));
    };
    look();
    const timer = setInterval(look, LOOK_MS);
    return () => clearInterval(timer);
  }, [selectors]);
  return box;
}

function seen(selector: string): Box | null {
  for (const element of Array.from(document.querySelectorAll(selector))) {
    const { left, top, width, height } = element.getBoundingClientRect();
    if (width > 0 && height > 0 && top < innerHeight && left < innerWidth && top + height > 0)
      return { left, top, width, height };
  }
  return null;
}

const sameBox = (a: Box | null, b: Box | null): boolean =>
  a === b ||
  (a !== null &&
    b !== null &&
    a.left === b.left &&
    a.top === b.top &&
    a.width === b.width &&
    a.height === b.height);
