import { Fragment, useEffect, useState } from 'react';
import { useUploadStates } from '@/hooks/useCubes';
import { elsewhere } from '@/hooks/uploads/unfinished';
import { useUploads } from '@/hooks/useUploads';
import { Panel, Rule } from '../ui/Panel';
import { UnfinishedRow } from './UnfinishedRow';
import { UploadRow } from './UploadRow';

const KEY = 'outswell.dismissed-uploads';
const readDismissed = (): string[] => {
  try {
    return JSON.parse(globalThis.localStorage?.getItem(KEY) ?? '[]') as string[];
  } catch {
    return [];
  }
};

/** Files on their way into a region: from this page, and what the server knows besides. Nothing when there are none. */
export function UploadsPanel({ regionId }: { regionId: string }) {
  const { items, dismiss } = useUploads();
  const states = useUploadStates(regionId);
  const [dismissed, setDismissed] = useState(readDismissed);
  const mine = items.filter((item) => item.regionId === regionId);

  // a finished file is a cube of the list now
  const done = mine.find((item) => item.status === 'done')?.id;
  useEffect(() => {
    if (!done) return;
    const timer = setTimeout(() => dismiss(done), 3_000);
    return () => clearTimeout(timer);
  }, [done, dismiss]);

  const hide = (id: string) => {
    const next = [...dismissed.slice(-99), id];
    setDismissed(next);
    try {
      globalThis.localStorage?.setItem(KEY, JSON.stringify(next));
    } catch {
      /* it then comes back with the next reload */
    }
  };
  const others = elsewhere(states.data?.items ?? [], items).filter((s) => !dismissed.includes(s.id));
  if (mine.length + others.length === 0) return null;
  return (
    <Panel flush title="Uploads">
      {mine.map((item, i) => (
        <Fragment key={item.id}>
          {i > 0 && <Rule />}
          <UploadRow
            item={item}
            onDismiss={() => {
              dismiss(item.id);
              if (item.status === 'refused' && item.uploadId) hide(item.uploadId); // the server lists it for a day
            }}
          />
        </Fragment>
      ))}
      {others.map((state, i) => (
        <Fragment key={state.id}>
          {mine.length + i > 0 && <Rule />}
          <UnfinishedRow state={state} onDismiss={() => hide(state.id)} />
        </Fragment>
      ))}
    </Panel>
  );
}
