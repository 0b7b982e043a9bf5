import fc from 'fast-check';
import { PROJECTIONS } from './projections';
import { separation } from './greatCircle';
import { WcsError } from './wcsSpec';

/** How far from the native reference point each projection is tried: to its horizon, or all round. */
const ZENITHAL: Record<string, number> = { TAN: -1, SIN: -1, NCP: -20, ARC: 179, STG: 175, ZEA: 179.9 };

describe.each(Object.keys(PROJECTIONS))('projection %s', (code) => {
  const projection = PROJECTIONS[code]!([], 50);
  const there = (phi: number, theta: number) => {
    const plane = projection.forward(phi, theta);
    if (plane === null) return null;
    const native = projection.inverse(plane[0], plane[1]);
    return native && separation({ lon: native[0], lat: native[1] }, { lon: phi, lat: theta });
  };
  const lowest = projection.referenceLatitude === 0 ? -89.99 : Math.max(-85, 89 - Math.abs(ZENITHAL[code]!));

  it('comes back within 1e-9 degrees', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -179.999, max: 179.999, noNaN: true }),
        fc.double({
          min: code === 'NCP' ? 45 : code === 'SIN' || code === 'TAN' ? 1 : lowest,
          max: 89.99,
          noNaN: true,
        }),
        (phi, theta) => {
          expect(there(phi, theta)).toBeLessThan(1e-9);
        },
      ),
    );
  });

  it('keeps tiny steps about its reference point', () => {
    const lat = projection.referenceLatitude;
    for (const d of [1e-3, 1e-6, 1e-9]) expect(there(d, lat === 90 ? 90 - d : d)).toBeLessThan(1e-12);
  });

  it('puts its reference point at the origin', () => {
    const [X, Y] = projection.forward(0, projection.referenceLatitude)!;
    expect(Math.hypot(X, Y)).toBeLessThan(1e-13);
  });
});

describe('edges of the maps', () => {
  const at = (code: string, X: number, Y: number) => PROJECTIONS[code]!([], 50).inverse(X, Y);
  const radian = 180 / Math.PI;

  it('knows nothing beyond them', () => {
    expect(at('SIN', 1.001 * radian, 0)).toBeNull();
    expect(at('ARC', 180.01, 0)).toBeNull();
    expect(at('ZEA', 2.001 * radian, 0)).toBeNull();
    expect(at('CAR', 0, 90.1)).toBeNull();
    expect(at('CEA', 0, 57.4)).toBeNull();
    expect(at('MER', 180.1, 0)).toBeNull();
    expect(at('SFL', 100, 60)).toBeNull();
    expect(at('AIT', 2 * Math.SQRT2 * radian + 0.01, 0)).toBeNull();
    expect(at('MOL', 0, Math.SQRT2 * radian + 0.01)).toBeNull();
    expect(PROJECTIONS.TAN!([], 0).forward(0, 0)).toBeNull();
    expect(PROJECTIONS.SIN!([], 0).forward(0, -1)).toBeNull();
    expect(PROJECTIONS.MER!([], 0).forward(0, 90)).toBeNull();
  });

  it('reaches their poles', () => {
    for (const code of ['CAR', 'CEA', 'SFL', 'AIT', 'MOL']) {
      const [X, Y] = PROJECTIONS[code]!([], 0).forward(0, 90)!;
      expect(PROJECTIONS[code]!([], 0).inverse(X, Y - 1e-9)![1]).toBeGreaterThan(89.99);
    }
  });

  it('goes on with CAR beyond half a turn', () => {
    expect(at('CAR', 212, -4)).toEqual([212, -4]);
  });

  it('refuses parameters that make no map', () => {
    expect(() => PROJECTIONS.CEA!([null, 0], 0)).toThrow(WcsError);
    expect(() => PROJECTIONS.CEA!([null, 1.5], 0)).toThrow(/at most 1/);
    expect(() => PROJECTIONS.NCP!([], 0)).toThrow(/equator/);
  });
});
