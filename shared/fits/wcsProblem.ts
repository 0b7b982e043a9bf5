import { Problem } from '@/shared/contract/problem';
import { WcsError } from '@/shared/sky/wcsSpec';
import type { Header } from './header';
import type { SkyAxes } from './skyAxes';

/**
 * Run a step of shared/sky, with its errors turned into problems that name the card as this file writes it.
 *
 * @param axes with the spectral axis, from 0, where there is one
 */
export function usable<T>(step: () => T, axes: SkyAxes & { spectral?: number }, header: Header): T {
  try {
    return step();
  } catch (error) {
    if (!(error instanceof WcsError)) throw error;
    const hasCd = header.has(`CD${axes.longitude + 1}_${axes.longitude + 1}`);
    const names: Record<string, string> = {
      CTYPE: `CTYPE${axes.longitude + 1}`,
      CRVAL: `CRVAL${axes.latitude + 1}`,
      CD: `${hasCd ? 'CD' : 'PC'}${axes.longitude + 1}_${axes.longitude + 1}`,
      PV2_1: `PV${axes.latitude + 1}_1`,
      ...(axes.spectral !== undefined && {
        CDELT: `CDELT${axes.spectral + 1}`,
        SPECTRAL: `CRVAL${axes.spectral + 1}`,
      }),
    };
    throw new Problem('fits-card', error.message, { card: names[error.card] ?? error.card });
  }
}
