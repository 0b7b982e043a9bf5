import { useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { readingWords, ShellSign } from '@/components/shells/ShellRow';
import { ShellDialog } from '@/components/shells/ShellDialog';
import { Button } from '@/components/ui/Button';
import { StatusChip } from '@/components/ui/Chip';
import { Field } from '@/components/ui/Field';
import { SectionTitle } from '@/components/ui/Panel';
import { Press, type PressState } from '@/components/ui/Press';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { SkeletonRows } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space, touch } from '@/components/ui/tokens';
import { useMay } from '@/hooks/useMe';
import type { Shell } from '@/shared/contract/shells';

/** From this many shells on the list folds. */
const MANY = 7;

/** The region's shells: choose the one to mark, or name a new one. */
export function ShellChooser({ onChosen }: { onChosen?: () => void }) {
  const { shells, shell, chooseShell, cube, mayMark } = useSession();
  const may = useMay();
  const [naming, setNaming] = useState(false);
  const [open, setOpen] = useState(false);
  const [text, setText] = useState('');
  const items = shells.data?.items.filter((s) => s.status !== 'withdrawn' || s.id === shell?.id) ?? [];
  // a long list would push the reading out of sight: it folds to the shell that is worked on
  const many = items.length > MANY;
  const folded = many && shell !== null && !open;
  const wanted = text.trim().toLowerCase();
  const shown = folded
    ? items.filter((s) => s.id === shell.id)
    : items.filter((s) => `${s.name} ${s.designation ?? ''}`.toLowerCase().includes(wanted));
  return (
    <View style={{ gap: space(1) }}>
      <View
        style={{
          flexDirection: 'row',
          justifyContent: 'space-between',
          alignItems: 'center',
          minHeight: touch,
        }}
      >
        <SectionTitle>Shells</SectionTitle>
        {may('shell.create') && (
          <Button
            label="New shell"
            icon="plus"
            kind="quiet"
            onPress={() => setNaming(true)}
            style={{ marginRight: -space(3) }}
          />
        )}
      </View>
      {shells.waiting && <SkeletonRows rows={3} height={52} label="Loading the shells" />}
      {shells.problem && <ProblemNotice problem={shells.problem} onRetry={() => void shells.reload()} />}
      {shells.data && items.length === 0 && (
        <Text tone="quiet" size="small">
          {mayMark
            ? 'No shell has a name here yet. Name one to mark its rim.'
            : 'No shell has a name here yet.'}
        </Text>
      )}
      {many && !folded && (
        <Field
          hideLabel
          label="Find a shell"
          placeholder="Find a shell"
          value={text}
          onChangeText={setText}
        />
      )}
      {many && !folded && shown.length === 0 && (
        <Text tone="quiet" size="small" role="status">
          No shell has that in its name.
        </Text>
      )}
      <View role="list" aria-label="Shells of the region">
        {shown.map((s) => (
          <Row
            key={s.id}
            shell={s}
            current={s.id === shell?.id}
            onPress={() => {
              chooseShell(s.id);
              setOpen(false);
              setText('');
              onChosen?.();
            }}
          />
        ))}
      </View>
      {many && shell && (
        <Button
          kind="quiet"
          label={open ? 'Only this shell' : `All ${items.length} shells`}
          aria-expanded={open}
          onPress={() => setOpen(!open)}
        />
      )}
      {naming && (
        <ShellDialog
          regionId={cube.regionId}
          onClose={() => setNaming(false)}
          onDone={(made) => {
            chooseShell(made.id);
            onChosen?.();
          }}
        />
      )}
    </View>
  );
}

function Row({ shell, current, onPress }: { shell: Shell; current: boolean; onPress: () => void }) {
  const { color } = useTheme();
  return (
    <View role="listitem">
      <Press
        onPress={onPress}
        aria-pressed={current}
        style={({ hovered }: PressState) => ({
          flexDirection: 'row',
          alignItems: 'center',
          gap: space(3),
          minHeight: touch + space(2),
          padding: space(2),
          paddingLeft: space(3),
          borderRadius: radius.small,
          borderLeftWidth: space(0.75),
          borderLeftColor: current ? color.person : 'transparent',
          backgroundColor: current || hovered ? color.selected : 'transparent',
        })}
      >
        <ShellSign shell={shell} />
        <View style={{ flex: 1, minWidth: 0 }}>
          <Text weight={current ? 'semibold' : 'regular'} numberOfLines={1}>
            {shell.name}
          </Text>
          <Text size="small" mono tone="quiet" numberOfLines={2}>
            {shell.designation ?? readingWords(shell)}
          </Text>
        </View>
        <StatusChip status={shell.status} />
      </Press>
    </View>
  );
}
