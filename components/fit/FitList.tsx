import { Fragment, lazy, Suspense, useMemo, useState } from 'react';
import { View } from 'react-native';
import { useFitActions, useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useTraces } from '@/hooks/useTraces';
import type { Shell } from '@/shared/contract/shells';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { Panel, Rule } from '../ui/Panel';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { differences } from './differences';
import { FitRow } from './FitRow';

const FitDialog = lazy(() => import('./FitDialog'));

/** The fits of record of a shell, with what tells them apart; each leads to its page, one of them stands for the shell. */
export function FitList({ shell }: { shell: Shell }) {
  const fits = useFits(shell.id);
  const traces = useTraces(shell.id).data?.items;
  const may = useMay();
  const { run } = useFitActions();
  const [asking, setAsking] = useState(false);
  const items = fits.data?.items;
  const apart = useMemo(() => differences(items ?? [], traces ?? []), [items, traces]);
  const mayRun = may('fit.run') && shell.readings.some((r) => r.mine);
  return (
    <Panel
      flush
      title="Fits of record"
      aside={mayRun && <Button icon="plus" label="New fit" onPress={() => setAsking(true)} />}
    >
      <RecordGate
        read={fits}
        what="fits"
        skeleton={
          <View style={{ padding: space(4) }}>
            <SkeletonRows rows={2} />
          </View>
        }
      >
        {({ items: list }) =>
          list.length === 0 ? (
            <Text tone="quiet" style={{ padding: space(4), paddingTop: 0 }}>
              None yet. Open the shell in a cube, mark its rim on three channels or more, and run the fit of
              record.
            </Text>
          ) : (
            <View role="list" aria-label="Fits of record">
              {list.map((fit, i) => (
                <Fragment key={fit.id}>
                  {i > 0 && <Rule />}
                  <FitRow fit={fit} apart={apart.get(fit.id) ?? []} />
                </Fragment>
              ))}
            </View>
          )
        }
      </RecordGate>
      {asking && (
        <Suspense fallback={null}>
          <FitDialog shell={shell} onClose={() => setAsking(false)} onRun={(draft) => run(shell.id, draft)} />
        </Suspense>
      )}
    </Panel>
  );
}
