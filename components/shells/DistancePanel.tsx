import { useState } from 'react';
import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useMay } from '@/hooks/useMe';
import { useDistances, useShellActions } from '@/hooks/useShells';
import { RecordGate } from '../frame/RecordGate';
import { readNumber } from '../regions/regionForm';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { ago } from '../ui/format';
import { Panel } from '../ui/Panel';
import { ProblemNotice } from '../ui/ProblemNotice';
import { Quantity } from '../ui/Quantity';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';

/** Distance entries of a shell; the newest one holds, the region's nominal one stands in. */
export function DistancePanel({ shell }: { shell: Shell }) {
  const distances = useDistances(shell.id);
  const mayAdd = useMay()('distance.add');
  const [adding, setAdding] = useState(false);
  const regional = shell.adopted?.distance?.source === 'region' ? shell.adopted.distance : null;
  return (
    <Panel title="Distance" aside={mayAdd && <Button icon="plus" label="Add" onPress={() => setAdding(true)} />}>
      <RecordGate read={distances} what="distances" skeleton={<Skeleton height={40} />}>
        {({ items }) => (
          <View style={{ gap: space(2) }}>
            {items.map((d, i) => (
              <View key={d.id} style={{ opacity: i === 0 ? 1 : 0.75 }}>
                <Quantity quantity={{ value: d.pc, se: d.errorPc, unit: 'pc' }} />
                <Text size="small" tone="quiet">
                  {[d.method, d.createdBy?.name, ago(d.createdAt), i === 0 ? 'in use' : null].filter(Boolean).join(' · ')}
                </Text>
                {d.note ? (
                  <Text size="small" tone="quiet">
                    {d.note}
                  </Text>
                ) : null}
              </View>
            ))}
            {items.length === 0 &&
              (regional ? (
                <View>
                  <Quantity quantity={{ value: regional.pc, se: regional.errorPc, unit: 'pc' }} />
                  <Text size="small" tone="quiet">
                    nominal distance of the region
                  </Text>
                </View>
              ) : (
                <Text tone="quiet">No distance yet: R and the age need one.</Text>
              ))}
          </View>
        )}
      </RecordGate>
      {adding && <DistanceDialog shell={shell} onClose={() => setAdding(false)} />}
    </Panel>
  );
}

function DistanceDialog({ shell, onClose }: { shell: Shell; onClose: () => void }) {
  const { addDistance } = useShellActions();
  const [values, setValues] = useState({ pc: '', errorPc: '', method: '', note: '' });
  const [problems, setProblems] = useState<Partial<Record<keyof typeof values, string>>>({});
  const [failure, setFailure] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const edit = (key: keyof typeof values) => ({
    value: values[key],
    onChangeText: (text: string) => setValues((v) => ({ ...v, [key]: text })),
    problem: problems[key],
  });
  async function send() {
    const pc = readNumber(values.pc);
    const errorPc = readNumber(values.errorPc);
    const found: typeof problems = {};
    if (!(pc !== null && pc > 0)) found.pc = 'A distance in parsecs, greater than 0.';
    if (errorPc !== null && !(errorPc >= 0)) found.errorPc = 'An error in parsecs, not below 0.';
    if (!values.method.trim()) found.method = 'Say how it was found: a colleague must be able to judge it.';
    setProblems(found);
    setFailure(null);
    if (Object.keys(found).length > 0) return;
    setBusy(true);
    try {
      await addDistance(shell, { pc: pc!, errorPc, method: values.method.trim(), note: values.note.trim() });
      onClose();
    } catch (error) {
      const problem = asProblem(error);
      if (problem.field && problem.field in values) setProblems({ [problem.field]: problem.detail });
      else setFailure(problem);
      setBusy(false);
    }
  }
  return (
    <Dialog
      title={`Distance of ${shell.name}`}
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button kind="primary" label="Add distance" busy={busy} onPress={() => void send()} />
        </>
      }
    >
      <View style={{ flexDirection: 'row', gap: space(3) }}>
        <View style={{ flex: 1 }}>
          <Field label="Distance" unit="pc" mono inputMode="decimal" autoFocus {...edit('pc')} />
        </View>
        <View style={{ flex: 1 }}>
          <Field label="Its error" unit="pc" mono inputMode="decimal" {...edit('errorPc')} />
        </View>
      </View>
      <Field label="Method" hint="As in: rotation curve, parallax of members, association." maxLength={120} {...edit('method')} />
      <Field label="Note" multiline maxLength={500} {...edit('note')} />
      {failure && <ProblemNotice problem={failure} />}
    </Dialog>
  );
}
