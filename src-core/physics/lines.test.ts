import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { coaxCapacitance, coaxInductance } from './coax';
import { DB_PER_NEPER, MU_0, SPEED_OF_LIGHT } from './constants';
import { surfaceResistance } from './copper';
import { wallFactor } from './incremental-inductance';
import { lineConstants, scatterLine } from './transmission-line';
import { twinWireInductance } from './twin-wire';
import { barrelPerMeter, johnsonCapacitance } from './via-barrel';

/** Impedance, ohm, of the line that these make. */
const coaxImpedance = (inner: number, outer: number, dk: number) =>
  Math.sqrt(coaxInductance(inner, outer) / coaxCapacitance(inner, outer, dk));
/** Differential impedance, ohm: a wave in one dielectric ties capacitance to inductance. */
const twinWireImpedance = (spacing: number, diameter: number, dk: number) =>
  (2 * twinWireInductance(spacing, diameter) * SPEED_OF_LIGHT) / Math.sqrt(dk);

checkValues({
  id: 'T-09',
  what: 'coax 0.91/3.02 mm, ε 2.08, Df 0.0004 at 1 GHz: R, L, C, G, Z0, conductor, dielectric, total dB/m',
  source: 'dimensions of a problem in Pozar, chapter 2; formulas exact',
  relativeTolerance: 1e-4,
  compute: () => {
    const [a, b, er, df, hz] = [0.91e-3, 3.02e-3, 2.08, 4e-4, 1e9];
    const r = (surfaceResistance(hz, 5.813e7) / Math.PI) * (1 / a + 1 / b);
    const c = coaxCapacitance(a, b, er);
    const g = 2 * Math.PI * hz * c * df;
    const z = coaxImpedance(a, b, er);
    const losses = [r / (2 * z), (g * z) / 2].map((nepers) => nepers * DB_PER_NEPER);
    return [r, coaxInductance(a, b) * 1e9, c * 1e12, g * 1e3, z, ...losses, losses[0] + losses[1]];
  },
  rows: [{ expected: [3.7512, 239.91, 96.464, 0.24244, 49.871, 0.32667, 0.05251, 0.37918] }],
});

checkValues({
  id: 'T-10',
  what: 'impedance of the coax of least conductor loss in air, b/a 3.59112',
  source: 'any textbook, exact',
  relativeTolerance: 1e-5,
  compute: () => coaxImpedance(1, 3.59112, 1),
  rows: [{ expected: 76.655 }],
});

checkValues({
  id: 'T-11',
  what: 'impedance of the coax of most power, b/a √e',
  source: 'any textbook, exact',
  relativeTolerance: 1e-5,
  printedWithin: 5e-4,
  compute: () => coaxImpedance(1, Math.sqrt(Math.E), 1),
  rows: [{ expected: 29.979 }],
});

checkValues({
  id: 'T-12',
  what: 'two round wires, centre spacing over diameter',
  source: '(η0/(π√ε)) acosh(s/d), exact',
  relativeTolerance: 1e-5,
  compute: ({ spacing, er }) => twinWireImpedance(spacing, 1, er),
  rows: [
    { spacing: 2, er: 1, expected: 157.926 },
    { spacing: 3, er: 1, expected: 211.383 },
    { spacing: 5, er: 1, expected: 274.901 },
    { spacing: 3, er: 3.6, expected: 111.409 },
  ],
});

checkValues({
  id: 'T-13',
  what: 'round wire over a plane, height of the centre over radius',
  source: '(η0/(2π)) acosh(h/a), exact',
  relativeTolerance: 1e-5,
  compute: ({ height }) => twinWireImpedance(2 * height, 2, 1) / 2, // its image below the plane is the second wire
  rows: [
    { height: 2, expected: 78.963 },
    { height: 5, expected: 137.451 },
    { height: 10, expected: 179.469 },
  ],
});

