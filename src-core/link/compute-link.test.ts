import fc from 'fast-check';
import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { describe, expect, test } from 'vitest';
import type { Model } from '../model/types';
import { computeTime } from '../time/compute-time';
import { delayOf, gridFor, matchedPath, modelOf, skinLossOf } from '../time/testing';
import { computeLink } from './compute-link';

type Change = Parameters<typeof modelOf>[0];

const symbolRate = 25e9;
const grid = gridFor(symbolRate, 8);

/** A lossy line with an echo, `lossDb` at Nyquist. */
function path(lossDb: number, echo = 0.04) {
  const line = skinLossOf(lossDb / 8.685889638 / Math.sqrt((Math.PI * symbolRate) / 2), 1e-9);
  const late = delayOf(170e-12);
  return matchedPath(grid, (f) => {
    const [re, im] = line(f);
    const [echoRe, echoIm] = late(f).map((value) => echo * value);
    return [re * (1 + echoRe) - im * echoIm, re * echoIm + im * (1 + echoRe)];
  });
}

function linkOf(change: Change, lossDb = 8, echo?: number) {
  const model = modelOf(change);
  return { model, link: computeLink(model, computeTime(model, { total: path(lossDb, echo) }, { grid })) };
}

const impairments = {
  transmitter: {
    taps: [-0.06, 0.82, -0.12],
    mainTap: 1,
    randomJitterSeconds: 0.4e-12,
    deterministicJitterSeconds: 2e-12,
  },
  receiver: { noiseVolts: 8e-3, dfe: { taps: 2, limit: 0.2 } },
};

/** What a slicer sees of random symbols: its voltage times the symbol's sign, by the symbol's level. */
function randomSymbols(model: Model, link: ReturnType<typeof computeLink>, count: number, seed: number) {
  const random = xoroshiro128plus(seed);
  const uniform = () => uniformFloat64(random);
  const normal = () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  const levels = model.modulation === 'NRZ' ? [-0.5, 0.5] : [-0.5, -1 / 6, 1 / 6, 0.5];
  const { pulse, samplesPerUi, mainIndex, dfeTaps, noiseVolts } = link;
  const jitter = model.transmitter!;
  const before = 6;
  const after = 40;
  const symbols = Float64Array.from(
    { length: count + before + after },
    () => levels[Math.floor(uniform() * levels.length)],
  );
  const seen = new Map<number, number[]>();
  for (let n = after; n < count + after; n++) {
    const dirac = (uniform() < 0.5 ? -0.5 : 0.5) * jitter.deterministicJitterSeconds;
    const late = ((dirac + normal() * jitter.randomJitterSeconds) / model.unitInterval) * samplesPerUi;
    const whole = Math.floor(late);
    const share = late - whole;
    let volts = normal() * noiseVolts;
    for (let m = -before; m <= after; m++) {
      const at = mainIndex + m * samplesPerUi + whole;
      volts += symbols[n - m] * ((1 - share) * pulse[at] + share * pulse[at + 1]);
    }
    for (let i = 0; i < dfeTaps.length; i++) volts -= symbols[n - 1 - i] * dfeTaps[i];
    const level = Math.abs(symbols[n]);
    if (!seen.has(level)) seen.set(level, []);
    seen.get(level)!.push(volts * Math.sign(symbols[n]));
  }
  for (const list of seen.values()) list.sort((a, b) => a - b);
  return seen;
}

// half a million symbols take a second, more where other tests run beside
describe('against random symbols at 1e-4, at least 100 errors counted, within 2 % of the main cursor', {
  timeout: 60_000,
}, () => {
  test('NRZ', () => {
    const { model, link } = linkOf({ ...impairments, targetBer: 1e-4 });
    const [margins] = randomSymbols(model, link, 520_000, 1).values();
    // errors at a threshold: half of the symbols are of either sign, and each errs to one side
    const errors = Math.round(2e-4 * margins.length);
    expect(errors).toBeGreaterThanOrEqual(100);
    expect(link.eyeHeightVolts).toBeGreaterThan(0.1 * link.mainCursorVolts);
    expect(Math.abs(2 * margins[errors] - link.eyeHeightVolts)).toBeLessThan(0.02 * link.mainCursorVolts);
  });

  test('PAM4, the smallest of its eyes', () => {
    const { model, link } = linkOf(
      { ...impairments, modulation: 'PAM4', targetBer: 1e-4, receiver: { ...impairments.receiver, noiseVolts: 4e-3 } },
      2,
      0.01,
    );
    const seen = randomSymbols(model, link, 800_000, 2);
    const inner = seen.get(1 / 6)!;
    const outer = seen.get(0.5)!;
    // 6 tails of a quarter of the symbols each, half a bit a symbol error: a tail at the target is 8/6 of it times two
    const share = (1e-4 * 8) / 3;
    const errors = Math.round(share * inner.length);
    expect(errors).toBeGreaterThanOrEqual(100);
    const middle = 2 * inner[errors];
    const upper = outer[Math.round(share * outer.length)] - inner[inner.length - 1 - errors];
    // an eye so wide that the tolerance below is a small part of it
    expect(link.eyeHeightVolts).toBeGreaterThan(0.1 * link.mainCursorVolts);
    expect(Math.abs(Math.min(middle, upper) - link.eyeHeightVolts)).toBeLessThan(0.02 * link.mainCursorVolts);
  });
});

