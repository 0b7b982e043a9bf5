import { useRouter } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { useMay } from '@/hooks/useMe';
import { useRegions } from '@/hooks/useRegions';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { useCommands } from '../ui/commands/CommandsProvider';
import { EmptyState } from '../ui/EmptyState';
import { count } from '../ui/format';
import { Skeleton } from '../ui/Skeleton';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { RegionCard } from './RegionCard';
import { RegionDialog } from './RegionDialog';

/** The team's regions: the first screen after sign-in. */
export function RegionList() {
  const regions = useRegions();
  const mayMake = useMay()('region.create');
  const [making, setMaking] = useState(false);
  const router = useRouter();
  useCommands([
    {
      name: 'region.new',
      label: 'New region',
      keys: ['n'],
      group: 'Regions',
      enabled: mayMake,
      perform: () => setMaking(true),
    },
  ]);
  const make = mayMake && (
    <Button kind="primary" icon="plus" label="New region" onPress={() => setMaking(true)} />
  );
  const items = regions.data?.items;
  return (
    <Screen
      title="Regions"
      subtitle={items && items.length > 0 ? count(items.length, 'region') : undefined}
      actions={items?.length !== 0 && make}
    >
      <RecordGate
        read={regions}
        what="regions"
        skeleton={
          <CardGrid>
            {[0, 1, 2].map((i) => (
              <Skeleton key={i} height={160} />
            ))}
          </CardGrid>
        }
      >
        {({ items: all }) =>
          all.length === 0 ? (
            <EmptyState icon="regions" title="No region yet" action={make}>
              {mayMake
                ? 'A region is a patch of sky the team works on. Make one, then drop a FITS cube into it.'
                : 'A region is a patch of sky the team works on. A lead or an analyst of your team makes the first one.'}
            </EmptyState>
          ) : (
            <CardGrid>
              {all.map((region) => (
                <RegionCard key={region.id} region={region} />
              ))}
            </CardGrid>
          )
        }
      </RecordGate>
      {making && (
        <RegionDialog
          region={null}
          onClose={() => setMaking(false)}
          onDone={(r) => router.push(`/regions/${r.id}`)}
        />
      )}
    </Screen>
  );
}

/** Cards side by side as the width allows, equally high in a row. */
export function CardGrid({ children }: { children: React.ReactNode }) {
  const { wide } = useWide();
  const grid = {
    display: 'grid',
    gridTemplateColumns: wide ? `repeat(auto-fill, minmax(${space(85)}px, 1fr))` : 'minmax(0, 1fr)',
    gap: space(4),
  };
  return <View style={grid as object}>{children}</View>;
}
