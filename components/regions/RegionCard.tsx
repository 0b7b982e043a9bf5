import { View } from 'react-native';
import type { Region } from '@/shared/contract/regions';
import { formatQuantity } from '@/shared/physics/quantity';
import { Chip, type ChipKind } from '../ui/Chip';
import { count, decimals } from '../ui/format';
import { Icon, type IconName } from '../ui/Icon';
import { Press, type PressState } from '../ui/Press';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, radius, space } from '../ui/tokens';

/** 'l 120.00° b −3.00°', or null. */
export const centreText = ({ centre }: Pick<Region, 'centre'>): string | null =>
  centre && `l ${decimals(centre.l, 2)}°  b ${decimals(centre.b, 2)}°`;
/** '850 ± 60 pc', or null. */
export const distanceText = ({ distance }: Pick<Region, 'distance'>): string | null =>
  distance && formatQuantity({ value: distance.pc, se: distance.errorPc, unit: 'pc' }).line;

/** What waits in a region, in words; empty where nothing does. */
export function waitingChips({
  waiting,
}: Pick<Region, 'waiting'>): { label: string; kind: ChipKind; icon?: IconName }[] {
  const chips: { n: number; label: string; kind: ChipKind; icon?: IconName }[] = [
    {
      n: waiting.failedCubes,
      label: `${count(waiting.failedCubes, 'cube')} failed`,
      kind: 'error',
      icon: 'caution',
    },
    {
      n: waiting.uploads,
      label: `${count(waiting.uploads, 'upload')} under way`,
      kind: 'person',
      icon: 'upload',
    },
    { n: waiting.ingesting, label: `${count(waiting.ingesting, 'cube')} being read`, kind: 'model' },
    { n: waiting.runningFits, label: `${count(waiting.runningFits, 'fit')} running`, kind: 'model' },
    { n: waiting.unfitted, label: `${count(waiting.unfitted, 'shell')} to fit`, kind: 'person' },
  ];
  return chips.filter((c) => c.n > 0);
}

/** A region in the list: what it is, what it holds, what waits. The whole card is the link. */
export function RegionCard({ region }: { region: Region }) {
  const { color } = useTheme();
  const chips = waitingChips(region);
  const facts = [centreText(region), distanceText(region)].filter(Boolean) as string[];
  return (
    <Press
      href={`/regions/${region.id}`}
      style={({ hovered }: PressState) => ({
        flexGrow: 1,
        gap: space(3),
        padding: space(4),
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: hovered ? color.control : color.line,
        backgroundColor: color.panel,
      })}
    >
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2) }}>
        <Text heading={2} size="lead" weight="semibold" style={{ flex: 1 }} numberOfLines={1}>
          {region.name}
        </Text>
        <Icon name="next" size={18} tone="quiet" />
      </View>
      {region.description ? (
        <Text tone="quiet" numberOfLines={3}>
          {region.description}
        </Text>
      ) : null}
      {facts.length > 0 && (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(4) }}>
          {facts.map((fact) => (
            <Text key={fact} mono size="small" tone="quiet">
              {fact}
            </Text>
          ))}
        </View>
      )}
      <View style={{ flex: 1 }} />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), alignItems: 'center' }}>
        <Counted n={region.counts.cubes} what="cube" />
        <Counted n={region.counts.shells} what="shell" />
        {chips.map((c) => (
          <Chip key={c.label} {...c} />
        ))}
      </View>
    </Press>
  );
}

function Counted({ n, what }: { n: number; what: string }) {
  return (
    <Text tone="quiet" style={{ marginRight: space(1) }}>
      <Text mono weight="semibold">
        {n}
      </Text>{' '}
      {n === 1 ? what : `${what}s`}
    </Text>
  );
}
