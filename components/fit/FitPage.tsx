import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { useFit } from '@/hooks/useFits';
import { useShell } from '@/hooks/useShells';
import type { Fit } from '@/shared/contract/fits';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Chip, StatusChip } from '../ui/Chip';
import { EmptyState } from '../ui/EmptyState';
import { moment } from '../ui/format';
import { Button } from '../ui/Button';
import { Panel } from '../ui/Panel';
import { SkeletonRows } from '../ui/Skeleton';
import { FitActions } from './FitActions';
import { isDone, modelNames } from './fitFacts';
import { FitProgress } from './FitProgress';

// plots and tables of the report come when a fit is opened
const FitReport = lazy(() => import('./FitReport'));

/** A fit of record with everything that it rests on; while it runs, how far it is. */
export function FitPage({ shellId, fitId }: { shellId: string; fitId: string }) {
  const shell = useShell(shellId).data;
  const read = useFit(fitId);
  const fit = read.data?.shellId === shellId ? read.data : undefined;
  const name = shell?.name ?? 'Shell';
  const kind = fit ? `Fit: ${modelNames[fit.model]}` : 'Fit';
  const home = `/shells/${shellId}` as const;
  return (
    <Screen
      title={kind}
      subtitle={[shell?.name, fit && moment(fit.finishedAt ?? fit.createdAt)].filter(Boolean).join(' · ')}
      crumbs={[
        ...(shell ? [{ label: shell.regionName, href: `/regions/${shell.regionId}` as const }] : []),
        { label: name, href: home },
        { label: kind },
      ]}
      back={home}
      actions={
        fit ? (
          <>
            <State fit={fit} />
            {shell && isDone(fit) && <FitActions fit={fit} shell={shell} />}
          </>
        ) : null
      }
    >
      <RecordGate read={read} what="fit" home={{ href: home, label: 'To the shell' }}>
        {(found) =>
          found.shellId !== shellId ? (
            <EmptyState
              icon="search"
              title="There is no fit here"
              action={<Button kind="primary" label="To the shell" href={home} />}
            >
              The link names a fit of another shell.
            </EmptyState>
          ) : isDone(found) ? (
            <Suspense fallback={<SkeletonRows rows={3} height={200} />}>
              <FitReport fit={found} name={name} />
            </Suspense>
          ) : (
            <View style={{ alignSelf: 'stretch' }}>
              <Panel>
                <FitProgress fit={found} />
              </Panel>
            </View>
          )
        }
      </RecordGate>
    </Screen>
  );
}

function State({ fit }: { fit: Fit }) {
  return fit.adopted ? (
    <Chip label="adopted" kind="model" icon="check" />
  ) : (
    <StatusChip status={fit.status} />
  );
}
