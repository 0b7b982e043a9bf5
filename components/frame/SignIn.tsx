import { Redirect, type Href } from 'expo-router';
import { View } from 'react-native';
import { signOut, useMe, useProvider } from '@/hooks/useMe';
import { Button } from '../ui/Button';
import { Sign } from '../ui/Icon';
import { Notice, ProblemNotice } from '../ui/ProblemNotice';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { layout, space } from '../ui/tokens';
import { RingsPicture } from './RingsPicture';
import { useDocumentTitle } from './Screen';

const refusals: Record<string, string> = {
  provider: 'The sign-in service did not answer as it should. Try again in a minute.',
  refused: 'The sign-in service did not let you in, or you stopped there. Nothing was changed.',
};

/** Only paths of this app are gone to after sign-in. */
const inside = (to: string | undefined): string => (to && /^\/(?![/\\])/.test(to) ? to : '/regions');

/** What Outswell is for, and the one way in. */
export function SignIn({ to, problem }: { to?: string; problem?: string }) {
  const { color } = useTheme();
  const me = useMe();
  const provider = useProvider();
  useDocumentTitle('Sign in');
  const known = me.signedOut ? undefined : me.data; // the cache keeps the person whose session ended
  if (known?.role) return <Redirect href={inside(to) as Href} />;
  const start = `/auth/github?to=${encodeURIComponent(inside(to))}` as Href;
  const local = provider.data?.local === true;
  return (
    <View
      role="main"
      style={{
        flex: 1,
        backgroundColor: color.ground,
        alignItems: 'center',
        justifyContent: 'center',
        padding: space(6),
      }}
    >
      <View style={{ width: '100%', maxWidth: layout.dialog, gap: space(6) }}>
        <RingsPicture />
        <View style={{ gap: space(3) }}>
          <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(3) }}>
            <Sign size={32} />
            <Text heading={1} size="display" weight="bold">
              Outswell
            </Text>
          </View>
          <Text size="lead">
            Mark the rims of expanding shells in neutral-hydrogen cubes, fit them with honest error bars, and
            keep a catalogue that your team has checked.
          </Text>
        </View>
        {problem && <Notice kind="error">{refusals[problem] ?? refusals.provider!}</Notice>}
        {known ? (
          <NoTeam name={known.name} login={known.login} />
        ) : (
          <View style={{ gap: space(2) }}>
            <Button
              kind="primary"
              wide
              href={start}
              external
              label={local ? 'Sign in locally' : `Sign in with ${provider.data?.name ?? 'GitHub'}`}
            />
            {local && (
              <Text size="small" tone="quiet" align="center">
                Local sign-in stands in for GitHub on this installation: choose a demo person there, or type a
                new login.
              </Text>
            )}
            {me.problem && !me.signedOut && (
              <ProblemNotice problem={me.problem} onRetry={() => void me.reload()} />
            )}
          </View>
        )}
      </View>
    </View>
  );
}

function NoTeam({ name, login }: { name: string; login: string }) {
  return (
    <View style={{ gap: space(3) }}>
      <Notice kind="person" title={`Signed in as ${name}, not in a team yet`}>
        <Text>
          Ask the lead of your team to take you in: You → Team → “Add a person”, with your login{' '}
          <Text mono weight="semibold">
            {login}
          </Text>
          . Then reload this page.
        </Text>
      </Notice>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
        <Button label="Reload" icon="retry" kind="primary" onPress={() => globalThis.location.reload()} />
        <Button label="Sign out" onPress={() => void signOut()} />
      </View>
    </View>
  );
}
