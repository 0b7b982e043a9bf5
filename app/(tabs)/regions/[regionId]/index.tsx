import { useLocalSearchParams } from 'expo-router';
import { RegionPage } from '@/components/regions/RegionPage';

export default function RegionScreen() {
  const { regionId } = useLocalSearchParams<{ regionId: string }>();
  return <RegionPage key={regionId} regionId={regionId} />;
}
