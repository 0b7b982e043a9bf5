import { useMemo, useState } from 'react';
import { ScrollView, View } from 'react-native';
import type { Read } from '@/hooks/useRead';
import type { FitDraws } from '@/shared/contract/fits';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { ToggleChip } from '../ui/Chip';
import { Panel } from '../ui/Panel';
import { Notice } from '../ui/ProblemNotice';
import { Skeleton } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { CornerPlot, cornerWidth, LEAST_PANEL } from './CornerPlot';
import { drawColumns, type DrawColumn } from './drawColumns';
import type { DoneFit } from './fitFacts';
import { writtenName } from './parameterWords';
import { PercentileTable } from './PercentileTable';

/** The draws of the bootstrap, every pair of parameters; the same as percentiles in a table. */
export function CornerPanel({ fit, draws, name }: { fit: DoneFit; draws: Read<FitDraws>; name: string }) {
  if (fit.errorBars !== 'bootstrap')
    return (
      <Panel title="Draws">
        <Text tone="quiet">
          This fit was made without draws. Run it again with draws to see how the parameters go together.
        </Text>
      </Panel>
    );
  return (
    <Panel title="Draws of the bootstrap">
      <RecordGate read={draws} what="draws" skeleton={<Skeleton height={space(90)} />}>
        {(data) => <Corner fit={fit} draws={data} name={name} />}
      </RecordGate>
    </Panel>
  );
}

/** What a phone shows first: the three numbers of the sphere. */
const FEW = ['theta', 'vSys', 'vExp'];

function Corner({ fit, draws, name }: { fit: DoneFit; draws: FitDraws; name: string }) {
  const { wide } = useWide();
  const columns = useMemo(
    () => drawColumns(draws, (parameter) => fit.parameters[parameter]?.value),
    [draws, fit],
  );
  const [chosen, setChosen] = useState<readonly string[] | null>(null);
  const [table, setTable] = useState(false);
  const shownNames = chosen ?? (wide ? columns.map((c) => c.name) : FEW);
  const shown = useMemo(() => columns.filter((c) => shownNames.includes(c.name)), [columns, shownNames]);
  const toggle = (parameter: string) =>
    setChosen(
      shownNames.includes(parameter) ? shownNames.filter((n) => n !== parameter) : [...shownNames, parameter],
    );
  if (columns.length === 0)
    return <Text tone="quiet">Every parameter was held: there is nothing to draw.</Text>;
  return (
    <>
      <View
        role="group"
        aria-label="Parameters to draw"
        style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2) }}
      >
        {columns.map((c) => (
          <ToggleChip
            key={c.name}
            label={writtenName(c.name)}
            selected={shown.includes(c)}
            disabled={shown.length === 1 && shown.includes(c)}
            onPress={() => toggle(c.name)}
          />
        ))}
      </View>
      <Plot shown={shown} name={name} />
      <Unbounded columns={columns} />
      <Text size="small" tone="quiet">
        Contours hold 68 % (thick) and 95 % (thin) of the draws; the cross is the fit. Dashed lines: the 16th
        and 84th percentile.
      </Text>
      <View style={{ flexDirection: 'row' }}>
        <Button
          kind="quiet"
          label={table ? 'Hide the percentiles' : 'Show the percentiles'}
          aria-expanded={table}
          onPress={() => setTable(!table)}
        />
      </View>
      {table && <PercentileTable columns={columns} />}
    </>
  );
}

/** As wide as its place; where panels would be too small to read, it scrolls sideways by itself. */
function Plot({ shown, name }: { shown: readonly DrawColumn[]; name: string }) {
  const [width, setWidth] = useState(0);
  const least = cornerWidth(shown.length);
  const scroller = {
    tabIndex: 0,
    role: 'region',
    'aria-label': 'Plot of the draws, scrolls sideways',
  } as object;
  return (
    <View
      style={{ alignSelf: 'stretch', minHeight: LEAST_PANEL }}
      onLayout={(e) => setWidth(Math.floor(e.nativeEvent.layout.width))}
    >
      {width > 0 &&
        (least <= width ? (
          <CornerPlot columns={shown} width={width} name={name} />
        ) : (
          <ScrollView horizontal {...scroller}>
            <CornerPlot columns={shown} width={least} name={name} />
          </ScrollView>
        ))}
    </View>
  );
}

function Unbounded({ columns }: { columns: readonly DrawColumn[] }) {
  const open = columns.filter((c) => c.unbounded > 0);
  if (open.length === 0) return null;
  return (
    <Notice kind="person">
      {open
        .map(
          (c) =>
            `${c.unbounded} of ${c.values.length} draws leave ${writtenName(c.name)} without an upper bound. They are not drawn, but count in the percentiles.`,
        )
        .join(' ')}
    </Notice>
  );
}
