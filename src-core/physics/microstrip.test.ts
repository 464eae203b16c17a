import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { ETA_0 } from './constants';
import { crossSection } from './cross-section';
import { coupledMicrostrip, dispersedDk, microstrip, thickCoupledMicrostrip } from './microstrip';

const HAMMERSTAD = 'Hammerstad and Jensen, IEEE MTT-S Digest 1980, 407-409';
const KIRSCHNING = 'Kirschning and Jansen, IEEE Trans. MTT-32, 1984, 83-90';
const both = ({ impedance, effectiveDk }: ReturnType<typeof microstrip>) => [impedance, effectiveDk];

checkValues({
  id: 'T-14',
  what: 'strip over a plane in air',
  source: HAMMERSTAD,
  relativeTolerance: 1e-6,
  compute: ({ u }) => microstrip(u, 1).impedance,
  rows: [
    { u: 0.5, expected: 166.6998 },
    { u: 1, expected: 126.4239 },
    { u: 2, expected: 89.0289 },
    { u: 5, expected: 49.3679 },
  ],
});

checkValues({
  id: 'T-14',
  what: 'the same against the exact conformal map',
  source: 'Love 1923, exact; the formula claims 0.03 %',
  relativeTolerance: 3e-4,
  compute: ({ u }) => microstrip(u, 1).impedance,
  rows: [
    { u: 0.5, expected: 166.6998 },
    { u: 1, expected: 126.4239 },
    { u: 2, expected: 89.0287 },
    { u: 5, expected: 49.3657 },
  ],
});

describe('T-15 microstrip', () => {
  const cases = [
    { u: 0.5, er: 4.3, formula: [96.404, 2.9901], field: [96.363, 2.9926] },
    { u: 1, er: 4.3, formula: [71.751, 3.1045], field: [71.734, 3.1061] },
    { u: 2, er: 4.3, formula: [49.192, 3.2755], field: [49.185, 3.2764] },
    { u: 1, er: 3.5, formula: [78.436, 2.5979], field: [78.404, 2.6] },
    { u: 2, er: 3.5, formula: [53.907, 2.7276], field: [53.893, 2.7289] },
    { u: 1, er: 9.9, formula: [49.054, 6.6421], field: [49.071, 6.6375] },
    { u: 3.08, er: 2.2, formula: [50.03, 1.8812], field: [50.001, 1.8833] },
  ];
  checkValues({
    id: 'T-15',
    what: 'impedance, effective Dk',
    source: HAMMERSTAD,
    relativeTolerance: 1e-5,
    printedWithin: 5e-4, // of the impedance; Dk has a digit more
    compute: ({ u, er }) => both(microstrip(u, er)),
    rows: cases.map(({ u, er, formula }) => ({ u, er, expected: formula })),
  });
  checkValues({
    id: 'T-15',
    what: 'the same against a field solution',
    source: 'moment method; the formula claims 0.2 % of ε',
    relativeTolerance: 2e-3,
    compute: ({ u, er }) => both(microstrip(u, er)),
    rows: cases.map(({ u, er, field }) => ({ u, er, expected: field })),
  });
});

checkValues({
  id: 'T-16',
  what: 'impedance at the w/h that gives 50 ohm',
  source: 'moment method, root',
  relativeTolerance: 3e-3,
  compute: ({ er, u }) => microstrip(u, er).impedance,
  rows: [
    { er: 2.2, u: 3.0801, expected: 50 },
    { er: 3.5, u: 2.2587, expected: 50 },
    { er: 4.3, u: 1.9466, expected: 50 },
    { er: 9.9, u: 0.9622, expected: 50 },
  ],
});

checkValues({
  id: 'T-17',
  what: 'impedance at the book’s w/h 0.9654 on alumina; effective Dk',
  source: 'Pozar, Microwave Engineering, 4th ed., Example 3.7; its design formula for Dk differs by 0.6 %',
  relativeTolerance: 7e-3,
  compute: () => both(microstrip(0.9654, 9.9)),
  rows: [{ expected: [50, 6.665] }],
});

checkValues({
  id: 'T-18',
  what: 'impedance at the book’s w/h 3.081 on ε 2.2',
  source: 'Pozar, Microwave Engineering, 3rd ed., Example 3.7; design formula, about 0.7 %',
  relativeTolerance: 7e-3,
  compute: () => both(microstrip(3.081, 2.2)),
  rows: [{ expected: [50, 1.87] }],
});

describe('T-19 dispersion', () => {
  const cases = [
    { u: 1, er: 9.9, h: 0.635e-3, hz: 5e9, formula: 6.7858, field: 6.7671 },
    { u: 1, er: 9.9, h: 0.635e-3, hz: 20e9, formula: 7.4718, field: 7.4577 },
    { u: 2, er: 4.3, h: 0.254e-3, hz: 10e9, formula: 3.3036, field: 3.3015 },
    { u: 2, er: 4.3, h: 0.254e-3, hz: 40e9, formula: 3.4449, field: 3.4534 },
  ];
  const compute = ({ u, er, h, hz }: (typeof cases)[number]) =>
    dispersedDk(u, er, microstrip(u, er).effectiveDk, hz * h);
  checkValues({
    id: 'T-19',
    what: 'effective Dk at a frequency',
    source: 'Kirschning and Jansen, Electronics Letters 18, 1982, 272-273',
    relativeTolerance: 1e-5,
    compute,
    rows: cases.map((one) => ({ ...one, expected: one.formula })),
  });
  checkValues({
    id: 'T-19',
    what: 'the same against full wave',
    source: 'spectral domain; the formula claims 0.6 %',
    relativeTolerance: 6e-3,
    compute,
    rows: cases.map((one) => ({ ...one, expected: one.field })),
  });
});

