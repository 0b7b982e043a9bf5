import { useState } from 'react';
import { View } from 'react-native';
import type { Region } from '@/shared/contract/regions';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useRegionActions } from '@/hooks/useRegions';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { ProblemNotice } from '../ui/ProblemNotice';
import { space } from '../ui/tokens';
import { placeProblem, readRegionForm, valuesOf, type RegionFormProblems } from './regionForm';

/** Makes a region, or changes one. */
export function RegionDialog({
  region,
  onClose,
  onDone,
}: {
  region: Region | null;
  onClose: () => void;
  onDone?: (region: Region) => void;
}) {
  const [values, setValues] = useState(() => valuesOf(region));
  const [problems, setProblems] = useState<RegionFormProblems>({});
  const [failure, setFailure] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const { make, change } = useRegionActions();
  const edit = (key: keyof typeof values) => ({
    value: values[key],
    onChangeText: (text: string) => setValues((v) => ({ ...v, [key]: text })),
    problem: problems[key],
    onSubmitEditing: () => void send(),
  });

  async function send() {
    const result = readRegionForm(values);
    setFailure(null);
    setProblems('problems' in result ? result.problems : {});
    if ('problems' in result) return;
    setBusy(true);
    try {
      const saved = region ? await change(region.id, result.draft) : await make(result.draft);
      onClose();
      onDone?.(saved);
    } catch (error) {
      const problem = asProblem(error);
      const placed = placeProblem(problem);
      if (placed) setProblems(placed);
      else setFailure(problem);
      setBusy(false);
    }
  }

  return (
    <Dialog
      title={region ? 'Edit region' : 'New region'}
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            kind="primary"
            label={region ? 'Save' : 'Make region'}
            busy={busy}
            onPress={() => void send()}
          />
        </>
      }
    >
      <Field label="Name" {...edit('name')} maxLength={80} autoFocus />
      <Field
        label="Description"
        hint="A sentence on what is studied here."
        {...edit('description')}
        maxLength={500}
        multiline
      />
      <Pair>
        <Field label="Centre l" unit="°" mono inputMode="decimal" {...edit('l')} />
        <Field label="Centre b" unit="°" mono inputMode="decimal" {...edit('b')} />
      </Pair>
      <Pair>
        <Field label="Distance" unit="pc" mono inputMode="decimal" {...edit('distance')} />
        <Field label="Its error" unit="pc" mono inputMode="decimal" {...edit('distanceError')} />
      </Pair>
      {failure && <ProblemNotice problem={failure} onRetry={() => void send()} busy={busy} />}
    </Dialog>
  );
}

function Pair({ children }: { children: [React.ReactNode, React.ReactNode] }) {
  return (
    <View style={{ flexDirection: 'row', gap: space(3), alignItems: 'flex-start' }}>
      <View style={{ flex: 1 }}>{children[0]}</View>
      <View style={{ flex: 1 }}>{children[1]}</View>
    </View>
  );
}
