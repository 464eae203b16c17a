import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { computeTime, modeEnds } from './compute-time';
import { delayOf, gridFor, matchedPath, modelOf, skinLossOf } from './testing';

const wide = { bandwidthHz: 1e15 };

checkValues({
  id: 'D-14',
  what: 'Skin-loss line, 10 dB at 5 GHz, pulse of 100 ps: response at T, 2T, 3T, 4T',
  source: 'Wigington and Nahman, Proc. IRE 1957; step erfc(k / 2√t)',
  relativeTolerance: 0.01,
  compute: () => {
    const grid = gridFor(10e9, 10, 3);
    const model = modelOf({ symbolRate: 10e9, transmitter: { riseTimeSeconds: 0 }, receiver: wide });
    const total = matchedPath(grid, skinLossOf(9.18599e-6, 1e-9));
    const { pulse, samplesPerUi } = computeTime(model, { total }, { grid });
    return [1, 2, 3, 4].map((n) => pulse[(10 + n) * samplesPerUi]);
  },
  rows: [{ expected: [0.515985, 0.130035, 0.061629, 0.037704] }],
});

checkValues({
  id: 'D-04',
  what: 'The edge: 20 to 80 % in declared rise times, 10 to 90 % in sigmas, greatest slope times 10-90',
  source: 'exact, Gaussian edge',
  relativeTolerance: 1e-3, // read off samples 1/64 of the UI apart
  compute: () => {
    const grid = gridFor(10e9, 8, 4);
    const riseTimeSeconds = 30e-12;
    const model = modelOf({ symbolRate: 10e9, transmitter: { riseTimeSeconds }, receiver: wide });
    const time = computeTime(model, { total: matchedPath(grid, delayOf(1e-9)) }, { grid });
    const edge = time.pulse.subarray(9 * time.samplesPerUi, 10.5 * time.samplesPerUi);
    const crossing = (level: number) => {
      const i = edge.findIndex((value) => value >= level);
      return (i - (edge[i] - level) / (edge[i] - edge[i - 1])) * time.sampleSeconds;
    };
    const sigma = riseTimeSeconds / 1.68324;
    const rise = crossing(0.9) - crossing(0.1);
    const slope = Math.max(...edge.map((value, i) => (i === 0 ? 0 : value - edge[i - 1]))) / time.sampleSeconds;
    return [(crossing(0.8) - crossing(0.2)) / riseTimeSeconds, rise / sigma, slope * rise];
  },
  rows: [{ expected: [1, 2.5631, 1.02253] }],
});

/** A channel of whole-UI taps, as a path. */
const taps = (values: readonly number[], symbolRate: number, delayUi: number) => (f: number) => {
  let [re, im] = [0, 0];
  values.forEach((value, n) => {
    const turn = (-2 * Math.PI * f * (n + delayUi)) / symbolRate;
    re += value * Math.cos(turn);
    im += value * Math.sin(turn);
  });
  return [re, im] as const;
};

const ffeOutput = (channel: readonly number[], ffe: readonly number[], mainTap: number, count: number) => {
  const symbolRate = 10e9;
  const grid = gridFor(symbolRate, 8, 3);
  const model = modelOf({ symbolRate, transmitter: { taps: ffe, mainTap, riseTimeSeconds: 20e-12 }, receiver: wide });
  const { pulse, samplesPerUi } = computeTime(
    model,
    { total: matchedPath(grid, taps(channel, symbolRate, 10)) },
    { grid },
  );
  // the middle of each symbol, relative to what one lone symbol is there
  const alone = computeTime(
    modelOf({ symbolRate, transmitter: { riseTimeSeconds: 20e-12 }, receiver: wide }),
    { total: matchedPath(grid, taps([1], symbolRate, 10)) },
    { grid },
  ).pulse[10.5 * samplesPerUi];
  return Array.from({ length: count }, (_, n) => pulse[(10.5 + n - mainTap) * samplesPerUi] / alone);
};

// Tolerances below: neighbours reach into the middle of a symbol by 1e-4, the Gaussian edge's own tail.
checkValues({
  id: 'E-02',
  what: 'Channel [1, 0.5] behind taps [1, -0.5, 0.25]: output samples',
  source: 'zero forcing by long division, exact',
  absoluteTolerance: 3e-4,
  compute: () => ffeOutput([1, 0.5], [1, -0.5, 0.25], 0, 4),
  rows: [{ expected: [1, 0, 0, 0.125] }],
});

checkValues({
  id: 'E-03',
  what: 'Channel [0.2, 1, 0.3] behind a centred three-tap zero forcing: output samples',
  source: 'Lucky 1965; Proakis, exact',
  absoluteTolerance: 3e-4,
  compute: () => ffeOutput([0.2, 1, 0.3], [-5 / 22, 25 / 22, -7.5 / 22], 1, 5),
  rows: [{ expected: [-0.045455, 0, 1, 0, -0.102273] }],
});

checkValues({
  id: 'E-05',
  what: 'One-pole channel a = 0.4 behind [1, -a]/(1 + a): output cursor, then nothing',
  source: 'exact',
  absoluteTolerance: 3e-4,
  compute: () =>
    ffeOutput(
      Array.from({ length: 30 }, (_, n) => 0.6 * 0.4 ** n),
      [1 / 1.4, -0.4 / 1.4],
      0,
      3,
    ),
  rows: [{ expected: [0.428571, 0, 0] }],
});

test('a matched line delays the symbol by just its delay, swing untouched', () => {
  const grid = gridFor(25e9, 8);
  const { pulse, samplesPerUi } = computeTime(
    modelOf({ receiver: wide }),
    { total: matchedPath(grid, delayOf(200e-12)) }, // 5 UI
    { grid },
  );
  expect(pulse[5 * samplesPerUi]).toBeCloseTo(0.5, 2);
  expect(pulse[6 * samplesPerUi]).toBeCloseTo(0.5, 2);
  const area = pulse.reduce((sum, value) => sum + value, 0) / samplesPerUi;
  expect(area).toBeCloseTo(1, 12);
});

test('capacitance of a leg halves in the differential mode and doubles in the common', () => {
  const [differential, common] = modeEnds(modelOf({ transmitter: { capacitanceFarads: 0.12e-12 } }));
  expect(differential.source.farads).toBeCloseTo(0.06e-12, 20);
  expect(common.source.farads).toBeCloseTo(0.24e-12, 20);
  const [alone] = modeEnds(modelOf({ signalling: 'single-ended', transmitter: { capacitanceFarads: 0.12e-12 } }));
  expect(alone.source.farads).toBeCloseTo(0.12e-12, 20);
});

test('the two parts of an automatic CTLE add up to the pulse through a declared one', () => {
  const grid = gridFor(25e9, 8);
  const cascade = { total: matchedPath(grid, skinLossOf(5e-6, 1e-9)) };
  const { ctleParts } = computeTime(modelOf({ receiver: { ctle: 'auto' } }), cascade, { grid });
  const declared = computeTime(
    modelOf({ receiver: { ctle: { dcGainDb: -6, zeroHz: 25e9 / 4, polesHz: [25e9 / 4, 25e9] } } }),
    cascade,
    { grid },
  );
  declared.pulse.forEach((value, n) => {
    expect(ctleParts!.flat[n] * 10 ** (-6 / 20) + ctleParts!.rising[n]).toBeCloseTo(value, 12);
  });
});
