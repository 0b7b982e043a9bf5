import { View } from 'react-native';
import { isDone } from '@/components/fit/fitFacts';
import { RecordResults } from '@/components/cube/RecordResults';
import { useSession } from '@/components/cube/session';
import type { RecordFit } from '@/components/cube/useRecordFit';
import { Button } from '@/components/ui/Button';
import { StatusChip } from '@/components/ui/Chip';
import { moment } from '@/components/ui/format';
import { SectionTitle } from '@/components/ui/Panel';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { ProgressBar } from '@/components/ui/ProgressBar';
import { SkeletonRows } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';

/** What became of the newest fit of record. */
export function RecordPanel({ record }: { record: RecordFit }) {
  const { shell } = useSession();
  const { newest, problem, waiting, busy } = record;
  if (!shell) return null;
  if (waiting) return <SkeletonRows rows={2} label="Loading the fits" />;
  return (
    <View style={{ gap: space(3) }} testID="record">
      <View
        style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', gap: space(2) }}
      >
        <SectionTitle>Fit of record</SectionTitle>
        {newest && <StatusChip status={newest.status} />}
      </View>
      {problem && <ProblemNotice problem={problem} />}
      {!newest && (
        <Text tone="quiet" size="small">
          None yet. It freezes your marks, fits them in the worker and keeps the answer with all that made it.
        </Text>
      )}
      {newest && (newest.status === 'queued' || newest.status === 'running') && (
        <>
          <ProgressBar
            value={
              typeof newest.progress === 'number' ? newest.progress : newest.status === 'queued' ? 0 : 0.05
            }
            label="The fit of record"
            activity={
              typeof newest.activity === 'string'
                ? newest.activity
                : newest.status === 'queued'
                  ? 'Waiting for the worker'
                  : 'Fitting, and drawing its error bars'
            }
          />
          <View style={{ flexDirection: 'row' }}>
            <Button label="Stop" icon="close" busy={busy} onPress={() => void record.cancel()} />
          </View>
        </>
      )}
      {newest?.status === 'failed' && (
        <ProblemNotice
          problem={newest.problem ?? { title: 'The fit failed', detail: 'No cause was kept.' }}
          onRetry={() => void record.retry()}
          busy={busy}
        />
      )}
      {newest?.status === 'cancelled' && (
        <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(3) }}>
          <Text tone="quiet" style={{ flex: 1 }}>
            It was stopped.
          </Text>
          <Button label="Run it again" icon="retry" busy={busy} onPress={() => void record.retry()} />
        </View>
      )}
      {newest && isDone(newest) && (
        <>
          <Text size="small" tone="quiet">
            {`${newest.createdBy?.name ?? 'Someone'}, ${moment(newest.finishedAt ?? newest.createdAt)}`}
          </Text>
          <RecordResults fit={newest} />
          <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
            {record.mayAdopt &&
              (newest.adopted ? (
                <Button
                  label="Adopted"
                  icon="check"
                  selected
                  onPress={() => void record.adopt(false)}
                  busy={busy}
                  aria-label="Adopted. Press to take it back"
                />
              ) : (
                <Button
                  label="Adopt this fit"
                  disabled={!newest.adoptable}
                  onPress={() => void record.adopt(true)}
                  busy={busy}
                />
              ))}
            <Button label="All fits of this shell" kind="quiet" href={`/shells/${shell.id}`} />
          </View>
          {!newest.adoptable && (
            <Text size="small" tone="quiet">
              The marks do not measure the radius, so this fit cannot stand for the shell.
            </Text>
          )}
        </>
      )}
    </View>
  );
}
