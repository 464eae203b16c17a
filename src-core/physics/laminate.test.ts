import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { DB_PER_NEPER, SPEED_OF_LIGHT } from './constants';
import { debyeThrough, jointPoint, permittivity, wideBandLogarithm } from './laminate';
import { lineConstants } from './transmission-line';

const DJORDJEVIC = 'Djordjević, Biljić, Likar-Smiljanić, Sarkar, IEEE Trans. EMC 43(4), 2001, 662-667';
const point = { dk: 4.2, df: 0.02, atHz: 1e9 };

checkValues({
  id: 'M-14',
  what: 'a band so narrow that it is one pole, ε∞ 3.8, step 0.5: ε′, ε″, Df at the pole; ε′, ε″ at ten times that',
  source: 'Debye, exact',
  absoluteTolerance: 1e-6,
  compute: ({ byPole }) => {
    const [pole, width] = [1e9, 1e-4];
    const band = [pole * (1 - width), pole * (1 + width)] as const;
    const slope = 0.5 / Math.log(band[1] / band[0]);
    const [re, im] = wideBandLogarithm([byPole * pole], band);
    const [real, loss] = [3.8 + slope * re, -slope * im];
    return byPole === 1 ? [real, loss, loss / real] : [real, loss];
  },
  rows: [
    { byPole: 1, expected: [4.05, 0.25, 0.061728] },
    { byPole: 10, expected: [3.80495, 0.049505] },
  ],
});

checkValues({
  id: 'M-15',
  what: 'wideband Debye through Dk 4.2, Df 0.02 at 1 GHz: ε∞, D, whole step',
  source: DJORDJEVIC,
  relativeTolerance: 1e-5,
  compute: () => {
    const { infinite, slope } = debyeThrough(point);
    return [infinite, slope * Math.LN10, slope * Math.LN10 * 8];
  },
  rows: [{ expected: [3.83036, 0.123212, 0.985699] }],
});

checkValues({
  id: 'M-16',
  what: 'Dk and Df of that material over frequency',
  source: `${DJORDJEVIC}; checked by an integral over a continuum of Debye poles`,
  relativeTolerance: 1e-5,
  printedWithin: 5e-7,
  compute: ({ hz }) => {
    const [re, im] = permittivity(point, [hz]);
    return [re, -im / re];
  },
  rows: [
    { hz: 1e6, expected: [4.56963, 0.018277] },
    { hz: 100e6, expected: [4.32321, 0.01944] },
    { hz: 1e9, expected: [4.2, 0.02] },
    { hz: 10e9, expected: [4.07679, 0.020486] },
    { hz: 50e9, expected: [3.99073, 0.020392] },
  ],
});

checkValues({
  id: 'M-17',
  what: 'slope of Dk in a decade against (2 ln 10/π) ε″',
  source: 'consequence of Kramers and Kronig, exact',
  relativeTolerance: 3e-3,
  compute: () => permittivity(point, [1e9])[0] - permittivity(point, [1e10])[0],
  rows: [
    { expected: ((2 * Math.LN10) / Math.PI) * -permittivity(point, [Math.sqrt(10) * 1e9])[1] },
    { expected: 0.12321 },
  ],
});

/** ε′ from ε″ alone: ε∞ + (2/π) PV∫ x ε″(x)/(x²−f²) dx, the pole taken out. */
function fromLossAlone(hz: number): number {
  const loss = (x: number) => -permittivity(point, [x])[1];
  const steps = 40_000;
  let sum = 0;
  for (let i = 0; i < steps; i++) {
    const x = hz * Math.exp(((i + 0.5) / steps - 0.5) * 80);
    sum += ((x * loss(x) - hz * loss(hz)) / (x * x - hz * hz)) * x * (80 / steps);
  }
  return debyeThrough(point).infinite + (2 / Math.PI) * sum;
}

checkValues({
  id: 'M-18',
  what: 'Dk rebuilt from ε″ alone',
  source: 'Kramers and Kronig, exact',
  relativeTolerance: 1e-5,
  compute: ({ hz }) => fromLossAlone(hz),
  rows: [
    { hz: 10e9, expected: 4.07679 },
    { hz: 100e6, expected: 4.32321 },
  ],
});

/** Loss of a TEM line in a dielectric with constant Dk and Df: nepers per metre and β. */
const temLine = (dk: number, df: number, hz: number) => {
  const z = 100;
  const omega = 2 * Math.PI * hz;
  const c = Math.sqrt(dk) / SPEED_OF_LIGHT / z;
  return lineConstants(0, c * z * z, omega * c * df, c, omega);
};

checkValues({
  id: 'M-19',
  what: 'dielectric loss at 14 GHz, Dk 4, Df 0.02: factor k in dB per inch = k f(GHz) √Dk Df, and dB per inch',
  source: 'low-loss limit of the exact formula, any textbook',
  relativeTolerance: 1e-3,
  compute: () => {
    const [alpha] = temLine(4, 0.02, 14e9);
    const perInch = alpha * DB_PER_NEPER * 0.0254;
    return [perInch / (14 * 2 * 0.02), perInch];
  },
  rows: [{ expected: [2.31194, 1.2947] }],
});

checkValues({
  id: 'M-20',
  what: 'exact dielectric loss at 10 GHz, Dk 4: dB/m at Df 0.02 and 0.5, β/β0 at 0.5',
  source: 'γ = j(ω/c)√(Dk(1 − jDf)), exact',
  relativeTolerance: 1e-4,
  compute: () => {
    const [low] = temLine(4, 0.02, 10e9);
    const [high, beta] = temLine(4, 0.5, 10e9);
    return [low * DB_PER_NEPER, high * DB_PER_NEPER, beta / ((2 * Math.PI * 10e9 * 2) / SPEED_OF_LIGHT)];
  },
  rows: [{ expected: [36.407, 884.49, 1.02909] }],
});

test('dk and df given at two frequencies meet both', () => {
  const joint = jointPoint(3.37, 10e9, 0.004, 1e9);
  const [dk] = permittivity(joint, [10e9]);
  const [re, im] = permittivity(joint, [1e9]);
  expect(dk).toBeCloseTo(3.37, 12);
  expect(-im / re).toBeCloseTo(0.004, 12);
});

test('a point outside the range is refused', () => {
  expect(() => permittivity({ dk: 0.9, df: 0, atHz: 1e9 }, [1e9])).toThrow(RangeError);
  expect(() => permittivity({ dk: 4, df: 0.3, atHz: 1e9 }, [1e9])).toThrow(RangeError);
  expect(() => permittivity({ dk: 4, df: 0.01, atHz: 1e13 }, [1e9])).toThrow(RangeError);
});

test('DC and beyond the band are finite, and loss-free at DC', () => {
  const [re0, im0, re1, im1] = permittivity(point, [0, 1e15]);
  expect(im0).toBeCloseTo(0, 15);
  expect(re0).toBeGreaterThan(4.2);
  expect(re1).toBeLessThan(re0);
  expect(Math.abs(im1)).toBeLessThan(0.01);
});
