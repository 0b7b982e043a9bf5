import { useWindowDimensions } from 'react-native';
import { breakpoints } from './tokens';

/** wide: columns and a top bar; roomy: room for a second map. Neither: a phone. */
export function useWide(): { width: number; height: number; wide: boolean; roomy: boolean } {
  const { width, height } = useWindowDimensions();
  return { width, height, wide: width >= breakpoints.wide, roomy: width >= breakpoints.roomy };
}
