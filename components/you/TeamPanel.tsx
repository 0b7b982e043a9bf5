import { useState } from 'react';
import { View } from 'react-native';
import { ROLES, type Role } from '@/shared/contract/permissions';
import type { Member } from '@/shared/contract/people';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useMay, useMe } from '@/hooks/useMe';
import { useMembers, useTeamActions } from '@/hooks/useTeam';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { Chip } from '../ui/Chip';
import { Dialog } from '../ui/Dialog';
import { Field } from '../ui/Field';
import { Menu } from '../ui/Menu';
import { Panel, Rule } from '../ui/Panel';
import { ProblemNotice } from '../ui/ProblemNotice';
import { Select } from '../ui/Select';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { useToast } from '../ui/Toast';
import { space, touch } from '../ui/tokens';

const roleWords: Record<Role, string> = {
  lead: 'lead: everything, and the team',
  analyst: 'analyst: regions, cubes, marks, fits',
  reviewer: 'reviewer: marks and fits of their own',
  reader: 'reader: reads and downloads',
};
const roleOptions = ROLES.map((value) => ({ value, label: value }));

/** Who is in the team, in which role; the lead changes it. */
export function TeamPanel() {
  const members = useMembers();
  const { data: me } = useMe();
  const manages = useMay()('team.manage');
  const [adding, setAdding] = useState(false);
  return (
    <Panel
      flush
      title={me?.team?.name ?? 'Team'}
      aside={manages && <Button icon="plus" label="Add a person" onPress={() => setAdding(true)} />}
    >
      <RecordGate
        read={members}
        what="team"
        skeleton={
          <View style={{ padding: space(4) }}>
            <SkeletonRows rows={3} />
          </View>
        }
      >
        {({ items }) => (
          <View role="list" aria-label="Members" style={{ paddingBottom: space(1) }}>
            {items.map((m, i) => (
              <View key={m.person.id} role="listitem">
                {i > 0 && <Rule />}
                <MemberRow member={m} manages={manages} own={m.person.id === me?.id} />
              </View>
            ))}
          </View>
        )}
      </RecordGate>
      {adding && <AddPerson onClose={() => setAdding(false)} />}
    </Panel>
  );
}

function MemberRow({
  member: { person, role },
  manages,
  own,
}: {
  member: Member;
  manages: boolean;
  own: boolean;
}) {
  const { setRole, remove, add } = useTeamActions();
  const say = useToast();
  async function act(action: () => Promise<unknown>) {
    try {
      await action();
    } catch (error) {
      const problem = asProblem(error);
      say({ kind: 'error', text: problem.detail || problem.title });
    }
  }
  const letGo = () =>
    act(async () => {
      await remove(person.id);
      say({
        text: `${person.name} left the team.`,
        action: { label: 'Undo', perform: () => void act(() => add(person.login, role)) },
      });
    });
  return (
    <View
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: space(2),
        minHeight: touch + space(3),
        paddingLeft: space(4),
        paddingRight: space(1),
      }}
    >
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text weight="semibold" numberOfLines={1}>
          {person.name}
          {own ? ' (you)' : ''}
        </Text>
        <Text size="small" tone="quiet" mono numberOfLines={1}>
          {person.login}
        </Text>
      </View>
      {manages ? (
        <>
          <Select
            hideLabel
            label={`Role of ${person.name}`}
            value={role}
            options={roleOptions}
            onChange={(next) => void act(() => setRole(person.id, next))}
          />
          <Menu
            label={`What can be done with ${person.name}`}
            items={[
              {
                label: own ? 'Leave the team' : 'Let go from the team',
                icon: 'trash',
                danger: true,
                perform: () => void letGo(),
              },
            ]}
          />
        </>
      ) : (
        <View style={{ paddingRight: space(3) }}>
          <Chip label={role} />
        </View>
      )}
    </View>
  );
}

function AddPerson({ onClose }: { onClose: () => void }) {
  const { add } = useTeamActions();
  const [login, setLogin] = useState('');
  const [role, setRole] = useState<Role>('analyst');
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const atLogin = problem && (problem.field === 'login' || problem.status === 404);
  async function send() {
    if (!login.trim()) return;
    setBusy(true);
    try {
      await add(login.trim(), role);
      onClose();
    } catch (error) {
      setProblem(asProblem(error));
      setBusy(false);
    }
  }
  return (
    <Dialog
      title="Add a person"
      onClose={onClose}
      actions={
        <>
          <Button label="Cancel" onPress={onClose} />
          <Button
            kind="primary"
            label="Add"
            busy={busy}
            disabled={!login.trim()}
            onPress={() => void send()}
          />
        </>
      }
    >
      <Field
        label="Login"
        hint="They must have signed in once."
        value={login}
        autoFocus
        autoCapitalize="none"
        maxLength={80}
        onChangeText={setLogin}
        onSubmitEditing={() => void send()}
        problem={atLogin ? problem.detail : null}
      />
      <Select
        label="Role"
        value={role}
        options={ROLES.map((value) => ({ value, label: roleWords[value] }))}
        onChange={setRole}
      />
      {problem && !atLogin && <ProblemNotice problem={problem} />}
    </Dialog>
  );
}