checkValues({
  id: 'T-22',
  what: "Wheeler's rule on a coax and on two plates 1 mm wide, ohm/m",
  source: 'Wheeler, Proc. IRE 30, 1942, exact',
  relativeTolerance: 1e-4,
  compute: () => {
    const rs = surfaceResistance(1e9, 5.813e7);
    const coax = wallFactor((n) => coaxInductance(0.91e-3 - 2 * n, 3.02e-3 + 2 * n), 1e-8);
    const plates = wallFactor((n) => (MU_0 * (0.1e-3 + 2 * n)) / 1e-3, 1e-8);
    return [rs * coax, rs * plates];
  },
  rows: [{ expected: [3.7512, 16.482] }],
});

checkValues({
  id: 'T-26',
  what: 'R 20, L 350 nH, G 0.02, C 140 pF per metre at 1 GHz: α, β, Re Zc, Im Zc',
  source: '√((R+jωL)(G+jωC)), exact',
  relativeTolerance: 1e-5,
  printedWithin: 5e-6,
  compute: () => lineConstants(20, 350e-9, 0.02, 140e-12, 2 * Math.PI * 1e9),
  rows: [{ expected: [0.699984, 43.9833, 49.9934, 0.34092] }],
});

checkValues({
  id: 'T-05',
  what: 'that stripline from its conductor loss of 0.1219 Np/m, 50 ohm, ε 2.2, Df 0.001 at 10 GHz: dielectric loss in Np/m, total dB/m, wavelength in cm, dB in one',
  source: 'Pozar, Microwave Engineering, Example 3.5',
  relativeTolerance: 1e-3,
  printedWithin: 5e-5,
  compute: () => {
    const omega = 2 * Math.PI * 10e9;
    const c = Math.sqrt(2.2) / (SPEED_OF_LIGHT * 50);
    const of = (r: number, df: number) => lineConstants(r, c * 50 ** 2, omega * c * df, c, omega);
    const [alpha, beta] = of(2 * 50 * 0.1219, 0.001);
    const meters = (2 * Math.PI) / beta;
    return [of(0, 0.001)[0], DB_PER_NEPER * alpha, 100 * meters, DB_PER_NEPER * alpha * meters];
  },
  rows: [{ expected: [0.1554, 2.409, 2.021, 0.0487] }],
});

const scattered = (ohms: number, radians: number, nepers = 0) => {
  const out = new Float64Array(8);
  scatterLine(nepers, radians, ohms, 0, 50, out, 0);
  return out;
};

checkValues({
  id: 'N-03',
  what: '75 ohm line in 50 ohm: quarter wave S11, Im S21, return and insertion loss; half wave |S11|, S21',
  source: '(Z² − Z0²)/(Z² + Z0²), exact',
  absoluteTolerance: 1e-6,
  printedWithin: 5e-5,
  compute: () => {
    const quarter = scattered(75, Math.PI / 2);
    const half = scattered(75, Math.PI);
    const db = (size: number) => -20 * Math.log10(Math.abs(size));
    return [quarter[0], quarter[3], db(quarter[0]), db(quarter[3]), Math.hypot(half[0], half[1]), half[2]];
  },
  rows: [{ expected: [0.384615, -0.923077, 8.2995, 0.69524, 0, -1] }],
});

checkValues({
  id: 'N-04',
  what: 'the same line at 45°: S11, S21',
  source: 'exact',
  absoluteTolerance: 1e-6,
  compute: () => [...scattered(75, Math.PI / 4)].filter((_, i) => i < 2 || i === 4 || i === 5),
  rows: [{ expected: [0.207668, 0.191693, 0.650629, -0.704848] }],
});

test('a line of 3,000 dB neither overflows nor loses its reflection', () => {
  const out = scattered(75, 1e4, 3000 / DB_PER_NEPER);
  expect(out[0]).toBeCloseTo(0.2, 12);
  expect(out[2]).toBeLessThan(1e-140);
  expect(out.every(Number.isFinite)).toBe(true);
});

