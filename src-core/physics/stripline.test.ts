import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { ETA_0 } from './constants';
import { surfaceResistance } from './copper';
import { crossSection } from './cross-section';
import { ellipticK, ellipticRatio } from './elliptic';
import {
  thickCoupledStripline,
  thickStripline,
  thinCoupledStripline,
  thinStripline,
  thinStriplineWidth,
} from './stripline';

const COHN = 'Cohn, Shielded coupled-strip transmission line, IRE Trans. MTT-3, 1955, 29-38; exact';

checkValues({
  id: 'T-01',
  what: 'stripline whose k = k′: w/b = (2/π) asinh 1, in air',
  source: 'self-dual point of K/K′, exact',
  relativeTolerance: 1e-6,
  compute: () => [(2 / Math.PI) * Math.asinh(1), thinStripline((2 / Math.PI) * Math.asinh(1))],
  rows: [{ expected: [0.5611, 94.1826] }],
});

checkValues({
  id: 'T-02',
  what: 'stripline of no thickness in air',
  source: 'Cohn, IRE Trans. MTT 1954; moment method 1e-7',
  relativeTolerance: 1e-6,
  compute: ({ w }) => thinStripline(w),
  rows: [
    { w: 0.1, expected: 194.2263 },
    { w: 0.25, expected: 139.9171 },
    { w: 0.5, expected: 100.4325 },
    { w: 1, expected: 65.3536 },
    { w: 2, expected: 38.5793 },
    { w: 4, expected: 21.2062 },
  ],
});

checkValues({
  id: 'T-03',
  what: 'impedance at the w/b that gives 50 ohm',
  source: 'root of the exact formula',
  relativeTolerance: 1e-5,
  compute: ({ er, w }) => thinStripline(w) / Math.sqrt(er),
  rows: [
    { er: 2.2, w: 0.829122, expected: 50 },
    { er: 3.0, w: 0.647625, expected: 50 },
    { er: 3.6, w: 0.553981, expected: 50 },
    { er: 4.0, w: 0.503968, expected: 50 },
    { er: 4.3, w: 0.471314, expected: 50 },
  ],
});

checkValues({
  id: 'T-04',
  what: 'stripline design w/b = 30π/(√ε Z0) − 0.441: w in mm and the exact impedance there',
  source: 'Pozar, Microwave Engineering, Example 3.5',
  relativeTolerance: 1e-3,
  compute: () => {
    const w = (30 * Math.PI) / (Math.sqrt(2.2) * 50) - 0.441;
    return [w * 3.2, thinStripline(w) / Math.sqrt(2.2)];
  },
  rows: [{ expected: [2.655, 49.97] }],
});

checkValues({
  id: 'T-06',
  what: 'thick stripline in air, Wheeler 1978',
  source: 'Wheeler, IEEE Trans. MTT-26, 1978',
  relativeTolerance: 1e-4,
  compute: ({ w, t }) => thickStripline(w, t),
  rows: [
    { w: 0.5, t: 0.05, expected: 90.244 },
    { w: 0.3, t: 0.1, expected: 103.933 },
    { w: 0.8, t: 0.1, expected: 63.979 },
  ],
});

checkValues({
  id: 'T-06',
  what: 'the same against boundary elements',
  source: 'boundary elements; Wheeler claims about 0.5 %',
  relativeTolerance: 3e-3,
  compute: ({ w, t }) => thickStripline(w, t),
  rows: [
    { w: 0.5, t: 0.05, expected: 90.276 },
    { w: 0.3, t: 0.1, expected: 103.879 },
    { w: 0.8, t: 0.1, expected: 64.134 },
  ],
});

checkValues({
  id: 'T-07',
  what: 'edge-coupled stripline in air: even, odd',
  source: COHN,
  relativeTolerance: 1e-6,
  compute: ({ w, s }) => {
    const { even, odd } = thinCoupledStripline(w, s);
    return [even, odd];
  },
  rows: [
    { w: 0.5, s: 0.1, expected: [122.8857, 69.8661] },
    { w: 0.35, s: 0.2, expected: [144.2431, 93.0321] },
    { w: 0.8, s: 0.5, expected: [79.76, 71.6388] },
  ],
});

