import fc from 'fast-check';
import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { gaussianTail, gaussianTailInverse } from './gaussian';
import { evenDensity } from './isi-density';
import { jittered, jitterNodes } from './jitter';
import { noisyTail } from './noisy-tail';

checkValues({
  id: 'D-09',
  what: 'Q for a bit error ratio',
  source: '(1/2) erfc(Q/√2), exact',
  absoluteTolerance: 1e-5,
  compute: ({ ber }) => gaussianTailInverse(ber),
  rows: [
    { ber: 1e-3, expected: 3.09023 },
    { ber: 1e-4, expected: 3.71902 },
    { ber: 1e-5, expected: 4.26489 },
    { ber: 1e-6, expected: 4.75342 },
    { ber: 1e-9, expected: 5.99781 },
    { ber: 1e-12, expected: 7.03448 },
    { ber: 1e-15, expected: 7.94135 },
  ],
});

checkValues({
  id: 'D-10',
  what: 'Bit error ratio for Q',
  source: 'IEEE 802.3cd reflector, message 208; (1/2) erfc(Q/√2)',
  relativeTolerance: 1e-5,
  compute: ({ q }) => gaussianTail(q),
  rows: [
    { q: 7, expected: 1.27981e-12 },
    { q: 6, expected: 9.86588e-10 },
  ],
});

const space = () => ({ front: new Float64Array(4), back: new Float64Array(4) });

/** Tail of terms ± a (volts) and noise, bins as the link takes them: a sixteenth of sigma. */
function tailOf(amplitudes: readonly number[], sigma: number) {
  const bin = sigma / 16;
  const scaled = Float64Array.from(amplitudes, (a) => a / bin);
  const { logAbove } = noisyTail(evenDensity(scaled, true, space()), 16);
  return (x: number) => Math.exp(logAbove(x / bin));
}

/** The amplitude that is exceeded with a probability. */
function exceeded(tail: (x: number) => number, probability: number): number {
  let [a, b] = [0, 1000];
  for (let i = 0; i < 60; i++) {
    const middle = (a + b) / 2;
    if (tail(middle) > probability) a = middle;
    else b = middle;
  }
  return a;
}

checkValues({
  id: 'S-12',
  what: 'Signal 100 mV against noise of 10 mV rms alone at 1e-5: ratio and dB',
  source: 'exact given the definition of the margin',
  relativeTolerance: 1e-4,
  compute: () => {
    const ratio = 100 / exceeded(tailOf([], 10), 1e-5);
    return [ratio, 20 * Math.log10(ratio)];
  },
  rows: [{ expected: [2.34473, 7.4018] }],
});

checkValues({
  id: 'S-13',
  what: 'One residual tap of 10 mV, noise 5 mV rms, at 1e-5: amplitude and margin of 60 mV in dB',
  source: 'closed form 10 + 5 Qinv(2e-5)',
  relativeTolerance: 1e-3,
  compute: () => {
    const amplitude = exceeded(tailOf([10], 5), 1e-5);
    return [amplitude, 20 * Math.log10(60 / amplitude)];
  },
  rows: [{ expected: [30.537, 5.8664] }],
});

checkValues({
  id: 'D-12',
  what: 'Dual Dirac of 20 and normal of 2, half of the edges present: probability beyond 20, and where it is 1e-12',
  source: 'exact, (rho/2) [Q((x - DJ/2)/s) + Q((x + DJ/2)/s)]',
  relativeTolerance: 1e-4,
  compute: () => {
    const tail = tailOf([10], 2);
    return [0.5 * tail(20), exceeded((x) => 0.5 * tail(x), 1e-12)];
  },
  rows: [{ expected: [0.71663e-7, 23.677] }],
});

