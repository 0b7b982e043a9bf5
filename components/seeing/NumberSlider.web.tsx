import { View } from 'react-native';
import type { NumberSliderProps } from '@/components/seeing/NumberSlider';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { space, touch } from '@/components/ui/tokens';

/** A number on a track, with its label and its value in words above. */
export function NumberSlider({ label, value, low, high, step, words, onChange }: NumberSliderProps) {
  const { color } = useTheme();
  return (
    <View>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', gap: space(2) }}>
        <Text size="small" tone="quiet" weight="semibold">
          {label}
        </Text>
        <Text size="small" mono>
          {words}
        </Text>
      </View>
      <input
        type="range"
        aria-label={label}
        aria-valuetext={words}
        value={value}
        min={low}
        max={high}
        step={step}
        onChange={(e) => onChange(Number(e.target.value))}
        style={{ width: '100%', height: touch, margin: 0, accentColor: color.action }}
      />
    </View>
  );
}
