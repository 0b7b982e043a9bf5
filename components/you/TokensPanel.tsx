import { useState } from 'react';
import { View } from 'react-native';
import type { NewToken, Token } from '@/shared/contract/people';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useTokenActions, useTokens } from '@/hooks/useTeam';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { Field } from '../ui/Field';
import { ago, day } from '../ui/format';
import { Panel, Rule } from '../ui/Panel';
import { Notice, ProblemNotice } from '../ui/ProblemNotice';
import { Press } from '../ui/Press';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { useToast } from '../ui/Toast';
import { space, touch } from '../ui/tokens';

/** Personal access tokens for scripts: made here, shown once, revoked here. */
export function TokensPanel() {
  const tokens = useTokens();
  const { make } = useTokenActions();
  const [name, setName] = useState('');
  const [made, setMade] = useState<NewToken | null>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  async function send() {
    if (!name.trim()) return;
    setBusy(true);
    setProblem(null);
    try {
      setMade(await make(name.trim()));
      setName('');
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(false);
    }
  }
  return (
    <Panel title="Access tokens">
      <Text tone="quiet">
        For scripts against the API: send one as{' '}
        <Text mono size="small">
          Authorization: Bearer …
        </Text>{' '}
        It can do what you can.
      </Text>
      <Press
        href={'/api/v1/openapi.json' as '/'}
        external
        aria-label="API document"
        style={{ minHeight: touch, justifyContent: 'center', alignSelf: 'flex-start' }}
      >
        <Text style={{ textDecorationLine: 'underline' }}>API document (OpenAPI)</Text>
      </Press>
      {made && <Secret token={made} onDone={() => setMade(null)} />}
      <View style={{ flexDirection: 'row', alignItems: 'flex-end', gap: space(2) }}>
        <View style={{ flex: 1 }}>
          <Field
            label="Name of a new token"
            placeholder="plots on my laptop"
            value={name}
            maxLength={80}
            onChangeText={setName}
            onSubmitEditing={() => void send()}
          />
        </View>
        <Button label="Make token" busy={busy} disabled={!name.trim()} onPress={() => void send()} />
      </View>
      {problem && <ProblemNotice problem={problem} />}
      <RecordGate read={tokens} what="tokens" skeleton={<Skeleton height={44} />}>
        {({ items }) =>
          items.length === 0 ? (
            <Text tone="quiet">No token yet.</Text>
          ) : (
            <View role="list" aria-label="Access tokens">
              {items.map((token, i) => (
                <View key={token.id} role="listitem">
                  {i > 0 && <Rule />}
                  <TokenRow token={token} />
                </View>
              ))}
            </View>
          )
        }
      </RecordGate>
    </Panel>
  );
}

function Secret({ token, onDone }: { token: NewToken; onDone: () => void }) {
  const [copied, setCopied] = useState(false);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(token.secret);
      setCopied(true);
    } catch {
      setCopied(false); // not allowed here: it can still be marked and copied by hand
    }
  };
  return (
    <Notice kind="person" title={`Copy “${token.name}” now: it is shown this once`} role="status">
      <Text mono selectable style={{ overflowWrap: 'anywhere' } as object}>
        {token.secret}
      </Text>
      <View style={{ flexDirection: 'row', gap: space(2), paddingTop: space(1) }}>
        <Button
          label={copied ? 'Copied' : 'Copy'}
          icon={copied ? 'check' : undefined}
          onPress={() => void copy()}
        />
        <Button kind="quiet" label="Done" onPress={onDone} />
      </View>
    </Notice>
  );
}

function TokenRow({ token }: { token: Token }) {
  const { revoke } = useTokenActions();
  const say = useToast();
  const [busy, setBusy] = useState(false);
  async function end() {
    setBusy(true);
    try {
      await revoke(token.id);
      say({ text: `“${token.name}” was revoked.` });
    } catch (error) {
      say({ kind: 'error', text: asProblem(error).title });
      setBusy(false);
    }
  }
  return (
    <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), minHeight: touch + space(2) }}>
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text weight="semibold" numberOfLines={1}>
          {token.name}
        </Text>
        <Text size="small" tone="quiet">
          {`made ${day(token.createdAt)}, ${token.lastUsedAt ? `used ${ago(token.lastUsedAt)}` : 'never used'}`}
        </Text>
      </View>
      <Button
        kind="danger"
        label="Revoke"
        aria-label={`Revoke ${token.name}`}
        busy={busy}
        onPress={() => void end()}
      />
    </View>
  );
}