test('tails are right to 1 % down to 1e-15, wherever the terms fall between bins', () => {
  fc.assert(
    fc.property(
      // a few large terms, for which all signs can be written out, many small ones, and a depth
      fc.array(fc.double({ min: 0.2, max: 12, noNaN: true }), { minLength: 0, maxLength: 8 }),
      fc.array(fc.double({ min: 0, max: 0.4, noNaN: true }), { minLength: 0, maxLength: 4 }),
      fc.double({ min: -15, max: -2, noNaN: true }),
      (large, small, depth) => {
        const terms = [...large, ...small];
        const exact = (x: number) => {
          let sum = 0;
          for (let signs = 0; signs < 2 ** terms.length; signs++) {
            const shift = terms.reduce((total, a, i) => total + ((signs >> i) & 1 ? a : -a), 0);
            sum += gaussianTail(x - shift);
          }
          return sum / 2 ** terms.length;
        };
        const tail = tailOf(terms, 1);
        const x = exceeded(tail, 10 ** depth);
        expect(Math.abs(tail(x) / exact(x) - 1)).toBeLessThan(0.01);
      },
    ),
    { seed: 7, numRuns: 40 },
  );
});

const terms = fc.array(fc.double({ min: 0, max: 60, noNaN: true }), { maxLength: 60 });

test('a density keeps its whole, its variance, and no term is negative', () => {
  fc.assert(
    fc.property(terms, (amplitudes) => {
      const { half, excessVariance } = evenDensity(Float64Array.from(amplitudes), true, space());
      let [whole, variance] = [half[0], 0];
      half.forEach((p, i) => {
        expect(p).toBeGreaterThanOrEqual(0);
        if (i > 0) whole += 2 * p;
        variance += 2 * p * i * i;
      });
      expect(whole).toBeCloseTo(1, 12);
      const wanted = amplitudes.reduce((sum, a) => sum + a * a, 0);
      expect(Math.abs(variance - excessVariance - wanted)).toBeLessThan(1e-9 * (1 + wanted));
    }),
    { seed: 3, numRuns: 100 },
  );
});

test('without noise the worst pattern is where it is, to half a bin', () => {
  fc.assert(
    // so few terms that nothing is cut off, none below a bin
    fc.property(fc.array(fc.double({ min: 1, max: 60, noNaN: true }), { maxLength: 40 }), (amplitudes) => {
      const { half } = evenDensity(Float64Array.from(amplitudes), false, space());
      const worst = amplitudes.reduce((sum, a) => sum + a, 0);
      expect(Math.abs(half.length - 1 - worst)).toBeLessThan(2); // and the bin that holds nothing
      expect(half.reduce((sum, p, i) => sum + (i === 0 ? p : 2 * p), 0)).toBeCloseTo(1, 12);
    }),
    { seed: 4, numRuns: 100 },
  );
});

test('far below what can be summed the logarithm goes on as a Gaussian', () => {
  const { logAbove } = noisyTail(evenDensity(new Float64Array(0), true, space()), 16);
  for (const q of [12, 20, 40]) {
    // ln Q(q) = -q²/2 - ln(q √(2π)) + ln(1 - 1/q² + …)
    const exact = (-q * q) / 2 - Math.log(q * Math.sqrt(2 * Math.PI)) + Math.log1p(-1 / (q * q));
    expect(Math.abs(logAbove(16 * q) / exact - 1)).toBeLessThan(0.02);
  }
});

test('jitter averages probabilities that change by decades from column to column', () => {
  // a margin in sigmas that falls off to both sides of column 20, slanted
  const margin = (c: number) => 14 - 0.4 * (c - 20) ** 2 - 0.5 * (c - 20);
  const log = (c: number) => {
    const q = margin(c);
    return q < 8 ? Math.log(gaussianTail(q)) : (-q * q) / 2 - Math.log(q * Math.sqrt(2 * Math.PI)) - 1 / (q * q);
  };
  const columns = Float64Array.from({ length: 41 }, (_, c) => log(c));
  for (const [random, deterministic] of [
    [0.2, 0],
    [0, 3.4],
    [0.3, 2.6],
  ]) {
    const nodes = jitterNodes(random / 32, deterministic / 32, 32);
    const exact = nodes.probability.reduce((sum, p, i) => sum + p * Math.exp(log(20 + nodes.place[i])), 0);
    // in sigmas of the margin, of which there are 13: probability times margin
    const sigmas = Math.log(jittered(columns, 20, nodes) / exact) / 13;
    expect(Math.abs(sigmas)).toBeLessThan(0.02);
  }
});
