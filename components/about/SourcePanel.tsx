import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Panel } from '@/components/ui/Panel';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useCubeActions } from '@/hooks/useCubes';
import { useMay } from '@/hooks/useMe';
import type { Cube } from '@/shared/contract/cubes';

/** Which image of the file, and which plane of its Stokes axis, is the cube. */
export function SourcePanel({ cube }: { cube: Cube }) {
  const { hdus, stokes } = cube.choices;
  const may = useMay();
  const { chooseSource } = useCubeActions();
  const [asked, setAsked] = useState(cube.source);
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  if (hdus.length < 2 && stokes.length < 2) return null;
  const changes = asked.hdu !== cube.source.hdu || asked.stokes !== cube.source.stokes;
  const read = async () => {
    setBusy(true);
    setProblem(null);
    try {
      await chooseSource(cube.id, asked);
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(false);
    }
  };
  const image = hdus.find((h) => h.index === cube.source.hdu);
  const plane = stokes.find((s) => s.index === cube.source.stokes);
  return (
    <Panel title="What of the file is read">
      {may('cube.manage') ? (
        <>
          <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(3) }}>
            {hdus.length > 1 && (
              <Select
                label="Image"
                value={String(asked.hdu)}
                options={hdus.map((h) => ({
                  value: String(h.index),
                  label: `${h.index}: ${h.name}${h.usable ? '' : ' (not a cube)'}`,
                  disabled: !h.usable,
                }))}
                onChange={(hdu) => setAsked({ hdu: Number(hdu), stokes: 0 })}
              />
            )}
            {stokes.length > 1 && asked.hdu === cube.source.hdu && (
              <Select
                label="Stokes plane"
                value={String(asked.stokes)}
                options={stokes.map((s) => ({ value: String(s.index), label: s.name }))}
                onChange={(s) => setAsked({ ...asked, stokes: Number(s) })}
              />
            )}
          </View>
          <Text size="small" tone="quiet">
            The cube is read again from there. Marks keep their channels and pixels; fits of record stay as
            they are.
          </Text>
          <View style={{ flexDirection: 'row' }}>
            <Button
              label="Read it from there"
              icon="retry"
              disabled={!changes}
              busy={busy}
              onPress={() => void read()}
            />
          </View>
          {problem && <ProblemNotice problem={problem} />}
        </>
      ) : (
        <Text>
          {[image && `Image ${image.index}, ${image.name}`, plane?.name].filter(Boolean).join('; ')}
        </Text>
      )}
    </Panel>
  );
}
