import { trackAt } from '@/shared/shell/modelTrack';
import { ringRadius } from '@/shared/shell/ring';
import { destination } from '@/shared/sky/greatCircle';

const shell = { l: 200, b: 12, theta: 9, vSys: -20, vExp: 14 };

test('through the centre a track reaches both caps, at the rim it closes, beyond there is none', () => {
  const middle = trackAt({ lon: 200, lat: 12 }, shell)!;
  expect([middle.near, middle.far]).toEqual([-34, -6]);
  const rim = trackAt(destination({ lon: 200, lat: 12 }, 70, 9 - 1e-9), shell)!;
  expect(rim.far - rim.near).toBeLessThan(0.01);
  expect(trackAt(destination({ lon: 200, lat: 12 }, 70, 9.01), shell)).toBeNull();
});

test('it is the ring seen from the side: the ring at the velocity of a place goes through the place', () => {
  for (const d of [1, 4, 7.5]) {
    const at = trackAt(destination({ lon: 200, lat: 12 }, 130, d), shell)!;
    expect(ringRadius(at.far, shell)).toBeCloseTo(d, 9);
    expect(ringRadius(at.near, shell)).toBeCloseTo(d, 9);
  }
});
