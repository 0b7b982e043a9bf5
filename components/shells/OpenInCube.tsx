import { useRouter } from 'expo-router';
import type { Shell } from '@/shared/contract/shells';
import { useCubes } from '@/hooks/useCubes';
import { Button } from '../ui/Button';
import { Menu } from '../ui/Menu';

/** To the channel maps: straight to the cube that carries marks, or a choice of the region's cubes. */
export function OpenInCube({ shell }: { shell: Shell }) {
  const router = useRouter();
  const cubes = useCubes(shell.regionId);
  const ready = (cubes.data?.items ?? []).filter((c) => c.status === 'ready');
  const reading = shell.readings.find((r) => r.mine) ?? shell.readings[0];
  const only = ready.find((c) => c.id === reading?.cubeId) ?? (ready.length === 1 ? ready[0] : undefined);
  const address = (cubeId: string) => `/cubes/${cubeId}?shell=${shell.id}` as const;
  if (only) return <Button kind="primary" icon="cube" label="Open in cube" href={address(only.id)} />;
  if (ready.length === 0)
    return <Button icon="upload" label="Upload a cube first" href={`/regions/${shell.regionId}`} />;
  return (
    <Menu
      text
      icon="cube"
      label="Open in cube"
      items={ready.map((c) => ({
        label: c.name,
        icon: 'cube' as const,
        perform: () => router.push(address(c.id)),
      }))}
    />
  );
}
