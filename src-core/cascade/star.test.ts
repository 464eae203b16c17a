import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { toMixedMode } from '../networks/mixed-mode';
import { largestSingularValue } from '../networks/singular-value';
import {
  type Abcd,
  cascadeAbcd,
  farthest,
  lineOf,
  linspace,
  magnitude,
  scatteringOf,
  seriesOhms,
  shuntSiemens,
  twoPortOf,
} from '../networks/testing';
import type { TwoPort } from '../networks/types';
import { chain } from './product';
import { starTwoPort } from './star';
import { starFourPort } from './star-four-port';

checkValues({
  id: 'N-08',
  what: 'two 75 ohm eighth-wave lines chained through S: S11, |S21| of N-03',
  source: 'exact: S11 = (Z² − R²)/(Z² + R²)',
  absoluteTolerance: 1e-6,
  compute: ({ ohms }) => {
    const eighth = scatteringOf(lineOf(ohms, Math.PI / 4), 50);
    const both = starTwoPort(eighth, eighth);
    expect(farthest(both, scatteringOf(lineOf(ohms, Math.PI / 2), 50))).toBeLessThan(1e-9);
    return [both[0], magnitude(both, 4)];
  },
  rows: [{ ohms: 75, expected: [0.384615, 0.923077] }],
});

checkValues({
  id: 'N-19',
  what: 'singular values of a series 25 ohm chained with a 60 ohm line of 1 rad: the largest',
  source: 'exact, singular value decomposition',
  absoluteTolerance: 1e-9,
  compute: ({ ohms }) =>
    largestSingularValue(starTwoPort(scatteringOf(seriesOhms([ohms, 0]), 50), scatteringOf(lineOf(60, 1), 50)), 2),
  rows: [{ ohms: 25, expected: 1 }],
});

const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** A passive two-port: loss, line and mismatch in any order. */
const piece: fc.Arbitrary<Abcd> = fc.oneof(
  fc.tuple(real(10, 300), real(-3, 3), real(0, 2)).map(([ohms, radians, nepers]) => lineOf(ohms, radians, nepers)),
  fc.tuple(real(0, 200), real(-200, 200)).map(([r, x]) => seriesOhms([r, x])),
  fc.tuple(real(0, 0.1), real(-0.1, 0.1)).map(([g, b]) => shuntSiemens([g, b])),
);
const twoPort = piece.map((abcd) => scatteringOf(abcd, 50));
/** A passive four-port in mixed mode: any matrix of singular values below 1, made symmetric as reciprocal parts are. */
const fourPort = fc.array(real(-0.12, 0.12), { minLength: 32, maxLength: 32 }).map((numbers) => {
  const s = new Float64Array(32);
  for (let row = 0; row < 4; row++) {
    for (let column = 0; column < 4; column++) {
      for (let part = 0; part < 2; part++)
        s[8 * row + 2 * column + part] = numbers[8 * Math.min(row, column) + 2 * Math.max(row, column) + part];
    }
  }
  return toMixedMode(s);
});

describe('a chain of two-ports', () => {
  test('equals that of transfer matrices', () => {
    fc.assert(
      fc.property(piece, piece, (a, b) => {
        const direct = scatteringOf(cascadeAbcd(a, b), 50);
        expect(farthest(starTwoPort(scatteringOf(a, 50), scatteringOf(b, 50)), direct)).toBeLessThan(1e-9);
      }),
      { seed: 3 },
    );
  });

  test('does not care where one starts', () => {
    fc.assert(
      fc.property(twoPort, twoPort, twoPort, (a, b, c) => {
        expect(farthest(starTwoPort(starTwoPort(a, b), c), starTwoPort(a, starTwoPort(b, c)))).toBeLessThan(1e-12);
      }),
      { seed: 4 },
    );
  });

  test('of passive, reciprocal parts is passive and reciprocal', () => {
    fc.assert(
      fc.property(fc.array(twoPort, { minLength: 2, maxLength: 12 }), (parts) => {
        const whole = parts.reduce((a, b) => starTwoPort(a, b));
        expect(largestSingularValue(whole, 2)).toBeLessThanOrEqual(1 + 1e-9);
        expect(Math.hypot(whole[2] - whole[4], whole[3] - whole[5])).toBeLessThanOrEqual(1e-12);
      }),
      { seed: 5 },
    );
  });

  test('a lossless line in 30 unequal pieces equals the whole', () => {
    const frequencies = linspace(0, 50e9, 501);
    const seconds = Array.from({ length: 30 }, (_, i) => (1 + ((7 * i) % 11)) * 3e-12);
    const whole = seconds.reduce((a, b) => a + b);
    const piecesOf = (list: readonly number[]): TwoPort =>
      list
        .map((s) => twoPortOf(frequencies, (f) => lineOf(73, 2 * Math.PI * f * s), 50))
        .reduce((a, b) => starTwoPort(a, b));
    expect(farthest(piecesOf(seconds), piecesOf([whole]))).toBeLessThan(1e-9);
  });

  test('stays finite at a resonance without any loss', () => {
    // total reflections face each other
    const wall = Float64Array.of(1, 0, 0, 0, 0, 0, 1, 0);
    expect([...starTwoPort(wall, wall)].every(Number.isFinite)).toBe(true);
  });
});

describe('a chain of four-ports', () => {
  test('does not care where one starts', () => {
    fc.assert(
      fc.property(fourPort, fourPort, fourPort, (a, b, c) => {
        expect(farthest(starFourPort(starFourPort(a, b), c), starFourPort(a, starFourPort(b, c)))).toBeLessThan(1e-12);
      }),
      { seed: 6 },
    );
  });

  test('of passive, reciprocal parts is passive and reciprocal', () => {
    fc.assert(
      fc.property(fourPort, fourPort, (a, b) => {
        const whole = starFourPort(a, b);
        expect(largestSingularValue(whole, 4)).toBeLessThanOrEqual(1 + 1e-9);
        for (let row = 0; row < 4; row++) {
          for (let column = 0; column < row; column++) {
            const [i, j] = [8 * row + 2 * column, 8 * column + 2 * row];
            expect(Math.hypot(whole[i] - whole[j], whole[i + 1] - whole[j + 1])).toBeLessThanOrEqual(1e-12);
          }
        }
      }),
      { seed: 7 },
    );
  });
});

test('two chains of modes equal the one four-port; two elements that convert back may end in none', () => {
  const frequencies = linspace(0, 10e9, 11);
  const mode = (ohms: number, reference: number) =>
    twoPortOf(frequencies, (f) => lineOf(ohms, f * 1e-9, 0.1), reference);
  const [a, b] = [90, 120].map((ohms) => ({ differential: mode(ohms, 100), common: mode(ohms / 3, 25) }));
  const separate = chain(a, b);
  expect(separate.full).toBeUndefined();
  const quiet = new Float64Array(32 * frequencies.length);
  const converting = { ...a, full: quiet };
  for (let i = 0; i < frequencies.length; i++) {
    for (const [from, at] of [
      [a.differential, 0],
      [a.common, 10],
    ] as const) {
      // biome-ignore format: a table
      for (const [n, to] of [0, 4, 16, 20].entries()) {
        quiet[32 * i + at + to] = from[8 * i + 2 * n];
        quiet[32 * i + at + to + 1] = from[8 * i + 2 * n + 1];
      }
    }
  }
  const joint = chain(converting, b);
  expect(joint.full).toBeUndefined();
  expect(farthest(joint.differential, separate.differential)).toBeLessThan(1e-14);
  expect(farthest(joint.common!, separate.common!)).toBeLessThan(1e-14);
});
