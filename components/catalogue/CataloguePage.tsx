import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo, useState } from 'react';
import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { AGE_FACTOR } from '@/shared/physics/age';
import { API } from '@/hooks/api';
import { useRegions } from '@/hooks/useRegions';
import { useCatalogue } from '@/hooks/useShells';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { EmptyState } from '../ui/EmptyState';
import { pageRows, Pager } from '../ui/Pager';
import { Panel } from '../ui/Panel';
import { SegmentedChoice } from '../ui/SegmentedChoice';
import { Select } from '../ui/Select';
import { SkeletonRows } from '../ui/Skeleton';
import { Table } from '../ui/Table';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { ChartPanel } from './ChartPanel';
import { catalogueColumns } from './columns';
import { FilterBar } from './FilterBar';
import {
  addressOf,
  filtersOf,
  MOST_PICKED,
  narrowing,
  queryOf,
  sortedBy,
  toggled,
  type Filters,
  type SortKey,
} from './filters';
import { PickBar } from './PickBar';
import { ShellCard } from './ShellCard';

const sortNames: { value: SortKey; label: string }[] = [
  { value: 'designation', label: 'designation' },
  { value: 'name', label: 'name' },
  { value: 'region', label: 'region' },
  { value: 'theta', label: 'Θ' },
  { value: 'radius', label: 'R' },
  { value: 'vSys', label: 'v sys' },
  { value: 'vExp', label: 'v exp' },
  { value: 'age', label: 'age' },
  { value: 'quality', label: 'χ²/dof' },
  { value: 'status', label: 'status' },
];

/** Every shell with an adopted fit, across the regions: table, chart, comparison, download. */
export function CataloguePage() {
  const params = useLocalSearchParams();
  const router = useRouter();
  const filters = useMemo(() => filtersOf(params), [params]);
  const query = queryOf(filters);
  const setFilters = useCallback(
    (next: Filters) =>
      // other shells, or another order: from the first page on
      router.setParams({ ...addressOf(next), ...(queryOf(next) !== query && { page: undefined }) }),
    [router, query],
  );
  const setPage = useCallback(
    (page: number) => router.setParams({ page: page === 1 ? undefined : String(page) }),
    [router],
  );
  const shells = useCatalogue(query);
  const regions = useRegions();
  const order = useMemo(() => (regions.data?.items ?? []).map((r) => r.id), [regions.data]);
  const regionIndex = useCallback((id: string) => Math.max(0, order.indexOf(id)), [order]);
  const total = shells.data?.total ?? 0;
  return (
    <Screen
      title="Shells across regions"
      crumbs={[{ label: 'Catalogue' }, { label: narrowing(filters) > 0 ? 'Filtered' : 'All regions' }]}
      subtitle={shells.data ? `${shells.data.items.length} of ${total}` : undefined}
      actions={
        !shells.data
          ? null
          : total > 0 && (
              <Button
                icon="download"
                label="Download CSV"
                href={`${API}/shells.csv?${query}` as '/'}
                external
                download="outswell-shells.csv"
              />
            )
      }
    >
      <FilterBar filters={filters} regions={regions.data?.items ?? []} onChange={setFilters} />
      <RecordGate read={shells} what="shells" skeleton={<SkeletonRows rows={8} height={52} />}>
        {({ items }) =>
          items.length === 0 ? (
            <Nothing narrowed={narrowing(filters) > 0} />
          ) : (
            <Listed
              items={items}
              filters={filters}
              setFilters={setFilters}
              regionIndex={regionIndex}
              asked={Number(params.page ?? 1)}
              setPage={setPage}
            />
          )
        }
      </RecordGate>
    </Screen>
  );
}

function Nothing({ narrowed }: { narrowed: boolean }) {
  if (narrowed)
    return (
      <EmptyState icon="filter" title="No shell passes these filters">
        Widen or clear them.
      </EmptyState>
    );
  return (
    <EmptyState
      icon="catalogue"
      title="The catalogue is empty"
      action={<Button kind="primary" label="To the shells" href="/shells" />}
    >
      A shell appears here once one of its fits of record is adopted.
    </EmptyState>
  );
}

