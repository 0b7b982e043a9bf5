import { useState } from 'react';
import { View } from 'react-native';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useTraceActions, useTraces } from '@/hooks/useTraces';
import type { Edge, Trace } from '@/shared/contract/traces';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { Panel, Rule } from '../ui/Panel';
import { ProblemNotice } from '../ui/ProblemNotice';
import { SegmentedChoice } from '../ui/SegmentedChoice';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { TraceRow } from './TraceRow';
import { edges } from './traceWords';

const EDGES = Object.keys(edges) as Edge[];

/** The rim measured from the brightness around this fit: start it, watch it, fit what was found. */
export function TracePanel({ fit }: { fit: DoneFit }) {
  const traces = useTraces(fit.shellId);
  const fits = useFits(fit.shellId).data?.items ?? [];
  const may = useMay()('fit.run');
  const [edge, setEdge] = useState<Edge>('ridge');
  const { busy, problem, act } = useTrying();
  const { start } = useTraceActions();
  const own = (trace: Trace) => trace.fitId === fit.id;
  const shown = (traces.data?.items ?? []).filter((t) => own(t) || t.id === fit.traceId);
  const underWay = shown.some((t) => t.status === 'queued' || t.status === 'running');
  return (
    <Panel title="Rim traced from the brightness">
      {fit.traceId === null && (
        <>
          <Text>
            The rim is looked for in the cube itself, by sectors of azimuth on each channel, around the rings
            of this fit. What is found is a reading of its own: it shows a bias that a person’s marks share.
          </Text>
          {may && (
            <View style={{ gap: space(2), alignItems: 'flex-start' }}>
              <SegmentedChoice
                label="What to follow"
                value={edge}
                options={EDGES.map((value) => ({ value, label: edges[value].label }))}
                onChange={setEdge}
              />
              <Text size="small" tone="quiet">
                {edges[edge].line}
              </Text>
              <Button
                label="Trace the rim"
                icon="target"
                busy={busy}
                disabled={underWay}
                onPress={() => void act(() => start(fit.shellId, { fitId: fit.id, edge }))}
              />
            </View>
          )}
        </>
      )}
      {problem && <ProblemNotice problem={problem} />}
      <RecordGate read={traces} what="traced rims" skeleton={<Skeleton height={space(11)} />}>
        {() => (
          <View role="list" aria-label="Traced rims" style={{ gap: space(4) }}>
            {shown.map((trace, i) => (
              <View key={trace.id} role="listitem" style={{ gap: space(3) }}>
                {i > 0 && <Rule />}
                <TraceRow trace={trace} model={fit.model} fits={fits.filter((f) => f.traceId === trace.id)} />
              </View>
            ))}
          </View>
        )}
      </RecordGate>
    </Panel>
  );
}

function useTrying() {
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  async function act(what: () => Promise<unknown>) {
    setBusy(true);
    setProblem(null);
    try {
      await what();
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(false);
    }
  }
  return { busy, problem, act };
}
