import { lazy, Suspense, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import type { RecordFit } from '@/components/cube/useRecordFit';
import { defaultForm } from '@/components/fit/fitForm';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';

const FitDialog = lazy(() => import('@/components/fit/FitDialog'));

/**
 * The button that freezes the marks and queues the usual fit, and the way to settings of one's own; where it cannot, it
 * says why.
 */
export function RunFit({ record }: { record: RecordFit }) {
  const { shell, fitStart } = useSession();
  const [asking, setAsking] = useState(false);
  return (
    <View style={{ gap: space(1) }}>
      <View style={{ flexDirection: 'row', gap: space(2) }}>
        <Button
          kind="primary"
          label="Run the fit of record"
          disabled={record.obstacle !== null}
          busy={record.busy}
          onPress={() => void record.run()}
          style={{ flexGrow: 1, flexShrink: 1 }}
        />
        <Button
          label="Options…"
          aria-label="Options of the fit"
          disabled={!record.mayChoose}
          onPress={() => setAsking(true)}
        />
      </View>
      {record.obstacle && (
        <Text size="small" tone="quiet" align="center">
          {record.obstacle}
        </Text>
      )}
      {asking && shell && (
        <Suspense fallback={null}>
          <FitDialog
            shell={shell}
            start={defaultForm(record.readingId, fitStart)}
            onRun={record.runAs}
            onClose={() => setAsking(false)}
          />
        </Suspense>
      )}
    </View>
  );
}
