import { lazy, Suspense, useState } from 'react';
import { useCommands } from '@/components/ui/commands/CommandsProvider';
import { IconButton } from '@/components/ui/Button';
import { Menu } from '@/components/ui/Menu';
import { useWide } from '@/components/ui/useWide';

// both come when they are first asked for
const SaveDialog = lazy(() => import('@/components/figure/SaveDialog'));
const ChannelTable = lazy(() => import('@/components/strip/ChannelTable'));

/** What else can be had of a cube: a file of what is seen, and the strip as a table. */
export function MoreOfCube() {
  const { wide } = useWide();
  const [open, setOpen] = useState<'picture' | 'table' | null>(null);
  const close = () => setOpen(null);
  useCommands([
    {
      name: 'figure.save',
      label: 'Save picture',
      keys: ['Mod+s'],
      group: 'Map',
      perform: () => setOpen('picture'),
    },
    {
      name: 'channel.table',
      label: 'Channels as a table',
      keys: ['Shift+c'],
      group: 'Channels',
      perform: () => setOpen('table'),
    },
  ]);
  return (
    <>
      {wide ? (
        <>
          <IconButton icon="download" label="Save picture" onPress={() => setOpen('picture')} />
          <IconButton icon="catalogue" label="Channels as a table" onPress={() => setOpen('table')} />
        </>
      ) : (
        <Menu
          label="More of this cube"
          items={[
            { label: 'Save picture', icon: 'download', perform: () => setOpen('picture') },
            { label: 'Channels as a table', icon: 'catalogue', perform: () => setOpen('table') },
          ]}
        />
      )}
      {open && (
        <Suspense fallback={null}>
          {open === 'picture' ? <SaveDialog onClose={close} /> : <ChannelTable onClose={close} />}
        </Suspense>
      )}
    </>
  );
}