checkValues({
  id: 'T-08',
  what: 'the limit of no coupling: even, odd, single',
  source: COHN,
  relativeTolerance: 1e-5,
  compute: () => {
    const { even, odd } = thinCoupledStripline(0.5, 4);
    return [even, odd, thinStripline(0.5)];
  },
  rows: [{ expected: [100.4326, 100.4323, 100.4325] }],
});

checkValues({
  id: 'T-28',
  what: 'edge-coupled stripline w/b 0.35, s/b 0.2, ε 3.6: differential and common impedance',
  source: COHN,
  relativeTolerance: 1e-5,
  printedWithin: 5e-4,
  compute: () => {
    const side = { heightMeters: 0.5, dk: 3.6 };
    const { odd, even } = crossSection({
      widthMeters: 0.35,
      gapMeters: 0.2,
      thicknessMeters: 0,
      lower: side,
      upper: side,
    });
    return [2 * odd.impedanceOhms, even.impedanceOhms / 2];
  },
  rows: [{ expected: [98.064, 38.011] }],
});

checkValues({
  id: 'T-24',
  what: 'coplanar waveguide in air, (η0/4) K′/K of the modulus',
  source: 'Wen 1969; exact',
  relativeTolerance: 1e-6,
  printedWithin: 5e-4,
  compute: ({ k }) => (ETA_0 / 4) * ellipticRatio(Math.sqrt(1 - k * k), k),
  rows: [
    { k: Math.SQRT1_2, expected: ETA_0 / 4 },
    { k: 0.5, expected: 120.484 },
    { k: 0.3, expected: 153.907 },
  ],
});

checkValues({
  id: 'T-05',
  what: 'stripline w 2.66, t 0.01, b 3.2 mm, ε 2.2, copper 5.813e7 at 10 GHz: conductor loss in Np/m',
  source: 'Pozar, Microwave Engineering, Example 3.5, Cohn’s formula; boundary elements agree within 3 %',
  relativeTolerance: 3e-2,
  compute: () => {
    const side = { heightMeters: 1.595e-3, dk: 2.2 };
    const { odd } = crossSection({ widthMeters: 2.66e-3, thicknessMeters: 0.01e-3, lower: side, upper: side });
    const r = surfaceResistance(10e9, 5.813e7) * (odd.stripPerMeter + odd.lowerPlanePerMeter + odd.upperPlanePerMeter);
    return r / (2 * 50);
  },
  rows: [{ expected: 0.1219 }],
});

checkValues({
  id: 'N-18',
  what: 'coupling lowers the differential impedance: w/b 0.35, ε 3.6: single; the pair at s/b 0.2 against 100 ohm',
  source: 'Cohn 1954, 1955, exact',
  relativeTolerance: 1e-4,
  compute: () => {
    const pair = (2 * thinCoupledStripline(0.35, 0.2).odd) / Math.sqrt(3.6);
    return [thinStripline(0.35) / Math.sqrt(3.6), (pair - 100) / (pair + 100)];
  },
  rows: [{ expected: [63.475, -0.009772] }],
});

checkValues({
  id: 'T-23',
  what: 'thick stripline w 0.15, t 0.017, b 0.3 mm, ε 3.6 at 10 GHz: impedance, conductor loss in dB per inch',
  source: "boundary elements with Wheeler's rule; Cohn and Pozar's formula gives 0.3275",
  relativeTolerance: 2e-2,
  compute: () => {
    const side = { heightMeters: 0.1415e-3, dk: 3.6 };
    const { odd } = crossSection({ widthMeters: 0.15e-3, thicknessMeters: 0.017e-3, lower: side, upper: side });
    const r = surfaceResistance(10e9, 5.8e7) * (odd.stripPerMeter + odd.lowerPlanePerMeter + odd.upperPlanePerMeter);
    return [odd.impedanceOhms, (r / (2 * odd.impedanceOhms)) * (20 / Math.LN10) * 0.0254];
  },
  rows: [{ expected: [47.02, 0.3258] }],
});

