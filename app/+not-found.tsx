import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { useDocumentTitle } from '@/components/frame/Screen';
import { useTheme } from '@/components/ui/theme';

export default function NotFound() {
  const { color } = useTheme();
  useDocumentTitle('Not found');
  return (
    <View role="main" style={{ flex: 1, justifyContent: 'center', backgroundColor: color.ground }}>
      <EmptyState
        icon="search"
        level={1}
        title="There is no such page"
        action={<Button kind="primary" label="To the regions" href="/regions" />}
      >
        The address may be mistyped, or the page may have moved.
      </EmptyState>
    </View>
  );
}
