import { useEffect, useRef, useState } from 'react';
import { Platform } from 'react-native';

const carriesFiles = (event: DragEvent): boolean =>
  Array.from(event.dataTransfer?.types ?? []).includes('Files');

/** Takes files dropped anywhere on the page while the caller is shown; true while some hover over it. */
export function useFileDrop(onFiles: (files: File[]) => void, enabled: boolean): boolean {
  const [over, setOver] = useState(false);
  const take = useRef(onFiles);
  useEffect(() => {
    take.current = onFiles;
  });
  useEffect(() => {
    if (!enabled || Platform.OS !== 'web') return;
    let depth = 0; // enter and leave come for every element passed
    const enter = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      depth++;
      setOver(true);
    };
    const hover = (event: DragEvent) => {
      if (carriesFiles(event)) event.preventDefault();
    };
    const leave = () => {
      depth = Math.max(0, depth - 1);
      if (depth === 0) setOver(false);
    };
    const drop = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      event.preventDefault();
      depth = 0;
      setOver(false);
      const files = Array.from(event.dataTransfer?.files ?? []);
      if (files.length > 0) take.current(files);
    };
    const listeners = { dragenter: enter, dragover: hover, dragleave: leave, drop } as const;
    for (const [name, listener] of Object.entries(listeners))
      window.addEventListener(name, listener as EventListener);
    return () => {
      for (const [name, listener] of Object.entries(listeners))
        window.removeEventListener(name, listener as EventListener);
    };
  }, [enabled]);
  return over;
}