checkValues({
  id: 'V-01',
  what: 'via capacitance ε 4.7, T 0.063, D1 0.028, D2 0.050 in: pF; added rise 2.2 C Z0/2 in ps',
  source: 'Johnson and Graham, High-Speed Digital Design, 1993, chapter 7',
  relativeTolerance: 1e-4,
  compute: () => {
    const c = johnsonCapacitance(4.7, 0.063 * 0.0254, 0.028 * 0.0254, 0.05 * 0.0254);
    return [c * 1e12, 2.2 * c * 25 * 1e12];
  },
  rows: [{ expected: [0.53136, 29.225] }],
});

checkValues({
  id: 'V-03',
  what: 'via capacitance ε 4.4, T 0.050, D1 0.020, D2 0.032 in: pF',
  source: 'Johnson and Graham, 1993',
  relativeTolerance: 1e-4,
  compute: () => johnsonCapacitance(4.4, 0.05 * 0.0254, 0.02 * 0.0254, 0.032 * 0.0254) * 1e12,
  rows: [{ expected: 0.517 }],
});

const single = barrelPerMeter(0.254e-3, 0.762e-3);
const ofSingle = (length: number) => {
  const c = single.capacitance * 3.6;
  const l = single.inductance;
  return [c * length * 1e12, l * length * 1e9, Math.sqrt(l / c), Math.sqrt(l * c) * length * 1e12];
};

checkValues({
  id: 'V-04',
  what: 'single via as a coax, 10 and 30 mil, ε 3.6: C in pF/m, L in nH/m, Z0',
  source: 'exact for a coax',
  relativeTolerance: 1e-5,
  printedWithin: 5e-3,
  compute: () => ofSingle(1).slice(0, 3),
  rows: [{ expected: [182.3, 219.72, 34.717] }],
});

checkValues({
  id: 'V-05',
  what: 'the same, 1.6 mm long: C in pF, L in nH, delay in ps',
  source: 'exact',
  relativeTolerance: 1e-5,
  printedWithin: 5e-6,
  compute: () => {
    const [c, l, , delay] = ofSingle(1.6e-3);
    return [c, l, delay];
  },
  rows: [{ expected: [0.29168, 0.35156, 10.1263] }],
});

checkValues({
  id: 'V-06',
  what: 'via pair as two wires, pitch 0.9, drill 0.25 mm, ε 3.6',
  source: '(η0/(π√ε)) acosh(s/d), exact',
  relativeTolerance: 1e-5,
  compute: () => twinWireImpedance(0.9, 0.25, 3.6),
  rows: [{ expected: 123.509 }],
});

test('a pair of barrels lies between twice the coax and the pair in open dielectric, and moves the right way', () => {
  const pairOhms = (hole: number, antipad: number, pitch: number) => {
    const { inductance, capacitance } = barrelPerMeter(hole, antipad, pitch);
    return 2 * Math.sqrt(inductance / (capacitance * 3.6));
  };
  for (const hole of [0.15, 0.2, 0.25, 0.4])
    for (const pitch of [0.6, 0.8, 0.9, 1.3])
      for (const antipad of [0.5, 0.7, 0.75, 1, 1.15]) {
        if (antipad >= 2 * pitch || antipad <= hole || pitch <= hole) continue;
        const ohms = pairOhms(hole, antipad, pitch);
        const coaxial = 2 * coaxImpedance(hole, antipad, 3.6);
        const open = twinWireImpedance(pitch, hole, 3.6);
        if (coaxial >= open) continue; // acosh(s/d) lies below ln(2s/d): the bounds cross just before antipad = 2 pitch
        expect(ohms).toBeGreaterThan(coaxial);
        expect(ohms).toBeLessThan(open);
        expect(pairOhms(hole * 1.02, antipad, pitch)).toBeLessThan(ohms);
        expect(pairOhms(hole, antipad * 1.02, pitch)).toBeGreaterThan(ohms);
        expect(pairOhms(hole, antipad, pitch * 1.02)).toBeGreaterThan(ohms);
      }
});
