// Where there is no pointer (native, tests); the web build takes WindowSlider.web.tsx.
import { View } from 'react-native';
import { brightness } from '@/components/cube/words';
import { ENDS, type TrackRange } from '@/components/cube/windowScale';

export interface WindowSliderProps {
  window: readonly [number, number];
  range: TrackRange;
  unit: string | null;
  /** CSS gradient of the palette. */
  gradient: string;
  onChange: (window: [number, number]) => void;
}

export function WindowSlider({ window, unit }: WindowSliderProps) {
  return (
    <View>
      {ENDS.map((name, end) => (
        <View
          key={name}
          role="slider"
          aria-label={name}
          aria-valuetext={`${brightness(window[end]!)} ${unit ?? ''}`}
        />
      ))}
    </View>
  );
}
