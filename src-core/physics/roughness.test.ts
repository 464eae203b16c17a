import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { skinDepth } from './copper';
import {
  cannonball,
  causalHammerstad,
  causalHuray,
  hammerstadFactor,
  hurayFactor,
  surfaceImpedance,
} from './roughness';

const HAMMERSTAD = 'Hammerstad and Jensen, IEEE MTT-S Digest 1980, 407-409';

checkValues({
  id: 'M-10',
  what: 'Hammerstad factor against rms roughness in skin depths',
  source: HAMMERSTAD,
  relativeTolerance: 1e-5,
  compute: ({ ratio }) => hammerstadFactor(ratio),
  rows: [
    { ratio: 0.25, expected: 1.05556 },
    { ratio: 0.5, expected: 1.21433 },
    { ratio: 1, expected: 1.60514 },
    { ratio: 2, expected: 1.8875 },
  ],
});

checkValues({
  id: 'M-11',
  what: 'Hammerstad factor, 0.6 µm rms on copper at 14 GHz',
  source: HAMMERSTAD,
  relativeTolerance: 1e-5,
  compute: () => hammerstadFactor(0.6e-6 / skinDepth(14e9, 5.8e7)),
  rows: [{ expected: 1.64716 }],
});

const surfaceRatio = (20 * 4 * Math.PI * 0.5e-6 ** 2) / 100e-12;

checkValues({
  id: 'M-12',
  what: 'Huray factor, 20 spheres of 0.5 µm on 100 µm²',
  source: 'Huray, The Foundations of Signal Integrity, Wiley 2010',
  relativeTolerance: 1e-5,
  compute: ({ hz }) => hurayFactor(hz === 0 ? 0 : skinDepth(hz, 5.8e7), 0.5e-6, surfaceRatio),
  rows: [
    { hz: 1e9, expected: 1.06773 },
    { hz: 10e9, expected: 1.29497 },
    { hz: 28e9, expected: 1.44841 },
    { hz: 0, expected: 1.94248 }, // skin depth 0: the limit of high frequency
  ],
});

checkValues({
  id: 'M-13',
  what: 'cannonball of Rz 5 µm: radius in µm, factors at 1, 14, 28 GHz, limit',
  source: 'Simonovich, DesignCon 2015',
  relativeTolerance: 1e-5,
  compute: () => {
    const { radiusMeters, ratio } = cannonball(5e-6);
    const at = (hz: number) => hurayFactor(skinDepth(hz, 5.8e7), radiusMeters, ratio);
    return [radiusMeters * 1e6, at(1e9), at(14e9), at(28e9), hurayFactor(0, radiusMeters, ratio)];
  },
  rows: [{ expected: [0.29893, 1.22606, 2.58878, 3.29514, 8.33038] }],
});

/** Resistance of the causal form over that of the smooth surface: Re (1+j)K. */
const resistanceFactor = ([re, im]: Float64Array) => re - im;

test("the causal forms have just Hammerstad's and Huray's resistance", () => {
  const out = new Float64Array(2);
  for (let exponent = -4; exponent <= 4; exponent += 0.25) {
    const ratio = 10 ** exponent;
    causalHammerstad(1.4 * ratio * ratio, out, 0);
    expect(resistanceFactor(out)).toBeCloseTo(hammerstadFactor(ratio), 11);
    causalHuray(1 / ratio, 1, 2.1, out, 0);
    expect(resistanceFactor(out)).toBeCloseTo(hurayFactor(1 / ratio, 1, 2.1), 11);
  }
});

/**
 * Reactance from resistance alone by Kramers and Kronig: X(ω) = (2ω/π) ∫ (R(x) − R(ω))/(x² − ω²) dx, R the excess over the smooth
 * surface less its own limit, which grows as √x and has the reactance √ω of its own.
 */
function reactanceFromResistance(resistance: (x: number) => number, omega: number): number {
  let sum = 0;
  const steps = 400_000;
  for (let i = 0; i < steps; i++) {
    const x = omega * Math.exp(((i + 0.5) / steps - 0.5) * 60);
    const dx = x * (60 / steps);
    sum += ((resistance(x) - resistance(omega)) / (x * x - omega * omega)) * dx;
  }
  return ((2 * omega) / Math.PI) * sum;
}

test('their reactance is the one that Kramers and Kronig give to that resistance', () => {
  const out = new Float64Array(2);
  for (const omega of [0.05, 0.7, 1, 3, 40]) {
    // excess resistance less that of the limit 2 (Hammerstad): falls off, so that the integral converges
    const excess = (x: number) => Math.sqrt(x / 2) * ((2 / Math.PI) * Math.atan(x) - 1);
    causalHammerstad(omega, out, 0);
    const reactance = Math.sqrt(omega / 2) * (out[0] + out[1] - 2);
    expect(reactanceFromResistance(excess, omega) / reactance).toBeCloseTo(1, 4);
  }
});

test('a rough surface: smooth at DC, never below the smooth resistance, always passive', () => {
  const frequencies = Array.from({ length: 200 }, (_, i) => i * 0.5e9);
  const conductivity = 5.8e7;
  const smooth = surfaceImpedance(frequencies, { conductivity, roughness: { kind: 'smooth' } }, 9e-6);
  for (const roughness of [
    { kind: 'rms', rmsMeters: 0.6e-6 },
    { kind: 'huray', radiusMeters: 0.5e-6, ratio: 2.1 },
  ] as const) {
    const rough = surfaceImpedance(frequencies, { conductivity, roughness }, 9e-6);
    expect(rough[0]).toBe(smooth[0]);
    for (let i = 0; i < rough.length; i += 2) expect(rough[i]).toBeGreaterThanOrEqual(smooth[i]);
  }
});
