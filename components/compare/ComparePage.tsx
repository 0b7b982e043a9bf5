import { useLocalSearchParams } from 'expo-router';
import { useMemo, useState } from 'react';
import { View } from 'react-native';
import type { Parameter } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';
import { useCompared, type Compared } from '@/hooks/useCompared';
import { MOST_PICKED } from '../catalogue/filters';
import { inSigma } from '../catalogue/PickBar';
import { RadiusVelocity } from '../diagram/RadiusVelocity';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { StatusChip } from '../ui/Chip';
import { EmptyState } from '../ui/EmptyState';
import { Measured } from '../ui/Measured';
import { Panel } from '../ui/Panel';
import { Notice } from '../ui/ProblemNotice';
import { Press } from '../ui/Press';
import { ParameterName, Quantity } from '../ui/Quantity';
import { SegmentedChoice } from '../ui/SegmentedChoice';
import { Skeleton } from '../ui/Skeleton';
import { HeadText, Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { commonDomain, drawnOf } from './compareData';

/** Two to four shells side by side: diagrams on common axes, parameters row by row. */
export function ComparePage() {
  const { ids = '' } = useLocalSearchParams<{ ids?: string }>();
  const wanted = useMemo(() => [...new Set(ids.split(',').filter(Boolean))].slice(0, MOST_PICKED), [ids]);
  const compared = useCompared(wanted);
  const names = compared.data?.map((c) => c.shell.name).join(', ');
  return (
    <Screen
      title="Compare shells"
      subtitle={names}
      crumbs={[{ label: 'Catalogue', href: '/catalogue' }, { label: 'Compare' }]}
      back="/catalogue"
    >
      {wanted.length < 2 ? (
        <EmptyState
          icon="compare"
          title="Pick two to four shells"
          action={<Button kind="primary" label="To the catalogue" href="/catalogue" />}
        >
          Tick them in the catalogue, then choose Compare.
        </EmptyState>
      ) : (
        <RecordGate
          read={compared}
          what="shells"
          home={{ href: '/catalogue', label: 'To the catalogue' }}
          skeleton={<Skeleton height={320} />}
        >
          {(data) => <SideBySide compared={data} />}
        </RecordGate>
      )}
    </Screen>
  );
}

function SideBySide({ compared }: { compared: readonly Compared[] }) {
  const { wide } = useWide();
  const [axis, setAxis] = useState<'observed' | 'centred'>('observed');
  const drawn = useMemo(() => compared.map((c) => drawnOf(c, axis === 'centred')), [compared, axis]);
  const domain = useMemo(() => commonDomain(drawn), [drawn]);
  const height = space(wide ? 72 : 60);
  return (
    <>
      <SegmentedChoice
        label="Velocity axis"
        value={axis}
        onChange={setAxis}
        options={[
          { value: 'observed', label: 'As observed' },
          { value: 'centred', label: 'From each v sys' },
        ]}
      />
      <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4) }}>
        {compared.map(({ shell, fit }, i) => (
          <Panel
            key={shell.id}
            title={
              <Press href={`/shells/${shell.id}`} style={{ minHeight: touch, justifyContent: 'center' }}>
                <Text heading={2} size="lead" weight="semibold">
                  {shell.name}
                </Text>
                <Text size="small" tone="quiet">
                  {[shell.designation, shell.regionName].filter(Boolean).join(' · ')}
                </Text>
              </Press>
            }
            aside={<StatusChip status={shell.status} />}
            style={wide ? { flex: 1, minWidth: 0 } : undefined}
          >
            {fit ? (
              <Measured height={height}>
                {(width) => (
                  <RadiusVelocity
                    width={width}
                    height={height}
                    domain={domain}
                    name={shell.name}
                    {...drawn[i]!}
                  />
                )}
              </Measured>
            ) : (
              <Notice>No fit of this shell is adopted, so there is nothing to draw.</Notice>
            )}
          </Panel>
        ))}
      </View>
      <ParameterTable compared={compared} />
    </>
  );
}

interface Row {
  key: string;
  name: React.ReactNode;
  label: string;
  of: (shell: Shell) => Parameter | null | undefined;
}

function ParameterTable({ compared }: { compared: readonly Compared[] }) {
  const factor = compared.find((c) => c.shell.adopted)?.shell.adopted?.ageFactor;
  const rows: Row[] = [
    ...(['l', 'b', 'theta', 'vSys', 'vExp', 'radius'] as const).map((key): Row => ({
      key,
      label: key,
      name: <ParameterName name={key} long />,
      of: (s) => s.adopted?.[key],
    })),
    {
      key: 'age',
      label: 'age',
      name: <Text>{factor ? `Age, ${factor} R/v` : 'Age'}</Text>,
      of: (s) => s.adopted?.age,
    },
  ];
  const [a, b] = compared;
  const columns: Column<Row>[] = [
    { key: 'name', label: 'Parameter', width: space(30), cell: (r) => r.name },
    ...compared.map(({ shell }): Column<Row> => ({
      key: shell.id,
      label: shell.name,
      align: 'right',
      width: space(44),
      grow: 1,
      cell: (r) => <Quantity quantity={r.of(shell)} align="right" />,
    })),
    ...(compared.length === 2 && a && b
      ? [
          {
            key: 'difference',
            label: 'difference, in units of the joint error',
            head: <HeadText>difference</HeadText>,
            align: 'right' as const,
            width: space(28),
            cell: (r: Row) => {
              // two places on the sky are not two measurements of one thing
              const sigma = r.key === 'l' || r.key === 'b' ? null : inSigma(r.of(a.shell), r.of(b.shell));
              return <Text mono>{sigma === null ? '–' : sigma > 99 ? '> 99σ' : `${sigma.toFixed(1)}σ`}</Text>;
            },
          },
        ]
      : []),
  ];
  return (
    <Panel flush title="Parameters">
      <Table label="Parameters side by side" columns={columns} rows={rows} rowKey={(r) => r.key} />
      <View style={{ padding: space(4), paddingTop: 0, gap: space(1) }}>
        {compared.map(({ shell }) =>
          shell.adopted ? (
            <Text key={shell.id} size="small" tone="quiet">
              {`${shell.name}: ${shell.adopted.marks} marks, χ²/dof ${shell.adopted.chi2PerDof?.toFixed(2) ?? '–'}`}
            </Text>
          ) : null,
        )}
      </View>
    </Panel>
  );
}
