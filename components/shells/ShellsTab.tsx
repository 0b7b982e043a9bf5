import { Fragment, useState } from 'react';
import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { useCatalogue } from '@/hooks/useShells';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { EmptyState } from '../ui/EmptyState';
import { Field } from '../ui/Field';
import { count } from '../ui/format';
import { Panel, Rule } from '../ui/Panel';
import { Press } from '../ui/Press';
import { ShellRow } from './ShellRow';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';

/** Shells of one region together, regions and shells by name. */
export function byRegion(shells: readonly Shell[]): { regionId: string; name: string; shells: Shell[] }[] {
  const groups = new Map<string, { regionId: string; name: string; shells: Shell[] }>();
  for (const shell of [...shells].sort((a, b) => a.name.localeCompare(b.name))) {
    const group = groups.get(shell.regionId) ?? {
      regionId: shell.regionId,
      name: shell.regionName,
      shells: [],
    };
    group.shells.push(shell);
    groups.set(shell.regionId, group);
  }
  return [...groups.values()].sort((a, b) => a.name.localeCompare(b.name));
}

/** Every shell of the team by region, with or without an adopted fit. */
export function ShellsTab() {
  const shells = useCatalogue('adopted=any&sort=name&limit=500');
  const [search, setSearch] = useState('');
  const wanted = search.trim().toLowerCase();
  const matches = (s: Shell) =>
    `${s.name} ${s.designation ?? ''} ${s.regionName}`.toLowerCase().includes(wanted);
  const total = shells.data?.total;
  return (
    <Screen title="Shells" subtitle={total ? count(total, 'shell') : undefined}>
      <RecordGate read={shells} what="shells" skeleton={<SkeletonRows rows={5} height={60} />}>
        {({ items }) => {
          if (items.length === 0)
            return (
              <EmptyState
                icon="shells"
                title="No shell yet"
                action={<Button kind="primary" label="To the regions" href="/regions" />}
              >
                Name a shell in a region, open it in a cube, and mark its rim.
              </EmptyState>
            );
          const groups = byRegion(items.filter(matches));
          return (
            <>
              <View style={{ maxWidth: space(90), alignSelf: 'stretch' }}>
                <Field
                  label="Find a shell"
                  hideLabel
                  placeholder="Find by name, designation or region"
                  value={search}
                  onChangeText={setSearch}
                  inputMode="search"
                />
              </View>
              {groups.length === 0 && <Text tone="quiet">No shell is called that.</Text>}
              {groups.map((group) => (
                <Panel
                  key={group.regionId}
                  flush
                  title={
                    <Press
                      href={`/regions/${group.regionId}`}
                      aria-label={`Region ${group.name}`}
                      style={{ minHeight: touch, justifyContent: 'center' }}
                    >
                      <Text heading={2} size="lead" weight="semibold">
                        {group.name}
                      </Text>
                    </Press>
                  }
                  aside={
                    <Text mono tone="quiet">
                      {group.shells.length}
                    </Text>
                  }
                >
                  <View role="list" aria-label={`Shells of ${group.name}`}>
                    {group.shells.map((shell, i) => (
                      <Fragment key={shell.id}>
                        {i > 0 && <Rule />}
                        <ShellRow shell={shell} />
                      </Fragment>
                    ))}
                  </View>
                </Panel>
              ))}
            </>
          );
        }}
      </RecordGate>
    </Screen>
  );
}
