import { View } from 'react-native';
import { isDone } from '@/components/fit/fitFacts';
import { FitProgress } from '@/components/fit/FitProgress';
import { RecordResults } from '@/components/cube/RecordResults';
import { useSession } from '@/components/cube/session';
import type { RecordFit } from '@/components/cube/useRecordFit';
import { Button } from '@/components/ui/Button';
import { StatusChip } from '@/components/ui/Chip';
import { moment } from '@/components/ui/format';
import { SectionTitle } from '@/components/ui/Panel';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
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
      {newest && !isDone(newest) && <FitProgress fit={newest} />}
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
            <Button label="The whole report" icon="chart" href={`/shells/${shell.id}/fits/${newest.id}`} />
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
