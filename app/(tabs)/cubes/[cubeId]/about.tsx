import { useLocalSearchParams } from 'expo-router';
import { AboutPage } from '@/components/about/AboutPage';

export default function AboutCubeRoute() {
  const { cubeId } = useLocalSearchParams<{ cubeId: string }>();
  return <AboutPage key={cubeId} cubeId={cubeId} />;
}
