import { useState } from 'react';
import { View } from 'react-native';
import { asProblem } from '@/hooks/api';
import { signOut, useMe } from '@/hooks/useMe';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { Chip } from '../ui/Chip';
import { useShowKeys } from '../ui/commands/CommandsProvider';
import { DefinitionRows } from '../ui/DefinitionRows';
import { Panel } from '../ui/Panel';
import { SegmentedChoice } from '../ui/SegmentedChoice';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { useToast } from '../ui/Toast';
import { space } from '../ui/tokens';
import { TeamPanel } from './TeamPanel';
import { TokensPanel } from './TokensPanel';

/** The person: account, look, team, tokens. */
export function YouPage() {
  const { data: me } = useMe();
  const { choice, choose } = useTheme();
  const showKeys = useShowKeys();
  const say = useToast();
  const [leaving, setLeaving] = useState(false);
  async function leave() {
    setLeaving(true);
    try {
      await signOut();
    } catch (error) {
      say({ kind: 'error', text: asProblem(error).title });
      setLeaving(false);
    }
  }
  return (
    <Screen title="You" narrow>
      <Panel title={me?.name ?? 'Account'} aside={me?.role && <Chip label={me.role} kind="person" />}>
        <DefinitionRows
          dense
          rows={[
            { key: 'login', name: 'Login', value: me?.login ?? '–' },
            { key: 'email', name: 'Mail', value: me?.email ?? '–' },
            { key: 'team', name: 'Team', value: <Text>{me?.team?.name ?? '–'}</Text> },
          ]}
        />
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
          <Button label="Keys" icon="keys" onPress={showKeys} />
          <Button label="Sign out" busy={leaving} onPress={() => void leave()} />
        </View>
      </Panel>
      <Panel title="Theme">
        <SegmentedChoice
          label="Theme"
          hideLabel
          value={choice}
          onChange={choose}
          options={[
            { value: 'system', label: 'As the system' },
            { value: 'paper', label: 'Paper' },
            { value: 'dome', label: 'Dome' },
          ]}
        />
        <Text size="small" tone="quiet">
          Paper for tables and print, Dome for marking in the dark. Images are dark in both.
        </Text>
      </Panel>
      <TeamPanel />
      <TokensPanel />
    </Screen>
  );
}
