import type { ReactNode } from 'react';
import { View } from 'react-native';
import { rateOf, timeLeft, type UploadItem } from '@/hooks/uploads/uploadsState';
import { useUploads } from '@/hooks/useUploads';
import { Button, IconButton } from '../ui/Button';
import { duration, fileSize } from '../ui/format';
import { ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';

/** What a file is doing, in words. */
export function uploadWords(item: UploadItem): string {
  const done = `${fileSize(item.sent)} of ${fileSize(item.size)}`;
  switch (item.status) {
    case 'queued':
      return 'Waiting for its turn';
    case 'paused':
      return `Paused at ${done}`;
    case 'lost':
      return `Connection lost at ${done}; goes on by itself`;
    case 'done':
      return 'Uploaded';
    case 'refused':
      return 'Refused';
    case 'sending': {
      if (item.sent >= item.size && item.size > 0) return 'Checking the whole file';
      const rate = rateOf(item);
      const left = timeLeft(item);
      return [done, rate !== null && `${fileSize(rate)}/s`, left !== null && `${duration(left)} left`]
        .filter(Boolean)
        .join(' · ');
    }
  }
}

/** A file on its way from this page. */
export function UploadRow({ item, onDismiss }: { item: UploadItem; onDismiss: () => void }) {
  const { pause, resume, cancel } = useUploads();
  if (item.status === 'refused' && item.problem) {
    const known = typeof item.problem.cubeId === 'string' ? item.problem.cubeId : null;
    return (
      <FileRow
        name={item.fileName}
        controls={
          <IconButton icon="close" label={`Take ${item.fileName} off the list`} onPress={onDismiss} />
        }
      >
        <ProblemNotice problem={item.problem}>
          {known && <Button label="Open the cube that is here" icon="cube" href={`/cubes/${known}`} />}
        </ProblemNotice>
      </FileRow>
    );
  }
  const moving = item.status === 'sending' || item.status === 'lost' || item.status === 'queued';
  return (
    <FileRow
      name={item.fileName}
      controls={
        item.status === 'done' ? (
          <IconButton icon="close" label={`Take ${item.fileName} off the list`} onPress={onDismiss} />
        ) : (
          <>
            {moving ? (
              <IconButton icon="pause" label={`Pause ${item.fileName}`} onPress={() => pause(item.id)} />
            ) : (
              <IconButton icon="play" label={`Resume ${item.fileName}`} onPress={() => resume(item.id)} />
            )}
            <IconButton icon="close" label={`Cancel ${item.fileName}`} onPress={() => cancel(item.id)} />
          </>
        )
      }
    >
      <ProgressBar
        tone="person"
        label={`Upload of ${item.fileName}`}
        value={item.size > 0 ? item.sent / item.size : 0}
        activity={uploadWords(item)}
      />
    </FileRow>
  );
}

export function FileRow({
  name,
  controls,
  children,
}: {
  name: string;
  controls?: ReactNode;
  children: ReactNode;
}) {
  return (
    <View style={{ paddingLeft: space(4), paddingRight: space(1), paddingVertical: space(2), gap: space(1) }}>
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(1) }}>
        <Text weight="semibold" numberOfLines={1} style={{ flex: 1 }}>
          {name}
        </Text>
        {controls}
      </View>
      <View style={{ paddingRight: space(3) }}>{children}</View>
    </View>
  );
}
