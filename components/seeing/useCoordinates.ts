import { useCallback, useMemo, useState } from 'react';
import type { Grid, Notation } from '@/components/seeing/coordinateWords';

export interface Coordinates {
  grid: Grid;
  notation: Notation;
  setGrid: (grid: Grid) => void;
  setNotation: (notation: Notation) => void;
}

const KEY = 'outswell.coordinates';

/** Coordinates are a person's habit, kept in this browser. */
export function useCoordinates(): Coordinates {
  const [chosen, setChosen] = useState(habit);
  const change = useCallback((more: Partial<{ grid: Grid; notation: Notation }>) => {
    setChosen((before) => {
      const next = { ...before, ...more };
      try {
        globalThis.localStorage?.setItem(KEY, JSON.stringify(next));
      } catch {
        /* then it lasts until the page is left */
      }
      return next;
    });
  }, []);
  return useMemo(
    () => ({
      ...chosen,
      setGrid: (grid: Grid) => change({ grid }),
      setNotation: (notation: Notation) => change({ notation }),
    }),
    [chosen, change],
  );
}

function habit(): { grid: Grid; notation: Notation } {
  try {
    const kept = JSON.parse(globalThis.localStorage?.getItem(KEY) ?? '{}') as Record<string, string>;
    return {
      grid: (['galactic', 'equatorial', 'off'] as const).find((g) => g === kept.grid) ?? 'galactic',
      notation: kept.notation === 'sexagesimal' ? 'sexagesimal' : 'decimal',
    };
  } catch {
    return { grid: 'galactic', notation: 'decimal' };
  }
}
