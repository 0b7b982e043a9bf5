import { useLocalSearchParams, useRouter } from 'expo-router';
import { useEffect, useRef, useState } from 'react';
import { paramsOf, placeOf, type CubePlace } from '@/components/cube/place';
import type { MapStore } from '@/components/map/mapStore';
import { zoomOf } from '@/shared/image/viewport';

/** The address is written when things have come to rest for this long. */
const REST_MS = 350;

/** Where the address led, read once. */
export function useStartPlace(): CubePlace {
  const params = useLocalSearchParams<Record<string, string>>();
  const [start] = useState(() => placeOf(params));
  return start;
}

/** Keep the address telling what is shown; nothing is rendered for it while the map moves. */
export function useAddress(place: Omit<CubePlace, 'view'>, store: MapStore): void {
  const router = useRouter();
  const latest = useRef(place);
  const written = useRef('');
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useEffect(() => {
    latest.current = place;
    const write = () => {
      const v = store.viewport.get();
      const view = v ? { x: v.x, y: v.y, zoom: zoomOf(v) } : null;
      const params = paramsOf({ ...latest.current, view });
      const text = JSON.stringify(params);
      if (text === written.current) return;
      written.current = text;
      router.setParams(params as Record<string, string>);
    };
    const later = () => {
      clearTimeout(timer.current);
      timer.current = setTimeout(write, REST_MS);
    };
    later();
    const stop = store.viewport.subscribe(later);
    return () => {
      stop();
      clearTimeout(timer.current);
    };
  }, [place, store, router]);
}
