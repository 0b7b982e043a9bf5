import { useState } from 'react';
import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { EmptyState } from '@/components/ui/EmptyState';
import { fileSize } from '@/components/ui/format';
import { Panel } from '@/components/ui/Panel';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { ProgressBar } from '@/components/ui/ProgressBar';
import { Text } from '@/components/ui/Text';
import { layout, space } from '@/components/ui/tokens';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useCubeActions } from '@/hooks/useCubes';
import { useMay } from '@/hooks/useMe';
import type { Cube } from '@/shared/contract/cubes';

/** A cube that cannot be looked at yet, or at all: what is happening, and what can be done. */
export function CubeState({ cube }: { cube: Cube }) {
  return (
    <View
      style={{
        padding: space(5),
        gap: space(4),
        width: '100%',
        maxWidth: layout.readable,
        alignSelf: 'center',
      }}
    >
      <CubeProgress cube={cube} />
      {cube.cautions.length > 0 && (
        <Panel title="Read with care">
          {cube.cautions.map((caution) => (
            <Text key={caution}>{caution}</Text>
          ))}
        </Panel>
      )}
      <View style={{ flexDirection: 'row' }}>
        <Button label="About this cube" icon="info" href={`/cubes/${cube.id}/about`} />
      </View>
    </View>
  );
}

/** How far its reading is, why it failed, and the ways on from there. */
export function CubeProgress({ cube }: { cube: Cube }) {
  const { retry, cancel } = useCubeActions();
  const may = useMay();
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const act = (what: (id: string) => Promise<unknown>) => () => {
    setBusy(true);
    setProblem(null);
    what(cube.id)
      .catch((error: unknown) => setProblem(asProblem(error)))
      .finally(() => setBusy(false));
  };
  const reading = cube.status === 'uploaded' || cube.status === 'ingesting';
  return (
    <>
      {reading && (
        <Panel title={cube.status === 'uploaded' ? 'Waiting to be read' : 'Being read'}>
          <Text tone="quiet">
            {`${cube.fileName}, ${fileSize(cube.sizeBytes)}. The channel maps open by themselves when it is done.`}
          </Text>
          <ProgressBar
            value={cube.progress}
            label={`Reading ${cube.name}`}
            activity={cube.activity ?? (cube.status === 'uploaded' ? 'Waiting for the worker' : 'Reading')}
          />
          {may('cube.manage') && (
            <View style={{ flexDirection: 'row' }}>
              <Button label="Stop" icon="close" busy={busy} onPress={act(cancel)} />
            </View>
          )}
        </Panel>
      )}
      {cube.status === 'failed' && (
        <ProblemNotice
          problem={cube.problem ?? { title: 'Reading the cube failed', detail: 'No cause was kept.' }}
          onRetry={may('cube.manage') ? act(retry) : undefined}
          busy={busy}
        />
      )}
      {cube.status === 'cancelled' && (
        <EmptyState
          icon="cube"
          title="Reading was stopped"
          action={
            may('cube.manage') && (
              <Button label="Read it again" icon="retry" kind="primary" busy={busy} onPress={act(retry)} />
            )
          }
        >
          The file is kept; read it again to look at its channels.
        </EmptyState>
      )}
      {problem && <ProblemNotice problem={problem} />}
    </>
  );
}