function Listed({
  items,
  filters,
  setFilters,
  regionIndex,
  asked,
  setPage,
}: {
  items: readonly Shell[];
  filters: Filters;
  setFilters: (filters: Filters) => void;
  regionIndex: (regionId: string) => number;
  /** The page that the address asks for, from 1. */
  asked: number;
  setPage: (page: number) => void;
}) {
  const { wide, width } = useWide();
  const [view, setView] = useState<'list' | 'chart'>('list');
  const picked = filters.pick.flatMap((id) => items.find((s) => s.id === id) ?? []);
  const pick = (id: string) => setFilters({ ...filters, pick: toggled(filters.pick, id) });
  const mayPick = (id: string) => filters.pick.includes(id) || picked.length < MOST_PICKED;
  const clear = () => setFilters({ ...filters, pick: [] });
  const chart = (
    <ChartPanel
      shells={items}
      regionIndex={regionIndex}
      picked={filters.pick}
      height={wide ? space(104) : space(92)}
    />
  );
  const { rows, page } = pageRows(items, asked);
  const pager = <Pager what="shells" total={items.length} page={page} onPage={setPage} />;
  const bar = <PickBar picked={picked} onClear={clear} />;

  if (!wide)
    return (
      <>
        <View
          style={{
            flexDirection: 'row',
            gap: space(2),
            alignItems: 'center',
            justifyContent: 'space-between',
          }}
        >
          <SegmentedChoice
            label="Show"
            hideLabel
            value={view}
            onChange={setView}
            options={[
              { value: 'list', label: 'List' },
              { value: 'chart', label: 'Chart' },
            ]}
          />
          {view === 'list' && (
            <Select
              label="Sort by"
              hideLabel
              value={`${filters.sort} ${filters.order}`}
              onChange={(value) => {
                const [sort, order] = value.split(' ') as [SortKey, Filters['order']];
                setFilters({ ...filters, sort, order });
              }}
              options={sortNames.flatMap(({ value, label }) => [
                { value: `${value} up`, label: `${label} ↑` },
                { value: `${value} down`, label: `${label} ↓` },
              ])}
            />
          )}
        </View>
        {bar}
        {view === 'chart' ? (
          chart
        ) : (
          <View role="list" aria-label="Shells" style={{ gap: space(3) }}>
            {rows.map((s) => (
              <ShellCard
                key={s.id}
                shell={s}
                regionIndex={regionIndex(s.regionId)}
                picked={filters.pick.includes(s.id)}
                mayPick={mayPick(s.id)}
                onPick={() => pick(s.id)}
              />
            ))}
          </View>
        )}
        {view === 'list' && pager}
      </>
    );

  const beside = width >= 1360;
  const table = (
    <Panel flush style={beside ? { flex: 1, minWidth: 0 } : undefined}>
      <Table
        label="Shells with an adopted fit"
        columns={catalogueColumns({
          regionIndex,
          picked: filters.pick,
          onPick: pick,
          mayPick,
          ageFactor: items[0]?.adopted?.ageFactor ?? AGE_FACTOR,
        })}
        rows={rows}
        rowKey={(s) => s.id}
        sort={{ key: filters.sort, order: filters.order }}
        onSort={(key) => setFilters(sortedBy(filters, key as SortKey))}
        selected={(s) => filters.pick.includes(s.id)}
      />
      {items.length > rows.length && <View style={{ padding: space(2) }}>{pager}</View>}
    </Panel>
  );
  return (
    <View
      style={{
        flexDirection: beside ? 'row' : 'column',
        gap: space(4),
        alignItems: beside ? 'flex-start' : 'stretch',
      }}
    >
      {table}
      <View style={[{ gap: space(4) }, beside && { width: space(97) }]}>
        {chart}
        {bar}
      </View>
    </View>
  );
}
