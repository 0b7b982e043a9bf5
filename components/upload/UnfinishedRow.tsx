import { useState } from 'react';
import type { UploadState } from '@/shared/contract/cubes';
import { asProblem } from '@/hooks/api';
import { sameFile } from '@/hooks/uploads/unfinished';
import { useUploads } from '@/hooks/useUploads';
import { Button, IconButton } from '../ui/Button';
import { ago, fileSize } from '../ui/format';
import { Notice, ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { useToast } from '../ui/Toast';
import { chooseFiles } from './chooseFiles';
import { FileRow } from './UploadRow';

/** An upload the server knows and this page does not hold. Mine goes on once the browser is given the file again. */
export function UnfinishedRow({ state, onDismiss }: { state: UploadState; onDismiss: () => void }) {
  const { add, forget } = useUploads();
  const say = useToast();
  const [mismatch, setMismatch] = useState<string | null>(null);

  async function goOn() {
    const [file] = await chooseFiles({ several: false });
    if (!file) return;
    if (sameFile(file, state)) add(state.regionId, [file], state.id);
    else
      setMismatch(
        `${file.name} (${fileSize(file.size)}) is another file. This upload began with ${state.fileName}, ${fileSize(state.sizeBytes)}.`,
      );
  }
  async function stop() {
    try {
      await forget(state.regionId, state.id);
    } catch (error) {
      say({ kind: 'error', text: `The upload could not be cancelled: ${asProblem(error).title}.` });
    }
  }

  if (state.status === 'refused')
    return (
      <FileRow
        name={state.fileName}
        controls={
          <IconButton icon="close" label={`Take ${state.fileName} off the list`} onPress={onDismiss} />
        }
      >
        <ProblemNotice problem={state.problem ?? { title: 'This file was refused' }} />
      </FileRow>
    );
  const share = state.sizeBytes > 0 ? state.receivedBytes / state.sizeBytes : 0;
  const amount = `${fileSize(state.receivedBytes)} of ${fileSize(state.sizeBytes)}`;
  const words =
    state.status === 'checking'
      ? 'Checking the whole file'
      : state.mine
        ? `Stopped at ${amount}, begun ${ago(state.createdAt)}`
        : `${amount}, by a colleague`;
  return (
    <FileRow
      name={state.fileName}
      controls={
        state.mine &&
        state.status === 'receiving' && (
          <>
            <Button
              kind="person"
              icon="play"
              label="Choose the same file to go on"
              onPress={() => void goOn()}
            />
            <IconButton icon="close" label={`Cancel ${state.fileName}`} onPress={() => void stop()} />
          </>
        )
      }
    >
      <ProgressBar tone="person" label={`Upload of ${state.fileName}`} value={share} activity={words} />
      {mismatch && <Notice kind="error">{mismatch}</Notice>}
    </FileRow>
  );
}