describe('T-30 thick striplines in air, t/b 0.05, w/b 0.5', () => {
  const t = { widthMeters: 0.5, thicknessMeters: 0.05 };
  const side = (heightMeters: number) => ({ heightMeters, dk: 1 });
  const source = 'boundary elements at three densities';
  checkValues({
    id: 'T-30',
    what: 'centred',
    source,
    relativeTolerance: 3e-3,
    compute: () => crossSection({ ...t, lower: side(0.475), upper: side(0.475) }).odd.impedanceOhms,
    rows: [{ expected: 90.276 }],
  });
  checkValues({
    id: 'T-30',
    what: 'shifted by 0.1 b',
    source,
    relativeTolerance: 3e-3,
    compute: () => crossSection({ ...t, lower: side(0.375), upper: side(0.575) }).odd.impedanceOhms,
    rows: [{ expected: 87.63 }],
  });
  checkValues({
    id: 'T-30',
    what: 'coupled, s/b 0.3: even, odd',
    source,
    relativeTolerance: 3e-3,
    compute: () => {
      const { even, odd } = crossSection({ ...t, gapMeters: 0.3, lower: side(0.475), upper: side(0.475) });
      return [even.impedanceOhms, odd.impedanceOhms];
    },
    rows: [{ expected: [102.75, 75.3] }],
  });
});

test('K is π/2 at modulus 0 and grows without end towards 1', () => {
  expect(ellipticK(0)).toBeCloseTo(Math.PI / 2, 15);
  expect(ellipticK(0.5)).toBeCloseTo(1.685750354812596, 14); // Abramowitz and Stegun, table 17.1, m = 0.25
  expect(ellipticK(1 - 1e-14)).toBeGreaterThan(16);
});

test('a thin strip has the width that its impedance says', () => {
  for (const width of [0.01, 0.1, 0.5611, 1, 4])
    expect(thinStriplineWidth(thinStripline(width))).toBeCloseTo(width, 11);
});

/** Boundary elements with 40 by 16 panels a strip, which give T-30's own values to 5e-5: [w/b, s/b, t/b, even, odd], in air. */
const pairs = [
  [0.35, 0.3, 0.03, 128.88, 91.5],
  [0.35, 0.6, 0.03, 118.32, 104.01],
  [0.35, 0.6, 0.1, 104.61, 90.33],
  [0.5, 0.3, 0.05, 102.76, 75.3],
  [0.5, 0.6, 0.05, 95.34, 84.87],
  [0.5, 0.3, 0.1, 95.38, 67.82],
  [0.5, 1.2, 0.1, 83.86, 82.27],
] as const;

test('thick pairs lie within the stated share of boundary elements', () => {
  for (const [w, s, t, even, odd] of pairs) {
    const pair = thickCoupledStripline(w, s, t);
    expect(Math.abs(pair.even / even - 1)).toBeLessThan(0.008);
    expect(Math.abs(pair.odd / odd - 1)).toBeLessThan(0.009);
  }
});

/** The same method: [w/b, t/b, e/b, Z]. */
const shifted = [
  [0.15, 0.02, 0.2, 144.53],
  [0.3, 0.06, 0.1, 108.85],
  [0.3, 0.1, 0.2, 91.52],
  [0.5, 0.02, 0.2, 84.73],
  [0.5, 0.06, 0.05, 88.05],
] as const;

test('strips off the middle lie within the stated share of boundary elements', () => {
  for (const [w, t, e, ohms] of shifted) {
    const side = (sign: number) => ({ heightMeters: (1 - t) / 2 + sign * e, dk: 1 });
    const { odd } = crossSection({ widthMeters: w, thicknessMeters: t, lower: side(-1), upper: side(1) });
    expect(Math.abs(odd.impedanceOhms / ohms - 1)).toBeLessThan(0.006);
  }
});
