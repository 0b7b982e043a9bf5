import { useState } from 'react';
import type { Shell } from '@/shared/contract/shells';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useShellActions } from '@/hooks/useShells';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { ProblemNotice } from '../ui/ProblemNotice';

/** Names a new shell in a region, or changes the name and note of one. */
export function ShellDialog({
  regionId,
  shell = null,
  onClose,
  onDone,
}: {
  regionId: string;
  shell?: Shell | null;
  onClose: () => void;
  onDone?: (shell: Shell) => void;
}) {
  const { make, change } = useShellActions();
  const [name, setName] = useState(shell?.name ?? '');
  const [note, setNote] = useState(shell?.note ?? '');
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [missing, setMissing] = useState(false);
  const [busy, setBusy] = useState(false);
  async function send() {
    setMissing(name.trim() === '');
    if (name.trim() === '') return;
    setBusy(true);
    const draft = { name: name.trim(), note: note.trim() };
    try {
      const saved = shell ? await change(shell.id, draft) : await make(regionId, draft);
      onClose();
      onDone?.(saved);
    } catch (error) {
      setProblem(asProblem(error));
      setBusy(false);
    }
  }
  const at = (field: string) => (problem?.field === field ? problem.detail : null);
  return (
    <Dialog
      title={shell ? 'Edit shell' : 'New shell'}
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            kind="primary"
            label={shell ? 'Save' : 'Name shell'}
            busy={busy}
            onPress={() => void send()}
          />
        </>
      }
    >
      <Field
        label="Name"
        hint="A working name; the designation comes with the adopted fit."
        value={name}
        maxLength={80}
        autoFocus
        onChangeText={setName}
        onSubmitEditing={() => void send()}
        problem={missing ? 'Give the shell a name.' : at('name')}
      />
      <Field
        label="Note"
        value={note}
        maxLength={2000}
        multiline
        onChangeText={setNote}
        problem={at('note')}
      />
      {problem && problem.field !== 'name' && problem.field !== 'note' && <ProblemNotice problem={problem} />}
    </Dialog>
  );
}
