import { useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { ShellDialog } from '@/components/shells/ShellDialog';
import { Button } from '@/components/ui/Button';
import { Notice, ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useMay } from '@/hooks/useMe';

/** Why nothing can be marked just now, and what to do about it. */
export function MarkHint() {
  const { shell, shells, mayMark, reading, elsewhere, cube, chooseShell } = useSession();
  const may = useMay();
  const [naming, setNaming] = useState(false);
  if (!mayMark)
    return (
      <Notice title="You are looking only">
        Your role reads what others mark. The lead of the team can give you another one.
      </Notice>
    );
  if (elsewhere)
    return (
      <Notice kind="person" title="Your marks of this shell lie on another cube">
        <Text>A reading belongs to one cube. Open that cube to go on with it.</Text>
        <View style={{ flexDirection: 'row', paddingTop: space(1) }}>
          <Button label="Open that cube" href={`/cubes/${elsewhere}?shell=${shell?.id ?? ''}`} />
        </View>
      </Notice>
    );
  if (reading.problem && shell) return <ProblemNotice problem={reading.problem} onRetry={reading.reload} />;
  if (shell || !shells.data) return null;
  return (
    <>
      <Notice kind="model" title="Choose a shell to mark its rim">
        <Text>
          {shells.data.items.length > 0
            ? 'Take one of the region’s shells, or name a new one; then tap points along its ring.'
            : 'Name the shell you see; then tap points along its ring.'}
        </Text>
        {may('shell.create') && (
          <View style={{ flexDirection: 'row', paddingTop: space(1) }}>
            <Button label="Name a new shell" icon="plus" onPress={() => setNaming(true)} />
          </View>
        )}
      </Notice>
      {naming && (
        <ShellDialog
          regionId={cube.regionId}
          onClose={() => setNaming(false)}
          onDone={(made) => chooseShell(made.id)}
        />
      )}
    </>
  );
}
