import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { fullOf, networkOf, toMixedMode, toSingleEnded } from './mixed-mode';
import { renormalise } from './renormalise';
import { farthest, magnitude, scatteringOf, shuntSiemens } from './testing';

/** Positions of entries in a frequency's 32 numbers, ports d1, c1, d2, c2. */
const sdd21 = 16;
const sdc21 = 18;
const scd21 = 24;
const scc21 = 26;

/** A single-ended four-port of transmissions from the transmitter side (ports 1, 2) to the receiver side (3, 4). */
function transmissions(
  entries: Readonly<Record<'s31' | 's32' | 's41' | 's42', readonly [number, number]>>,
): Float64Array {
  const s = new Float64Array(32);
  for (const [name, value] of Object.entries(entries))
    s.set(value, 8 * (Number(name[1]) - 1) + 2 * (Number(name[2]) - 1));
  return s;
}

checkValues({
  id: 'N-12',
  what: 'mixed mode by hand: Sdd21, Scc21, Scd21, Sdc21',
  source: 'Bockelman and Eisenstadt, IEEE Trans. MTT-43(7), 1995, 1530-1539',
  absoluteTolerance: 1e-12,
  compute: ({ s31, s42, cross }) => {
    const mixed = toMixedMode(transmissions({ s31: [s31, 0], s42: [s42, 0], s41: [cross, 0], s32: [cross, 0] }));
    return [mixed[sdd21], mixed[scc21], mixed[scd21], mixed[sdc21]];
  },
  rows: [{ s31: 0.9, s42: 0.8, cross: 0.1, expected: [0.75, 0.95, 0.05, 0.05] }],
});

/** Two matched lossless legs, the second later. */
function skewed(skewSeconds: number, frequencyHz: number) {
  const late = (seconds: number): [number, number] => {
    const angle = -2 * Math.PI * frequencyHz * seconds;
    return [Math.cos(angle), Math.sin(angle)];
  };
  return toMixedMode(transmissions({ s31: late(1e-9), s42: late(1e-9 + skewSeconds), s32: [0, 0], s41: [0, 0] }));
}

checkValues({
  id: 'N-13',
  what: 'pure skew of 5 ps: |Scd21|, |Sdd21| and both in dB; Sdd21 at 1/(2 dt) is zero',
  source: 'derived, exact',
  absoluteTolerance: 1e-5,
  printedWithin: 5e-5,
  compute: ({ hertz }) => {
    const mixed = skewed(5e-12, hertz);
    const both = [magnitude(mixed, scd21), magnitude(mixed, sdd21)];
    return hertz === 100e9 ? both[1] : both.flatMap((value) => [value, 20 * Math.log10(value)]);
  },
  rows: [
    { hertz: 14e9, expected: [0.218143, -13.2252, 0.975917, -0.211744] },
    { hertz: 100e9, expected: 0 },
  ],
});

checkValues({
  id: 'N-09',
  what: 'a shunt 50 ohm renormalised from 50 to 75 ohm: S11, S21',
  source: 'exact, by way of the impedance matrix',
  absoluteTolerance: 1e-6,
  compute: ({ to }) => {
    const s = renormalise(scatteringOf(shuntSiemens([1 / 50, 0]), 50), [50, 50], [to, to]);
    return [s[0], s[4]];
  },
  rows: [{ to: 75, expected: [-0.428571, 0.571429] }],
});

describe('laws', () => {
  const four = fc
    .array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 32, maxLength: 32 })
    .map((s) => Float64Array.from(s));
  const ohms = fc.array(fc.double({ min: 5, max: 300, noNaN: true }), { minLength: 4, maxLength: 4 });

  test('to mixed mode and back is where one was', () => {
    fc.assert(
      fc.property(four, (s) => farthest(toSingleEnded(toMixedMode(s)), s) < 1e-15 * 8),
      { seed: 1 },
    );
  });

  test('renormalised there and back is where one was, each port with its own reference', () => {
    const small = four.map((s) => s.map((value) => value / 5)); // singular values below 1: a passive network
    fc.assert(
      fc.property(
        small,
        ohms,
        ohms,
        (s, from, to) => farthest(renormalise(renormalise(s, from, to), to, from), s) < 1e-9,
      ),
      { seed: 2 },
    );
  });

  test('a direct match in the new reference equals S11 = (Z − R)/(Z + R) of the load', () => {
    const load = (z: number, r: number) => Float64Array.of((z - r) / (z + r), 0);
    for (const [z, from, to] of [
      [75, 50, 75],
      [10, 50, 5],
      [1e4, 100, 42.5],
    ]) {
      // biome-ignore format: a table
      expect(renormalise(load(z, from), [from], [to])[0]).toBeCloseTo(load(z, to)[0], 12);
    }
  });
});

test('modes that do not convert stay two two-ports, and give the same four-port again', () => {
  const s = transmissions({ s31: [0.9, 0.1], s42: [0.9, 0.1], s32: [0.05, 0], s41: [0.05, 0] });
  const network = networkOf(toMixedMode(s));
  expect(network.full).toBeUndefined();
  expect(farthest(toSingleEnded(fullOf(network)), s)).toBeLessThan(1e-15);
});

test('one leg longer makes them convert', () => {
  expect(networkOf(skewed(1e-12, 10e9)).full).toBeDefined();
});
