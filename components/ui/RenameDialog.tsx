import { useState } from 'react';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { Button } from './Button';
import { Dialog } from './Dialog';
import { Field } from './Field';

/** One name, changed in place; a refusal is said at the field. */
export function RenameDialog({
  what,
  name,
  maxLength,
  onClose,
  onSave,
}: {
  what: string;
  name: string;
  maxLength: number;
  onClose: () => void;
  onSave: (name: string) => Promise<unknown>;
}) {
  const [value, setValue] = useState(name);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const empty = value.trim() === '';
  async function save() {
    if (empty) return;
    setBusy(true);
    try {
      await onSave(value.trim());
      onClose();
    } catch (error) {
      setProblem(asProblem(error));
      setBusy(false);
    }
  }
  return (
    <Dialog
      title={`Rename ${what}`}
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button kind="primary" label="Save" busy={busy} disabled={empty} onPress={() => void save()} />
        </>
      }
    >
      <Field
        label="Name"
        value={value}
        maxLength={maxLength}
        autoFocus
        onChangeText={setValue}
        onSubmitEditing={() => void save()}
        problem={problem && (problem.detail || problem.title)}
      />
    </Dialog>
  );
}
