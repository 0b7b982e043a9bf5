import fc from 'fast-check';
import reference from '@/tests/reference/spectral.json';
import { frequencyOfVelocity, HYDROGEN_HZ, SPECTRAL_QUANTITIES, velocityOfFrequency } from './doppler';
import { spectralAxis } from './spectralAxis';
import type { SpectralSpec, SpectralType } from './wcsSpec';

const spec = (over: Partial<SpectralSpec>): SpectralSpec => ({
  type: 'VRAD',
  linearIn: null,
  referenceChannel: 0,
  reference: -50_000,
  step: 1000,
  channels: 64,
  restFrequencyHz: HYDROGEN_HZ,
  restAssumed: false,
  convention: 'radio',
  frame: 'LSRK',
  ...over,
});

describe.each(reference.rows)('$id: $note', (row) => {
  it.each([
    ['radio', 'vradKms'],
    ['optical', 'voptKms'],
    ['relativistic', 'vrelKms'],
  ] as const)('%s', (convention, name) => {
    const v = velocityOfFrequency(convention, row.frequencyHz, row.restFrequencyHz) / 1000;
    expect(Math.abs(v - row[name])).toBeLessThan(1e-9);
    const hz = frequencyOfVelocity(convention, row[name] * 1000, row.restFrequencyHz);
    expect(Math.abs(hz / row.frequencyHz - 1)).toBeLessThan(1e-12);
  });

  it('wavelength', () => {
    expect(Math.abs(SPECTRAL_QUANTITIES.WAVE.value(row.frequencyHz, 1) / row.wavelengthM - 1)).toBeLessThan(
      1e-12,
    );
  });
});

describe.each(reference.axes)('$id: $note', (axis) => {
  it('has the reference frequencies and velocities', () => {
    const type = axis.linearIn as SpectralType;
    const { convention } = SPECTRAL_QUANTITIES[type];
    const unit = type === 'VRAD' || type === 'VOPT' || type === 'VELO' ? 1000 : 1;
    const { frequencyHzOf, velocityOf, channelOf } = spectralAxis(
      spec({
        type,
        convention,
        reference: axis.start * unit,
        step: axis.step * unit,
        channels: axis.channels.length,
        restFrequencyHz: axis.restFrequencyHz,
      }),
    );
    for (const c of axis.channels) {
      const velocity = { radio: c.vradKms, optical: c.voptKms, relativistic: c.vrelKms }[convention];
      expect(Math.abs(frequencyHzOf(c.channel)! / c.frequencyHz - 1)).toBeLessThan(1e-12);
      expect(Math.abs(velocityOf(c.channel) - velocity)).toBeLessThan(1e-9);
      expect(Math.abs(channelOf(velocity) - c.channel)).toBeLessThan(1e-6);
    }
  });
});

describe('spectralAxis', () => {
  const types = Object.keys(SPECTRAL_QUANTITIES) as SpectralType[];

  it('comes back from velocity to channel for every type and algorithm', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...types),
        fc.constantFrom('F', 'W', 'V', null),
        fc.double({ min: -3, max: 70, noNaN: true }),
        (type, linearIn, channel) => {
          const quantity = SPECTRAL_QUANTITIES[type];
          const reference = quantity.value(HYDROGEN_HZ * 0.995, HYDROGEN_HZ);
          const step = quantity.value(HYDROGEN_HZ * 0.99501, HYDROGEN_HZ) - reference;
          const axis = spectralAxis(spec({ type, linearIn, reference, step }));
          expect(Math.abs(axis.channelOf(axis.velocityOf(channel)) - channel)).toBeLessThan(1e-6);
        },
      ),
    );
  });

  it('follows a logarithmic axis', () => {
    const axis = spectralAxis(spec({ type: 'WAVE', linearIn: 'LOG', reference: 0.21, step: 1e-5 }));
    expect(axis.valueOf(10)).toBeCloseTo(0.21 * Math.exp(1e-4 / 0.21), 15);
    expect(axis.channelOf(axis.velocityOf(10))).toBeCloseTo(10, 8);
  });

  it('gives velocities without a rest frequency where the axis counts velocity, and no frequencies', () => {
    const axis = spectralAxis(spec({ restFrequencyHz: null }));
    expect(axis.velocityOf(2)).toBe(-48);
    expect(axis.frequencyHzOf(2)).toBeNull();
    expect(() => spectralAxis(spec({ type: 'FREQ', reference: 1.42e9, restFrequencyHz: null }))).toThrow(
      /rest/,
    );
  });

  it('refuses channels at no real frequency', () => {
    expect(() => spectralAxis(spec({ type: 'FREQ', reference: -1e9, step: 1 }))).toThrow(/no real frequency/);
    expect(() => spectralAxis(spec({ type: 'VELO', reference: 4e8, step: 1 }))).toThrow(/no real frequency/);
  });
});
