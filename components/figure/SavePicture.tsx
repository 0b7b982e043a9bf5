import { lazy, Suspense, useState } from 'react';
import { IconButton } from '@/components/ui/Button';
import { useCommands } from '@/components/ui/commands/CommandsProvider';

const SaveDialog = lazy(() => import('@/components/figure/SaveDialog'));

/** The way to a file of what is seen; what draws it comes when it is first asked for. */
export function SavePicture() {
  const [open, setOpen] = useState(false);
  useCommands([
    {
      name: 'figure.save',
      label: 'Save picture',
      keys: ['Mod+s'],
      group: 'Map',
      perform: () => setOpen(true),
    },
  ]);
  return (
    <>
      <IconButton icon="download" label="Save picture" onPress={() => setOpen(true)} />
      {open && (
        <Suspense fallback={null}>
          <SaveDialog onClose={() => setOpen(false)} />
        </Suspense>
      )}
    </>
  );
}
