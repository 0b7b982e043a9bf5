import { Redirect, Slot, useRouter } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { useCommands } from '@/components/ui/commands/CommandsProvider';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { useTheme } from '@/components/ui/theme';
import { space } from '@/components/ui/tokens';
import { Guide } from '@/components/guide/Guide';
import { sections } from '@/components/frame/sections';
import { useLiveEvents } from '@/hooks/useLiveEvents';
import { useMe, useSessionWatch } from '@/hooks/useMe';

const hereNow = (): string => globalThis.location.pathname + globalThis.location.search;

/** Everything behind sign-in. The guard is comfort: the server checks every request. */
export default function SignedIn() {
  const { data: me, problem, signedOut, reload } = useMe();
  const router = useRouter();
  const { color } = useTheme();
  const [arrivedAt] = useState(hereNow);
  useSessionWatch();
  useLiveEvents(me?.role != null);
  useCommands(
    sections.map((s, i) => ({
      name: `go.${s.label}`,
      label: `Go to ${s.label}`,
      keys: [`Alt+${i + 1}`],
      group: 'Everywhere',
      perform: () => router.push(s.href),
    })),
  );
  if (signedOut) {
    // the whole address, for it holds channel, zoom and filters; before a screen was ever shown the router has none
    const to = me ? hereNow() : arrivedAt;
    return (
      <Redirect href={{ pathname: '/sign-in', params: to === '/' || to === '/regions' ? {} : { to } }} />
    );
  }
  if (me && me.role === null) return <Redirect href="/sign-in" />;
  if (problem && !me)
    return (
      <View role="main" style={{ flex: 1, padding: space(6), backgroundColor: color.ground }}>
        <ProblemNotice problem={problem} onRetry={() => void reload()} />
      </View>
    );
  if (!me) return <View role="main" style={{ flex: 1, backgroundColor: color.ground }} />;
  return (
    <>
      <Slot />
      <Guide personId={me.id} />
    </>
  );
}
