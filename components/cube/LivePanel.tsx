import { useMemo, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { TrialPanel } from '@/components/cube/TrialPanel';
import { ringsOf } from '@/components/fit/fitFacts';
import { radiusErrorOf } from '@/components/diagram/modelError';
import { RadiusVelocity } from '@/components/diagram/RadiusVelocity';
import type { DiagramModel, DiagramRing } from '@/components/diagram/diagramScale';
import { SectionTitle } from '@/components/ui/Panel';
import { Notice } from '@/components/ui/ProblemNotice';
import { ParameterName, Quantity } from '@/components/ui/Quantity';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, space } from '@/components/ui/tokens';
import type { FitResult, WarningCode } from '@/shared/shell/fitResult';
import { separation } from '@/shared/sky/greatCircle';

const SHOWN = ['l', 'b', 'theta', 'vSys', 'vExp'] as const;
const SOURCES = { trial: 'trial model', live: 'live fit', record: 'fit of record' } as const;
const TITLES: Record<WarningCode, string> = {
  'few-channels': 'Few channels',
  'vexp-unconstrained': 'Expansion velocity not bounded',
  'one-sided': 'One side only',
  'arc-too-short': 'Short arc',
  outliers: 'Marks set aside',
  'poor-fit': 'Poor fit',
  'start-failed': 'Not settled',
  'not-converged': 'Not settled',
  'at-bound': 'At a bound',
  'prior-dominated': 'Led by the prior',
  'coarse-channels': 'Wide channels',
  'drawn-circles': 'Drawn circles',
};

/** The fit as the marks stand: diagram, parameters, and what limits them beside them. */
export function LivePanel({
  diagramHeight = 300,
  numbersFirst,
}: {
  diagramHeight?: number;
  /** Where little is seen at once, the numbers come before the diagram. */
  numbersFirst?: boolean;
}) {
  const { live, model, modelSource, shownRecord, axes, velocity, shell, showChannel, trial, changeTrial } =
    useSession();
  const [width, setWidth] = useState(0);
  const { fit } = live;

  const rings = useMemo<DiagramRing[]>(
    () =>
      shownRecord && live.readings.length === 0
        ? ringsOf(shownRecord)
        : live.readings.flatMap((r) =>
            r.ring
              ? [
                  {
                    channel: r.channel,
                    velocity: r.velocity,
                    theta: r.ring.theta,
                    se: r.ring.se,
                    marks: r.marks,
                  },
                ]
              : [],
          ),
    [live, shownRecord],
  );
  const shown = useMemo<DiagramModel | null>(() => {
    const source = trial ? null : (fit ?? shownRecord);
    if (!model) return null;
    const errorAt = source && radiusErrorOf(source);
    return { theta: model.theta, vSys: model.vSys, vExp: model.vExp, ...(errorAt && { errorAt }) };
  }, [model, fit, shownRecord, trial]);
  // Few rings would make an axis of their own; the cube's range shows where they stand.
  const domain = useMemo(
    () =>
      shown || rings.length > 2
        ? undefined
        : {
            velocity: [Math.min(...axes.spectral.velocities), Math.max(...axes.spectral.velocities)] as const,
            radius: Math.max(...rings.map((r) => r.theta), 1e-6) * 1.5,
            residual: 1,
          },
    [shown, rings, axes],
  );
  const points = useMemo(() => {
    if (!model) return [];
    const centre = { lon: model.l, lat: model.b };
    return live.marks.map((m) => ({
      velocity: m.velocity,
      radius: separation(centre, { lon: m.l, lat: m.b }),
    }));
  }, [model, live]);

  const drawing = (
    <>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline' }}>
        <SectionTitle>Radius–velocity</SectionTitle>
        <Text size="small" tone="quiet">
          {modelSource ? `${SOURCES[modelSource]}, sphere` : ''}
        </Text>
      </View>
      <View style={{ height: diagramHeight }}>
        {width > 0 && (rings.length > 0 || shown) ? (
          <RadiusVelocity
            width={width}
            height={diagramHeight}
            rings={rings}
            model={shown}
            points={points}
            channelWidth={axes.spectral.channelWidth}
            current={velocity}
            domain={domain}
            name={shell?.name ?? 'this shell'}
            onModel={changeTrial}
            onPick={(ring) => ring.channel !== null && showChannel(ring.channel)}
          />
        ) : (
          <View style={{ flex: 1, alignItems: 'center', justifyContent: 'center', padding: space(4) }}>
            <Text tone="quiet" align="center">
              Rings appear here from three marks on a channel, the fit from six marks on three channels.
            </Text>
          </View>
        )}
      </View>
      <TrialPanel />
    </>
  );
  return (
    <View style={{ gap: space(2) }} onLayout={(e) => setWidth(Math.floor(e.nativeEvent.layout.width))}>
      {!numbersFirst && drawing}
      {fit && <LiveParameters fit={fit} />}
      {fit?.warnings.map((w) => (
        <Notice key={w.code} kind="person" title={TITLES[w.code] ?? 'Caution'}>
          <Text size="small">{w.message}</Text>
        </Notice>
      ))}
      {live.problem && (
        <Notice kind="person" title={live.problem.title}>
          <Text size="small">{live.problem.detail}</Text>
        </Notice>
      )}
      {numbersFirst && drawing}
    </View>
  );
}

function LiveParameters({ fit }: { fit: FitResult }) {
  const { color } = useTheme();
  return (
    <View role="list" aria-label="Parameters of the live fit">
      {SHOWN.map((name) => (
        <View
          key={name}
          role="listitem"
          style={{
            flexDirection: 'row',
            alignItems: 'center',
            justifyContent: 'space-between',
            minHeight: space(9),
            gap: space(3),
            paddingHorizontal: space(2),
            borderBottomWidth: hairline,
            borderBottomColor: color.line,
          }}
        >
          {name === 'l' || name === 'b' ? (
            <Text>{`Centre ${name}`}</Text>
          ) : (
            <ParameterName name={name} long />
          )}
          <Quantity quantity={fit.parameters[name]} align="right" />
        </View>
      ))}
    </View>
  );
}
