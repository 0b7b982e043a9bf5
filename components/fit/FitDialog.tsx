import { useState } from 'react';
import { View } from 'react-native';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useTraces } from '@/hooks/useTraces';
import type { FitDraft, ModelName } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';
import { Button } from '../ui/Button';
import { CheckBox } from '../ui/CheckBox';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { SectionTitle } from '../ui/Panel';
import { ProblemNotice } from '../ui/ProblemNotice';
import { Select } from '../ui/Select';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { ConstraintRow } from './ConstraintRow';
import {
  defaultForm,
  fieldOf,
  FREE,
  isDefault,
  readFitForm,
  type FitForm,
  type FitFormProblems,
} from './fitForm';
import { parametersOf, startWords } from './parameterWords';
import { readingChoices } from './readingChoices';

const models: Record<ModelName, { label: string; line: string }> = {
  sphere: { label: 'Sphere', line: 'One centre, one radius, one expansion velocity: the usual claim.' },
  drifting: {
    label: 'Drifting sphere',
    line: 'A sphere whose centre moves across the sky with velocity: two parameters more.',
  },
  elliptical: {
    label: 'Elliptical sphere',
    line: 'Rings flattened alike on every channel: an axis ratio and a position angle more.',
  },
  cap: {
    label: 'One cap',
    line: 'Only the near or the far side is seen: v_sys must be known from elsewhere.',
  },
};
const MODEL_NAMES = Object.keys(models) as ModelName[];

/** Everything that can be said before a fit of record; untouched it is the usual one. */
export default function FitDialog({
  shell,
  start,
  onRun,
  onClose,
}: {
  shell: Shell;
  /** Filled in to begin with; by default the usual fit of my marks. */
  start?: FitForm;
  /** Queues the fit; what it throws is shown here. */
  onRun: (draft: FitDraft) => Promise<unknown>;
  onClose: () => void;
}) {
  const traces = useTraces(shell.id).data?.items ?? [];
  const mine = shell.readings.find((r) => r.mine)?.id ?? null;
  const [form, setForm] = useState<FitForm>(start ?? defaultForm(mine));
  const [problems, setProblems] = useState<FitFormProblems>({});
  const [failure, setFailure] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const choices = readingChoices(shell, traces, form.readingId);
  const begun = start?.start ?? null;
  const edit = (part: Partial<FitForm>) => setForm((f) => ({ ...f, ...part }));

  async function run() {
    const read = readFitForm(form);
    setFailure(null);
    setProblems('problems' in read ? read.problems : {});
    if ('problems' in read) return;
    setBusy(true);
    try {
      await onRun(read.draft);
      onClose();
    } catch (error) {
      const problem = asProblem(error);
      const field = fieldOf(problem.field);
      if (field && field !== 'model') setProblems({ [field]: problem.detail });
      else setFailure(problem);
      setBusy(false);
    }
  }

  return (
    <Dialog
      title="Fit of record"
      onClose={onClose}
      width={space(160)}
      actions={
        <>
          {!isDefault(form) && (
            <Button
              kind="quiet"
              label="Usual settings"
              onPress={() => {
                setForm(defaultForm(form.readingId));
                setProblems({});
              }}
            />
          )}
          <Button label="Cancel" onPress={onClose} />
          <Button
            kind="primary"
            label="Run the fit"
            busy={busy}
            disabled={choices.length === 0}
            onPress={() => void run()}
          />
        </>
      }
    >
      {choices.length === 0 ? (
        <Text>You have no marks of this shell. Open it in a cube and mark its rim first.</Text>
      ) : (
        <Select
          label="What is fitted"
          value={form.readingId ?? ''}
          options={choices}
          onChange={(readingId) => edit({ readingId })}
        />
      )}
      {problems.readingId && <Wrong text={problems.readingId} />}
      <View style={{ gap: space(1) }}>
        <Select<ModelName>
          label="Model"
          value={form.model}
          options={MODEL_NAMES.map((value) => ({ value, label: models[value].label }))}
          onChange={(model) => edit({ model })}
        />
        <Text size="small" tone="quiet">
          {models[form.model].line}
        </Text>
      </View>
      <View style={{ gap: space(1) }}>
        <SectionTitle level={3}>Parameters</SectionTitle>
        <Text size="small" tone="quiet">
          A prior counts as one more datum. Whatever is said here is named in the result.
        </Text>
        {parametersOf(form.model).map((name) => (
          <ConstraintRow
            key={name}
            name={name}
            form={form.parameters[name] ?? FREE}
            problems={problems}
            onChange={(parameter) => edit({ parameters: { ...form.parameters, [name]: parameter } })}
          />
        ))}
      </View>
      <View>
        <CheckBox
          showLabel
          label="Set outliers aside"
          checked={form.setAside}
          onChange={(setAside) => edit({ setAside })}
        />
        <Text size="small" tone="quiet">
          {form.setAside
            ? 'Marks far off the ring of their own channel take no part; they are shown, and can be put back.'
            : 'Plain least squares keeps every mark.'}
        </Text>
      </View>
      {begun && (
        <CheckBox
          showLabel
          label={`Begin with ${startWords(begun)}, set by hand`}
          checked={form.start !== null}
          onChange={(on) => edit({ start: on ? begun : null })}
        />
      )}
      <View style={{ flexDirection: 'row', gap: space(3) }}>
        <View style={{ flex: 1 }}>
          <Field
            label="Bootstrap draws"
            mono
            inputMode="numeric"
            value={form.draws}
            onChangeText={(draws) => edit({ draws })}
            hint="500 as a rule; 0 for none"
            problem={problems.draws}
          />
        </View>
        <View style={{ flex: 1 }}>
          <Field
            label="Random seed"
            mono
            inputMode="numeric"
            value={form.seed}
            onChangeText={(seed) => edit({ seed })}
            hint="the same seed, the same draws"
            problem={problems.seed}
          />
        </View>
      </View>
      {failure && <ProblemNotice problem={failure} />}
    </Dialog>
  );
}

function Wrong({ text }: { text: string }) {
  return (
    <Text size="small" tone="error" role="alert">
      {text}
    </Text>
  );
}
