import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { automaticCtle } from '../time/filters';
import { solveDfe } from './dfe';
import { figureOfMeritDb } from './figure-of-merit';
import { levelsOf } from './levels';
import { noiseBandwidths, shapedNoise } from './noise';
import { shifted, valueAt } from './resample';
import { samplingInstant } from './sampling-instant';

checkValues({
  id: 'E-06',
  what: 'DFE of two taps without limit on [0.5, 0.2, -0.1, 0.05]: taps by the main cursor, residuals, worst NRZ eye',
  source: 'exact',
  absoluteTolerance: 1e-12,
  compute: () => {
    const taps = solveDfe(0.5, [0.2, -0.1, 0.05], 2, Number.POSITIVE_INFINITY);
    const left = [0.2, -0.1, 0.05].map((p, i) => p - (taps[i] ?? 0));
    return [...taps.map((tap) => tap / 0.5), ...left, 2 * (0.5 - left.reduce((sum, p) => sum + Math.abs(p), 0))];
  },
  rows: [{ expected: [0.4, -0.2, 0, 0, 0.05, 0.9] }],
});

checkValues({
  id: 'E-07',
  what: 'The same with a limit of 0.3: first tap by the main cursor, what is left of its postcursor',
  source: 'exact',
  absoluteTolerance: 1e-12,
  compute: () => {
    const [tap] = solveDfe(0.5, [0.2, -0.1, 0.05], 2, 0.3);
    return [tap / 0.5, 0.2 - tap];
  },
  rows: [{ expected: [0.3, 0.05] }],
});

checkValues({
  id: 'E-11',
  what: 'Sampling instant on a triangle 1 - |t|/1.5 UI: UI from its peak, and the response there',
  source: 'derived from the rule of IEEE 802.3 Annex 93A',
  absoluteTolerance: 1e-6,
  compute: ({ limit }) => {
    const perUi = 32;
    const pulse = Float64Array.from({ length: 256 }, (_, i) => Math.max(0, 1 - Math.abs(i - 128) / (1.5 * perUi)));
    const instant = samplingInstant(pulse, perUi, limit);
    return [(instant - 128) / perUi, valueAt(pulse, instant)];
  },
  rows: [
    { limit: 0, expected: [0, 1] },
    { limit: 0.5, expected: [-0.3, 0.8] },
  ],
});

checkValues({
  id: 'S-07',
  what: 'Noise bandwidth of the receiver filter by its bandwidth; rms noise in mV of 5.2e-8 V²/GHz',
  source: '(π/8)/sin(π/8), exact; the density from IEEE 802.3 Table 93-8',
  relativeTolerance: 1e-5,
  compute: () => {
    const fr = 0.75 * 25.78125e9;
    const { flat } = noiseBandwidths(fr);
    return [flat / fr, 1e3 * Math.sqrt(5.2e-17 * flat)];
  },
  rows: [{ expected: [1.02617, 1.01577] }],
});

checkValues({
  id: 'S-09',
  what: 'Mean square of the levels of NRZ and PAM4',
  source: 'exact',
  relativeTolerance: 1e-6,
  compute: () => [levelsOf('NRZ').meanSquare, levelsOf('PAM4').meanSquare],
  rows: [{ expected: [1, 0.555556] }],
});

checkValues({
  id: 'S-14',
  what: 'Figure of merit: signal 60 mV, transmitter noise -27 dB of it, interference 4, jitter 2, noise 1 mV rms',
  source: 'IEEE 802.3 Annex 93A, figure of merit',
  absoluteTolerance: 1e-4,
  compute: () =>
    figureOfMeritDb(
      {
        mainCursor: 0.12,
        interferenceSquared: (2 * 4e-3) ** 2,
        slopesSquared: 1,
        jitterUi: 2 * 2e-3,
        // no transmitter noise of its own here: it goes in with the noise
        noiseVolts: Math.hypot(1e-3, 0.06 * 10 ** (-27 / 20)),
      },
      levelsOf('NRZ'),
    ),
  rows: [{ expected: 21.0632 }],
});

test('a CTLE that is flat leaves the noise, one that lowers DC lowers it', () => {
  const shape = automaticCtle(25e9);
  // at 0 dB the zero cancels the first pole: what is left is one pole at the symbol rate
  const onePole = { dcGainDb: 0, zeroHz: 1e9, polesHz: [1e9, 25e9] };
  expect(shapedNoise(1e-3, 18e9, { dcGainDb: 0, ...shape })).toBeCloseTo(shapedNoise(1e-3, 18e9, onePole), 9);
  expect(shapedNoise(1e-3, 18e9)).toBe(1e-3);
  expect(shapedNoise(1e-3, 18e9, { dcGainDb: -6, ...shape })).toBeLessThan(
    shapedNoise(1e-3, 18e9, { dcGainDb: -3, ...shape }),
  );
});

test('a record is read between its samples to 1e-5', () => {
  const record = Float64Array.from({ length: 256 }, (_, i) => Math.sin((2 * Math.PI * 16 * i) / 256));
  const moved = shifted(record, 0.37);
  moved.forEach((value, i) => {
    expect(Math.abs(value - Math.sin((2 * Math.PI * 16 * (i + 0.37)) / 256))).toBeLessThan(2e-5);
    expect(value).toBeCloseTo(valueAt(record, i + 0.37), 12);
  });
});
