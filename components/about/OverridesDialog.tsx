import { useState } from 'react';
import { View } from 'react-native';
import { restWords } from '@/components/about/cubeWords';
import {
  CONVENTIONS,
  fieldsOf,
  placeProblem,
  readOverrides,
  REST_FRAMES,
  UNITS,
  type OverrideFields,
  type OverrideProblems,
} from '@/components/about/overridesForm';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Field } from '@/components/ui/Field';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useCubeActions } from '@/hooks/useCubes';
import type { Cube } from '@/shared/contract/cubes';

const AS_FILE = { value: '', label: 'as the file says' };

/** Unit, beam and velocity axis as somebody knows them; what is left empty stays as the file says. */
export function OverridesDialog({ cube, onClose }: { cube: Cube; onClose: () => void }) {
  const before = cube.overrides?.values ?? null;
  const [fields, setFields] = useState(() => fieldsOf(before));
  const [problems, setProblems] = useState<OverrideProblems>({});
  const [failure, setFailure] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const { override } = useCubeActions();
  const set = (name: keyof OverrideFields) => (value: string) => setFields((f) => ({ ...f, [name]: value }));
  const typed = (name: keyof OverrideFields) => ({
    value: fields[name],
    onChangeText: set(name),
    problem: problems[name],
    onSubmitEditing: () => void send(),
    inputMode: 'decimal' as const,
    mono: true,
  });

  async function send() {
    const result = readOverrides(fields, before);
    setFailure(null);
    setProblems('problems' in result ? result.problems : {});
    if ('problems' in result) return;
    if (Object.keys(result.change).length === 0) return onClose();
    setBusy(true);
    try {
      await override(cube.id, result.change);
      onClose();
    } catch (error) {
      const problem = asProblem(error);
      const placed = placeProblem(problem.field, problem.detail);
      if (placed) setProblems(placed);
      else setFailure(problem);
      setBusy(false);
    }
  }

  return (
    <Dialog
      title="Correct the header"
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button kind="primary" label="Save" busy={busy} onPress={() => void send()} />
        </>
      }
    >
      <Text tone="quiet">
        For this cube and everybody in the team. The file stays as it is, and what is left empty is as the
        file says.
      </Text>
      <Select
        label="Brightness unit"
        value={fields.unit}
        options={[AS_FILE, ...UNITS.map((u) => ({ value: u as string, label: u as string }))]}
        onChange={set('unit')}
      />
      <View style={{ flexDirection: 'row', gap: space(3), alignItems: 'flex-start' }}>
        <View style={{ flex: 1 }}>
          <Field label="Beam, longer" unit="′" {...typed('major')} autoFocus />
        </View>
        <View style={{ flex: 1 }}>
          <Field label="shorter" unit="′" {...typed('minor')} />
        </View>
        <View style={{ flex: 1 }}>
          <Field label="angle" unit="°" {...typed('angle')} />
        </View>
      </View>
      <Field
        label="Rest frequency"
        unit="MHz"
        hint="1420.405752 MHz is the 21-cm line."
        {...typed('restMHz')}
      />
      <Select
        label="Velocity convention"
        value={fields.convention}
        options={[AS_FILE, ...CONVENTIONS.map((c) => ({ value: c as string, label: c as string }))]}
        onChange={set('convention')}
      />
      <Select
        label="Velocities at rest with"
        value={fields.velocityFrame}
        options={[AS_FILE, ...REST_FRAMES.map((f) => ({ value: f as string, label: restWords(f) }))]}
        onChange={set('velocityFrame')}
      />
      {failure && <ProblemNotice problem={failure} onRetry={() => void send()} busy={busy} />}
    </Dialog>
  );
}
