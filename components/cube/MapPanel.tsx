import { useEffect, useRef, useState } from 'react';
import { ActivityIndicator, View } from 'react-native';
import { Readout } from '@/components/cube/Readout';
import { SelectedMark } from '@/components/cube/SelectedMark';
import { useSession } from '@/components/cube/session';
import { ToolBar } from '@/components/cube/ToolBar';
import { useMapHands } from '@/components/cube/useMapHands';
import { VIEWS } from '@/components/cube/views';
import { ViewNote } from '@/components/cube/ViewNote';
import { ChannelMap } from '@/components/map/ChannelMap';
import { PictureNote } from '@/components/seeing/PictureNote';
import { SliceHandles } from '@/components/slices/SliceHandles';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { HiddenText, Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { useValue } from '@/hooks/valueStore';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** The channel map with its readout and what there is to say about it. */
export function MapPanel({ round = true }: { round?: boolean }) {
  const s = useSession();
  const hands = useMapHands(s);
  const { color } = useTheme();
  const { plane, problem, retry } = s.planes;
  // stays, dimmed, until the next one is here
  const before = useRef<{ view: string; plane: ChannelPlane } | null>(null);
  const viewKey = `${s.view} ${s.seen.lie}`;
  useEffect(() => {
    if (plane) before.current = { view: viewKey, plane };
  }, [plane, viewKey]);
  const last = before.current?.view === viewKey ? before.current.plane : null;
  const late = useLate(!plane && !problem);
  const own = s.marksByChannel.get(s.channel) ?? 0;
  const channelLabel =
    `Channel map at ${velocityLabel(s.velocity, s.axes.spectral.channelWidth)} kilometres per second, channel ${s.channel + 1} of ${s.axes.channels}` +
    `${own > 0 ? `, ${own} mark${own === 1 ? '' : 's'}` : ''}.` +
    `${s.mapTool === 'move' ? '' : ' Arrow keys move the crosshair, Enter places a mark or takes up the one that lies there.'}`;
  const label =
    s.view === 'channel' ? channelLabel : `${VIEWS[s.view].long}, all ${s.axes.channels} channels together.`;
  return (
    <View
      style={{
        flex: 1,
        minHeight: 0,
        backgroundColor: color.image,
        borderRadius: round ? radius.small : 0,
        overflow: 'hidden',
      }}
    >
      <ChannelMap
        store={s.store}
        nx={s.seen.nx}
        ny={s.seen.ny}
        plane={plane ?? last}
        stale={!plane}
        look={s.look.look}
        scene={s.scene}
        label={label}
        start={s.start.view}
        {...hands}
      />
      <Said />
      <SelectedMark />
      <ToolBar />
      <ViewNote />
      <SliceHandles />
      <PictureNote />
      <Readout />
      {late && (
        <View
          role="status"
          pointerEvents="none"
          style={{
            position: 'absolute',
            left: space(3),
            bottom: space(10),
            flexDirection: 'row',
            gap: space(2),
            padding: space(2),
            borderRadius: radius.small,
            backgroundColor: color.imageShade,
          }}
        >
          <ActivityIndicator size="small" color={color.onImage} />
          <Text size="small" tone="onImage">
            {s.view === 'channel' ? 'Loading this channel' : 'Loading the map'}
          </Text>
        </View>
      )}
      {problem && (
        <View style={{ position: 'absolute', left: space(3), right: space(3), bottom: space(3) }}>
          <ProblemNotice problem={problem} onRetry={retry} />
        </View>
      )}
    </View>
  );
}

/** What was just done to the marks, for who cannot see it. */
function Said() {
  const { said } = useSession();
  return (
    <View role="status" aria-live="polite">
      <HiddenText>{useValue(said, itself)}</HiddenText>
    </View>
  );
}
const itself = (text: string) => text;

/** True once something has lasted 300 ms: shorter waits need no word. */
function useLate(waiting: boolean): boolean {
  const [late, setLate] = useState(false);
  useEffect(() => {
    if (!waiting) return setLate(false);
    const timer = setTimeout(() => setLate(true), 300);
    return () => clearTimeout(timer);
  }, [waiting]);
  return late && waiting;
}
