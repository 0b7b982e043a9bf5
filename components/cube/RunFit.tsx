import { View } from 'react-native';
import type { RecordFit } from '@/components/cube/useRecordFit';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';

/** The button that freezes the marks and queues the fit; where it cannot, it says why. */
export function RunFit({ record }: { record: RecordFit }) {
  return (
    <View style={{ gap: space(1) }}>
      <Button
        kind="primary"
        wide
        label="Run the fit of record"
        disabled={record.obstacle !== null}
        busy={record.busy}
        onPress={() => void record.run()}
      />
      {record.obstacle && (
        <Text size="small" tone="quiet" align="center">
          {record.obstacle}
        </Text>
      )}
    </View>
  );
}
