import { useWindowDimensions } from 'react-native';
import { breakpoints } from './tokens';

export interface Room {
  width: number;
  height: number;
  /** Columns and a top bar; else a phone. */
  wide: boolean;
  /** Room for a second map. */
  roomy: boolean;
  /** A phone on its side: every row of pixels counts. */
  low: boolean;
}

export function useWide(): Room {
  const { width, height } = useWindowDimensions();
  const wide = width >= breakpoints.wide;
  return { width, height, wide, roomy: width >= breakpoints.roomy, low: !wide && height < breakpoints.low };
}
