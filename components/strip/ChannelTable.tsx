import { useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { brightness } from '@/components/cube/words';
import { Dialog } from '@/components/ui/Dialog';
import { pageRows, Pager } from '@/components/ui/Pager';
import { Press } from '@/components/ui/Press';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { SkeletonRows } from '@/components/ui/Skeleton';
import { Table, type Column } from '@/components/ui/Table';
import { Text } from '@/components/ui/Text';
import { space, touch } from '@/components/ui/tokens';
import { useChannels } from '@/hooks/useCubes';
import type { Channel } from '@/shared/contract/cubes';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** What the strip shows, as a table: the channels by rising velocity. A row shows its channel on the map. */
export default function ChannelTable({ onClose }: { onClose: () => void }) {
  const { cube, axes, order, channel, showChannel, marksByChannel, model } = useSession();
  const { data, problem, reload } = useChannels(cube.id);
  const [asked, setAsked] = useState<number | null>(null);
  const size = 50;
  const sorted = data && order.channels.flatMap((k) => data.items.find((c) => c.channel === k) ?? []);
  const current = Math.floor((order.positions[channel] ?? 0) / size) + 1;
  const { rows, page } = pageRows(sorted ?? [], asked ?? current, size);
  const unit = axes.unit ? `, ${axes.unit}` : '';
  const number = (value: number | null) => <Text mono>{value === null ? '–' : brightness(value)}</Text>;
  const columns: Column<Channel>[] = [
    {
      key: 'channel',
      label: 'Channel',
      width: 84,
      align: 'right',
      cell: (c) => (
        <Press
          aria-label={`Show channel ${c.channel + 1}`}
          onPress={() => {
            showChannel(c.channel);
            onClose();
          }}
          style={{ minHeight: touch, justifyContent: 'center', minWidth: touch, alignItems: 'flex-end' }}
        >
          <Text mono weight="semibold" style={{ textDecorationLine: 'underline' }}>
            {c.channel + 1}
          </Text>
        </Press>
      ),
    },
    {
      key: 'velocity',
      label: 'Velocity, km/s',
      width: 116,
      align: 'right',
      cell: (c) => <Text mono>{velocityLabel(c.velocity, axes.spectral.channelWidth)}</Text>,
    },
    { key: 'mean', label: `Mean${unit}`, width: 104, align: 'right', cell: (c) => number(c.mean) },
    { key: 'rms', label: `Rms${unit}`, width: 104, align: 'right', cell: (c) => number(c.rmsAboutZero) },
    {
      key: 'marks',
      label: 'Marks',
      width: 72,
      align: 'right',
      cell: (c) => <Text mono>{marksByChannel.get(c.channel) ?? 0}</Text>,
    },
    {
      key: 'model',
      label: 'In the model',
      width: 100,
      cell: (c) => (
        <Text>{model && Math.abs(c.velocity - model.vSys) <= model.vExp ? 'yes' : model ? 'no' : '–'}</Text>
      ),
    },
  ];
  return (
    <Dialog title="Channels" onClose={onClose} width={space(170)}>
      {problem && <ProblemNotice problem={problem} onRetry={() => void reload()} />}
      {!sorted && !problem && <SkeletonRows rows={8} label="Loading the channels" />}
      {sorted && (
        <View style={{ gap: space(2) }}>
          <Table
            label="Channels by rising velocity"
            columns={columns}
            rows={rows}
            rowKey={(c) => String(c.channel)}
            selected={(c) => c.channel === channel}
            dense
          />
          <Pager what="channels" total={sorted.length} page={page} size={size} onPage={setAsked} />
        </View>
      )}
    </Dialog>
  );
}
