// Where there is no pointer (native, tests); the web build takes NumberSlider.web.tsx.
import { View } from 'react-native';

export interface NumberSliderProps {
  label: string;
  value: number;
  low: number;
  high: number;
  step: number;
  /** The value in words, seen beside the label and read out. */
  words: string;
  onChange: (value: number) => void;
}

export function NumberSlider({ label, words }: NumberSliderProps) {
  return <View role="slider" aria-label={label} aria-valuetext={words} />;
}
