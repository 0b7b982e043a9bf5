import { useLocalSearchParams } from 'expo-router';
import { FitPage } from '@/components/fit/FitPage';

export default function FitRoute() {
  const { shellId, fitId } = useLocalSearchParams<{ shellId: string; fitId: string }>();
  return <FitPage key={fitId} shellId={shellId} fitId={fitId} />;
}
