import { useState } from 'react';
import { View } from 'react-native';
import { beamWords, restFrequencyWords, restWords } from '@/components/about/cubeWords';
import { OverridesDialog } from '@/components/about/OverridesDialog';
import { Button, IconButton } from '@/components/ui/Button';
import { moment } from '@/components/ui/format';
import { Panel } from '@/components/ui/Panel';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space, touch } from '@/components/ui/tokens';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useCubeActions } from '@/hooks/useCubes';
import { useMay } from '@/hooks/useMe';
import type { Cube, CubeOverrides } from '@/shared/contract/cubes';

type Name = keyof CubeOverrides;

/** What somebody says of the cube against its header, or beside it, with who and when. */
export function OverridesPanel({ cube }: { cube: Cube }) {
  const { color } = useTheme();
  const may = useMay()('cube.manage');
  const { override } = useCubeActions();
  const [open, setOpen] = useState(false);
  const [busy, setBusy] = useState<Name | null>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  if (!cube.axes) return null;
  const said = saidOf(cube.overrides?.values ?? {});
  const takeBack = async (name: Name) => {
    setBusy(name);
    setProblem(null);
    try {
      await override(cube.id, { [name]: null });
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(null);
    }
  };
  return (
    <Panel
      title="Said by the team"
      aside={
        may && (
          <Button
            label={said.length > 0 ? 'Change' : 'Correct the header'}
            icon="edit"
            onPress={() => setOpen(true)}
          />
        )
      }
    >
      {said.length === 0 ? (
        <Text tone="quiet">
          Everything is as the header says. Unit, beam, rest frequency, convention and frame of the velocities
          can be said here where the header does not, or says them wrong; the file stays as it is.
        </Text>
      ) : (
        <>
          <View role="list" aria-label="Said by the team">
            {said.map(({ name, label, value }, i) => (
              <View
                key={name}
                role="listitem"
                style={{
                  flexDirection: 'row',
                  alignItems: 'center',
                  gap: space(2),
                  minHeight: touch,
                  borderBottomWidth: i === said.length - 1 ? 0 : hairline,
                  borderBottomColor: color.line,
                }}
              >
                <Text style={{ flex: 1 }}>{label}</Text>
                <Text tone="person" weight="semibold" align="right" style={{ flexShrink: 1 }}>
                  {value}
                </Text>
                {may && (
                  <IconButton
                    icon="undo"
                    tone="quiet"
                    size={18}
                    label={`Take back: ${label.toLowerCase()}`}
                    disabled={busy !== null}
                    onPress={() => void takeBack(name)}
                  />
                )}
              </View>
            ))}
          </View>
          <Text size="small" tone="quiet">
            {`${cube.overrides?.by?.name ?? 'Someone'}, ${moment(cube.overrides!.at)}`}
          </Text>
        </>
      )}
      {problem && <ProblemNotice problem={problem} />}
      {open && <OverridesDialog cube={cube} onClose={() => setOpen(false)} />}
    </Panel>
  );
}

function saidOf(values: CubeOverrides): { name: Name; label: string; value: string }[] {
  const { unit, restFrequencyHz, beam, convention, velocityFrame } = values;
  return [
    unit ? { name: 'unit' as const, label: 'Unit', value: unit } : null,
    beam ? { name: 'beam' as const, label: 'Beam', value: beamWords(beam) } : null,
    restFrequencyHz
      ? {
          name: 'restFrequencyHz' as const,
          label: 'Rest frequency',
          value: restFrequencyWords(restFrequencyHz),
        }
      : null,
    convention ? { name: 'convention' as const, label: 'Convention', value: convention } : null,
    velocityFrame
      ? { name: 'velocityFrame' as const, label: 'At rest with', value: restWords(velocityFrame) }
      : null,
  ].filter((entry) => entry !== null);
}
