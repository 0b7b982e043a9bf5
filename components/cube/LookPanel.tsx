import { useState, type ComponentType } from 'react';
import { ScrollView, View } from 'react-native';
import { ColourSection } from '@/components/seeing/ColourSection';
import { FilmSection } from '@/components/seeing/FilmSection';
import { LinesSection } from '@/components/seeing/LinesSection';
import { SmoothSection } from '@/components/seeing/SmoothSection';
import { ViewSection } from '@/components/seeing/ViewSection';
import { IconButton } from '@/components/ui/Button';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space } from '@/components/ui/tokens';

const SECTIONS = {
  colour: { label: 'Colour', part: ColourSection },
  view: { label: 'View', part: ViewSection },
  smooth: { label: 'Smooth', part: SmoothSection },
  film: { label: 'Film', part: FilmSection },
  lines: { label: 'Lines', part: LinesSection },
} as const satisfies Record<string, { label: string; part: ComponentType }>;
type Section = keyof typeof SECTIONS;
const ORDER = Object.keys(SECTIONS) as Section[];

/** Where it was left, as long as the page is open. */
let last: Section = 'colour';

/** How the map looks, in five parts; lies over the map's edge, so that every change is seen. */
export function LookPanel({ onClose }: { onClose: () => void }) {
  const { color } = useTheme();
  const [section, setSection] = useState<Section>(last);
  const Part = SECTIONS[section].part;
  const keys = {
    onKeyDown: (e: { key: string; stopPropagation(): void }) => {
      if (e.key !== 'Escape') return;
      e.stopPropagation();
      onClose();
    },
  } as object;
  return (
    <View
      role="region"
      aria-label="Look of the map"
      {...keys}
      style={{
        width: '100%',
        maxWidth: space(94),
        maxHeight: '100%',
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: color.line,
        backgroundColor: color.panel,
        boxShadow: `0 ${space(1)}px ${space(6)}px ${color.shadow}`,
      }}
    >
      <View
        style={{
          flexDirection: 'row',
          alignItems: 'center',
          justifyContent: 'space-between',
          paddingLeft: space(3),
          paddingVertical: space(1),
        }}
      >
        <SegmentedChoice
          small
          hideLabel
          label="Part of the look"
          value={section}
          options={ORDER.map((key) => ({ value: key, label: SECTIONS[key].label }))}
          onChange={(to) => {
            last = to;
            setSection(to);
          }}
        />
        <IconButton icon="close" label="Close the look of the map" onPress={onClose} />
      </View>
      <ScrollView
        style={{ flexGrow: 0 }}
        contentContainerStyle={{ gap: space(3), padding: space(4), paddingTop: space(2) }}
      >
        <Part />
      </ScrollView>
    </View>
  );
}
