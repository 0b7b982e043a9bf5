import { useLocalSearchParams } from 'expo-router';
import { CubeScreen } from '@/components/cube/CubeScreen';

export default function CubeRoute() {
  const { cubeId } = useLocalSearchParams<{ cubeId: string }>();
  return <CubeScreen key={cubeId} cubeId={cubeId} />;
}
