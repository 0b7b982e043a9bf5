import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { ProgressBar } from '@/components/ui/ProgressBar';
import { Text } from '@/components/ui/Text';
import { useToast } from '@/components/ui/Toast';
import { space } from '@/components/ui/tokens';
import { chooseFiles } from '@/components/upload/chooseFiles';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useImageActions } from '@/hooks/useImages';
import { useMay } from '@/hooks/useMe';
import type { SkyImage } from '@/shared/contract/images';

/** Add an image of the same sky to the region, and take the chosen one out again. */
export function CompanionImages({
  regionId,
  chosen,
  onAdded,
  onRemoved,
}: {
  regionId: string;
  chosen: SkyImage | null;
  onAdded: (image: SkyImage) => void;
  onRemoved: () => void;
}) {
  const may = useMay();
  const say = useToast();
  const { add, remove, restore } = useImageActions();
  const [sent, setSent] = useState<{ name: string; fraction: number } | null>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);

  async function addOne() {
    const [file] = await chooseFiles({ several: false });
    if (!file) return;
    setProblem(null);
    setSent({ name: file.name, fraction: 0 });
    try {
      const onProgress = (fraction: number) => setSent({ name: file.name, fraction });
      onAdded(await add(regionId, file, { onProgress }));
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setSent(null);
    }
  }
  async function takeOut(image: SkyImage) {
    setProblem(null);
    try {
      await remove(image);
      onRemoved();
      say({
        text: `${image.name} was taken out of the region.`,
        action: {
          label: 'Undo',
          perform: () => void restore(image.id).then(onAdded, (error) => setProblem(asProblem(error))),
        },
      });
    } catch (error) {
      setProblem(asProblem(error));
    }
  }

  const mayAdd = may('cube.upload');
  if (!mayAdd && !chosen) return null;
  return (
    <View style={{ gap: space(2) }}>
      {chosen && chosen.cautions.length > 0 && (
        <Text size="small" tone="quiet">
          {chosen.cautions.join(' ')}
        </Text>
      )}
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
        {mayAdd && (
          <Button label="Add an image" icon="plus" busy={sent !== null} onPress={() => void addOne()} />
        )}
        {chosen && may('cube.manage') && (
          <Button label="Take the image out" kind="quiet" onPress={() => void takeOut(chosen)} />
        )}
      </View>
      {sent && (
        <ProgressBar
          label={`Adding ${sent.name}`}
          value={sent.fraction}
          activity={sent.fraction < 1 ? 'Sending' : 'Reading the image'}
        />
      )}
      {problem && <ProblemNotice problem={problem} />}
    </View>
  );
}
