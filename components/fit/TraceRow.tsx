import { useState } from 'react';
import { View } from 'react-native';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useMay } from '@/hooks/useMe';
import { useTraceActions } from '@/hooks/useTraces';
import type { Fit, ModelName } from '@/shared/contract/fits';
import type { Trace, TraceOutcome } from '@/shared/contract/traces';
import { plainNumber } from '@/shared/physics/quantity';
import { Button } from '../ui/Button';
import { StatusChip } from '../ui/Chip';
import { ago, count } from '../ui/format';
import { ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { radius, space } from '../ui/tokens';
import { defaultForm, readFitForm } from './fitForm';
import { edges, rejections, seenWords } from './traceWords';
import { useStartFit } from './useStartFit';

/** One traced rim: how it goes, how much of the rim it saw, and its fit. */
export function TraceRow({ trace, model, fits }: { trace: Trace; model: ModelName; fits: readonly Fit[] }) {
  const going = trace.status === 'queued' || trace.status === 'running';
  const may = useMay()('fit.run');
  const { cancel } = useTraceActions();
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const shown = problem ?? trace.problem;
  return (
    <View style={{ gap: space(3) }}>
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(3) }}>
        <View style={{ flex: 1 }}>
          <Text weight="semibold">{edges[trace.edge].label}</Text>
          <Text size="small" tone="quiet">
            {[trace.createdBy?.name, ago(trace.createdAt)].filter(Boolean).join(', ')}
          </Text>
        </View>
        <StatusChip status={trace.status} />
      </View>
      {going && (
        <View style={{ flexDirection: 'row', gap: space(3), alignItems: 'center' }}>
          <View style={{ flex: 1 }}>
            <ProgressBar
              label="Tracing the rim"
              value={trace.status === 'queued' ? 0 : (trace.progress ?? null)}
              activity={
                trace.status === 'queued' ? 'Waiting for a worker' : 'Looking for the rim, channel by channel'
              }
            />
          </View>
          {may && (
            <Button
              label="Stop"
              aria-label="Stop tracing"
              onPress={() => void cancel(trace.id).catch((error: unknown) => setProblem(asProblem(error)))}
            />
          )}
        </View>
      )}
      {shown && <ProblemNotice problem={shown} />}
      {trace.outcome && <Seen outcome={trace.outcome} />}
      {trace.readingId && (
        <FitIt trace={trace} readingId={trace.readingId} model={model} fits={fits} may={may} />
      )}
    </View>
  );
}

function Seen({ outcome }: { outcome: TraceOutcome }) {
  const { color } = useTheme();
  const lost = rejections(outcome.sectors);
  return (
    <View style={{ gap: space(2) }}>
      <Text>{seenWords(outcome)}</Text>
      <View role="list" aria-label="Share of the rim seen, by channel" style={{ gap: space(1) }}>
        {outcome.seenByChannel.map((channel) => {
          const percent = `${Math.round(channel.seen * 100)} %`;
          return (
            <View
              key={channel.channel}
              role="listitem"
              style={{ flexDirection: 'row', alignItems: 'center', gap: space(2) }}
            >
              <Text mono size="small" tone="quiet" align="right" style={{ width: space(20) }}>
                {`${plainNumber(channel.velocity, 4)} km/s`}
              </Text>
              <View
                aria-hidden
                style={{
                  flex: 1,
                  height: space(2),
                  borderRadius: radius.round,
                  backgroundColor: color.chip,
                  overflow: 'hidden',
                }}
              >
                <View
                  style={{ height: '100%', width: `${channel.seen * 100}%`, backgroundColor: color.quiet }}
                />
              </View>
              <Text mono size="small" align="right" style={{ width: space(11) }}>
                {percent}
              </Text>
            </View>
          );
        })}
      </View>
      {lost.length > 0 && (
        <Text size="small" tone="quiet">
          {`Not found: ${lost.map((r) => `${count(r.sectors, 'sector')}, ${r.words}`).join('; ')}.`}
        </Text>
      )}
      {outcome.beamAssumed && (
        <Text size="small" tone="person">
          The header of the cube gives no beam: three pixels were taken.
        </Text>
      )}
      {outcome.faint && (
        <Text size="small" tone="person">
          The rim stands little above the noise: the fit of it carries wider error bars.
        </Text>
      )}
    </View>
  );
}

/** The traced rim is a reading like any other: fit it with the usual settings, or look at the fit there is. */
function FitIt(props: {
  trace: Trace;
  readingId: string;
  model: ModelName;
  fits: readonly Fit[];
  may: boolean;
}) {
  const { trace, readingId, model, fits, may } = props;
  const { start, busy, problem } = useStartFit(trace.shellId);
  const usual = readFitForm({ ...defaultForm(readingId), model: model === 'cap' ? 'sphere' : model });
  const newest = fits[0];
  return (
    <View style={{ gap: space(2) }}>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}>
        {newest && (
          <Button
            label="See the fit of the traced rim"
            href={`/shells/${trace.shellId}/fits/${newest.id}`}
            kind="plain"
          />
        )}
        {may && (
          <Button
            label={newest ? 'Fit it again' : 'Fit the traced rim'}
            kind={newest ? 'quiet' : 'primary'}
            busy={busy}
            onPress={() => 'draft' in usual && void start(usual.draft)}
          />
        )}
      </View>
      {problem && <ProblemNotice problem={problem} />}
    </View>
  );
}
