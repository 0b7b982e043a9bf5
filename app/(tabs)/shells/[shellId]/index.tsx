import { useLocalSearchParams } from 'expo-router';
import { ShellPage } from '@/components/shells/ShellPage';

export default function ShellScreen() {
  const { shellId } = useLocalSearchParams<{ shellId: string }>();
  return <ShellPage key={shellId} shellId={shellId} />;
}