test('without noise the eye at 1e-18 is what the worst pattern leaves', () => {
  for (const modulation of ['NRZ', 'PAM4'] as const) {
    // one pole: cursors fall so fast that 60 bits, 1e-18, hold the worst pattern
    const pole = (f: number) => {
      const x = 2 * Math.PI * f * 8e-12;
      const [re, im] = delayOf(1e-9)(f);
      return [(re + x * im) / (1 + x * x), (im - x * re) / (1 + x * x)] as const;
    };
    const model = modelOf({ modulation, targetBer: 1e-18 });
    const link = computeLink(model, computeTime(model, { total: matchedPath(grid, pole) }, { grid }));
    const { pulse, mainIndex, samplesPerUi, mainCursorVolts } = link;
    let others = 0;
    for (let i = mainIndex % samplesPerUi; i < pulse.length; i += samplesPerUi) {
      if (i !== mainIndex) others += Math.abs(pulse[i]);
    }
    const worst = mainCursorVolts / (modulation === 'NRZ' ? 1 : 3) - others;
    expect(worst).toBeGreaterThan(0.05 * mainCursorVolts);
    // terms between bins reach at most a bin further, a two-thousandth of half the main cursor
    expect(Math.abs(link.eyeHeightVolts - worst)).toBeLessThan(0.003 * mainCursorVolts);
  }
});

test('noise alone: the height is the main cursor less twice Q sigma', () => {
  // one symbol fills its UI at its middle; the residual cursors of the filter are 1 % or so, hence the bound
  const { link } = linkOf({ receiver: { noiseVolts: 0.02, bandwidthHz: 25e9 }, targetBer: 1e-9 }, 0, 0);
  const others = link.cursors.reduce((sum, value) => sum + Math.abs(value), 0) - link.mainCursorVolts;
  const alone = link.mainCursorVolts - 2 * 5.8857 * 0.02; // Q of 2e-9
  expect(link.eyeHeightVolts).toBeLessThan(alone + 1e-4);
  expect(link.eyeHeightVolts).toBeGreaterThan(alone - others - 1e-4);
});

test('more noise, more jitter or a rarer error make no eye larger', () => {
  const base = linkOf({ ...impairments, receiver: { ...impairments.receiver, noiseVolts: 4e-3 } }).link;
  fc.assert(
    fc.property(
      fc.constantFrom('noise', 'random', 'deterministic', 'ber'),
      fc.double({ min: 1.05, max: 3, noNaN: true }),
      (what, factor) => {
        const { link } = linkOf({
          transmitter: {
            ...impairments.transmitter,
            randomJitterSeconds: 0.4e-12 * (what === 'random' ? factor : 1),
            deterministicJitterSeconds: 2e-12 * (what === 'deterministic' ? factor : 1),
          },
          receiver: { ...impairments.receiver, noiseVolts: 4e-3 * (what === 'noise' ? factor : 1) },
          targetBer: 1e-12 / (what === 'ber' ? factor ** 5 : 1),
        });
        expect(link.eyeHeightVolts).toBeLessThanOrEqual(base.eyeHeightVolts + 1e-5);
        expect(link.eyeWidthUi).toBeLessThanOrEqual(base.eyeWidthUi + 1e-4);
      },
    ),
    { seed: 5, numRuns: 16 },
  );
});

test('the picture agrees with the figures: contour at the sampling instant, all probability in each column', () => {
  for (const modulation of ['NRZ', 'PAM4'] as const) {
    const { link } = linkOf({ ...impairments, modulation, targetBer: 1e-4 }, 3, 0.02);
    const { phases, voltages, log10, openings } = link.density;
    const heights = openings.map(({ lower, upper }) => upper[phases / 2] - lower[phases / 2]);
    expect(Math.min(...heights)).toBeCloseTo(link.eyeHeightVolts, 6);
    expect(openings.length).toBe(modulation === 'NRZ' ? 1 : 3);
    for (let i = 0; i < phases; i++) {
      let whole = 0;
      for (let row = 0; row < voltages; row++) whole += 10 ** log10[row * phases + i];
      // the average over jitter is taken of logarithms between columns: a column's sum is 1 to within a few percent
      expect(Math.abs(whole - 1)).toBeLessThan(0.05);
    }
  }
});

test('an inverted path is turned back, and says so', () => {
  const upright = linkOf(impairments);
  const model = modelOf(impairments);
  const total = path(8);
  const turned = { differential: total.differential.map((value) => -value) };
  const link = computeLink(model, computeTime(model, { total: turned }, { grid }));
  expect(link.inverted).toBe(true);
  expect(link.eyeHeightVolts).toBeCloseTo(upright.link.eyeHeightVolts, 12);
});

test('an automatic CTLE is at least as good as each of its settings declared, by the figure that chooses it', () => {
  const { link } = linkOf({ receiver: { noiseVolts: 1e-3, ctle: 'auto' } }, 16, 0);
  expect(link.ctleDcGainDb).toBeLessThan(0);
  const declared = linkOf(
    {
      receiver: {
        noiseVolts: 1e-3,
        ctle: { dcGainDb: link.ctleDcGainDb!, zeroHz: symbolRate / 4, polesHz: [symbolRate / 4, symbolRate] },
      },
    },
    16,
    0,
  ).link;
  expect(link.eyeHeightVolts).toBeCloseTo(declared.eyeHeightVolts, 6);
  expect(link.noiseVolts).toBeCloseTo(declared.noiseVolts, 12);
  const none = linkOf({ receiver: { noiseVolts: 1e-3 } }, 16, 0).link;
  expect(link.eyeHeightVolts).toBeGreaterThan(none.eyeHeightVolts);
});

test('what is not declared is said', () => {
  const { transmitter: _, receiver: __, ...bare } = modelOf();
  const time = computeTime(bare, { total: path(3) }, { grid });
  expect(computeLink(bare, time).without).toEqual(['transmitter', 'receiver']);
});
