import { useMemo } from 'react';
import { useSession } from '@/components/cube/session';
import { Strip } from '@/components/strip/Strip';
import { useStripPicture } from '@/components/strip/useStripPicture';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { useChannels } from '@/hooks/useCubes';

/** The strip, wired to the session. */
export function StripPanel() {
  const { cube, order, channel, showChannel, marksByChannel, model, channelLook, next } = useSession();
  const { data: channels, problem, reload } = useChannels(cube.id);
  const strip = useStripPicture(cube, channelLook.look.ramp, channelLook.tone);
  const spectrum = useMemo(() => {
    const means: (number | null)[] = order.channels.map(() => null);
    for (const c of channels?.items ?? []) means[c.channel] = c.mean;
    return means;
  }, [channels, order]);
  const span = useMemo(
    () => model && { low: model.vSys - model.vExp, middle: model.vSys, high: model.vSys + model.vExp },
    [model],
  );
  const helpful = useMemo(() => next.map((n) => n.channel), [next]);
  return (
    <>
      <Strip
        order={order}
        channel={channel}
        onChannel={showChannel}
        picture={strip.picture}
        spectrum={spectrum}
        marks={marksByChannel}
        span={span}
        next={helpful}
      />
      {(problem ?? strip.problem) && (
        <ProblemNotice problem={(problem ?? strip.problem)!} onRetry={() => void reload()} />
      )}
    </>
  );
}
