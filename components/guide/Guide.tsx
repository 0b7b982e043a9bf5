import { usePathname, useRouter } from 'expo-router';
import { useState } from 'react';
import { GuideCard } from '@/components/guide/GuideCard';
import { GuideOffer } from '@/components/guide/GuideOffer';
import { guideSeen, keepGuideSeen } from '@/components/guide/guideMemory';
import { GUIDE } from '@/components/guide/guideSteps';
import { useCommands } from '@/components/ui/commands/CommandsProvider';
import { useToast } from '@/components/ui/Toast';
import { api, asProblem } from '@/hooks/api';
import { keys } from '@/hooks/keys';
import type { List } from '@/hooks/useRead';
import type { Cube } from '@/shared/contract/cubes';
import type { Region } from '@/shared/contract/regions';

/** Shows a new person around: offered once, on the real controls, and kept under the list of keys. */
export function Guide({ personId }: { personId: string }) {
  const router = useRouter();
  const path = usePathname();
  const say = useToast();
  const [offered, setOffered] = useState(() => !guideSeen(personId));
  const [step, setStep] = useState<number | null>(null);
  const atCube = /^\/cubes\/[^/]+$/.test(path);

  async function begin() {
    setOffered(false);
    keepGuideSeen(personId);
    if (atCube) return setStep(0);
    try {
      const cube = await readyCube();
      if (!cube)
        return say({ text: 'The guide needs a cube to show things on: upload one to a region first.' });
      router.push(`/cubes/${cube.id}`);
      setStep(0);
    } catch (error) {
      say({ kind: 'error', text: asProblem(error).title });
    }
  }
  useCommands([{ name: 'guide.begin', label: 'Show me around', group: 'Help', perform: () => void begin() }]);

  const card = step === null ? null : GUIDE[step];
  if (step !== null && card)
    return (
      <GuideCard
        step={card}
        number={step + 1}
        of={GUIDE.length}
        onStep={(by) => setStep(step + by)}
        onClose={() => setStep(null)}
      />
    );
  if (!offered || atCube) return null; // there it would lie on what a person works with
  return (
    <GuideOffer
      onBegin={() => void begin()}
      onRefuse={() => {
        keepGuideSeen(personId);
        setOffered(false);
      }}
    />
  );
}

/** Any cube that can be looked at. */
async function readyCube(): Promise<Cube | null> {
  const regions = await api<List<Region>>(keys.regions());
  for (const region of regions.items) {
    const cubes = await api<List<Cube>>(keys.cubes(region.id));
    const ready = cubes.items.find((c) => c.status === 'ready');
    if (ready) return ready;
  }
  return null;
}