describe('T-20 coupled microstrip', () => {
  const cases = [
    { u: 1, g: 1, er: 9.8, formula: [55.713, 7.1327, 42.444, 5.8734], field: [55.602, 7.1442, 42.505, 5.8673] },
    { u: 1, g: 0.5, er: 4.3, formula: [87.518, 3.3128, 53.591, 2.7743], field: [87.433, 3.32, 53.694, 2.7695] },
    { u: 2, g: 1, er: 4.3, formula: [54.789, 3.5016, 42.998, 2.9784], field: [54.664, 3.5066, 43.02, 2.9787] },
    { u: 1.2, g: 0.8, er: 3.6, formula: [82.235, 2.8641, 58.254, 2.45], field: [82.028, 2.8719, 58.333, 2.4475] },
  ];
  const compute = ({ u, g, er }: { u: number; g: number; er: number }) => {
    const { even, odd } = coupledMicrostrip(u, g, er);
    return [...both(even), ...both(odd)];
  };
  checkValues({
    id: 'T-20',
    what: 'even and odd impedance and Dk',
    source: KIRSCHNING,
    relativeTolerance: 1e-5,
    printedWithin: 5e-4,
    compute,
    rows: cases.map(({ u, g, er, formula }) => ({ u, g, er, expected: formula })),
  });
  checkValues({
    id: 'T-20',
    what: 'the same against a field solution',
    source: 'moment method; within 0.5 %',
    relativeTolerance: 5e-3,
    compute,
    rows: cases.map(({ u, g, er, field }) => ({ u, g, er, expected: field })),
  });
});

checkValues({
  id: 'T-21',
  what: 'thick microstrip u 2, t/h 0.15, ε 4: impedance, effective Dk; then of no thickness',
  source: HAMMERSTAD,
  relativeTolerance: 1e-5,
  printedWithin: 5e-4,
  compute: () => [...both(microstrip(2, 4, 0.15)), ...both(microstrip(2, 4))],
  rows: [{ expected: [48.778, 2.9782, 50.811, 3.0701] }],
});

checkValues({
  id: 'T-21',
  what: 'the thick one against boundary elements',
  source: 'boundary elements, converged to 0.05 %',
  relativeTolerance: 1e-2,
  compute: () => both(microstrip(2, 4, 0.15)),
  rows: [{ expected: [48.8, 2.98] }],
});

checkValues({
  id: 'T-31',
  what: 'microstrip u 1 buried deep in its own dielectric, ε 4.3: impedance, effective Dk',
  source: 'limit of a thick cover, exact; Hammerstad and Jensen in air',
  relativeTolerance: 1e-3,
  compute: () => {
    const { odd } = crossSection({
      widthMeters: 1,
      thicknessMeters: 0,
      lower: { heightMeters: 1, dk: 4.3 },
      cover: { heightMeters: 20, dk: 4.3 },
    });
    return [odd.impedanceOhms, odd.effectiveDk];
  },
  rows: [{ expected: [60.967, 4.3] }],
});

checkValues({
  id: 'T-14',
  what: 'no dielectric: the cross-section says so in both modes',
  source: 'ε = 1 everywhere, exact',
  absoluteTolerance: 1e-9,
  compute: () => {
    const { odd, even } = crossSection({
      widthMeters: 1,
      gapMeters: 1,
      thicknessMeters: 0.1,
      lower: { heightMeters: 1, dk: 1 },
    });
    return [odd.effectiveDk, even.effectiveDk, ETA_0 * (odd.impedanceOhms - odd.airImpedanceOhms)];
  },
  rows: [{ expected: [1, 1, 0] }],
});

/** Boundary elements in air, 50 by 24 panels a strip, which give single strips within 0.1 % of T-14: [w/h, s/h, t/h, even, odd]. */
const thickPairs = [
  [1, 1, 0.05, 144.689, 97.357],
  [1.16, 1.47, 0.18, 124.327, 90.609],
  [2, 1, 0.15, 98.707, 67.489],
  [2.5, 2, 0.4, 79.074, 62.326],
  [1, 1, 0.2, 138.254, 86.886],
] as const;

test('thick pairs lie within the stated share of boundary elements', () => {
  for (const [u, g, t, even, odd] of thickPairs) {
    const pair = thickCoupledMicrostrip(u, g, 1, t);
    expect(Math.abs(pair.even.impedance / even - 1)).toBeLessThan(0.01);
    expect(Math.abs(pair.odd.impedance / odd - 1)).toBeLessThan(0.025);
  }
});
