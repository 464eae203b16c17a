import { describe, expect, test } from 'vitest';
import type { AnyElement, Stackup } from '../model/types';
import { element, material, meters, networkOf, prepared, singleEnded, smooth, stackup } from './testing';

// 45 + 95 + 17 + 300 + 17 + 700 + 17 + 95 + 45 um
const rows = [
  ['L1', 45e-6],
  [95e-6],
  ['L2*', 17e-6],
  [300e-6],
  ['L3', 17e-6],
  [700e-6],
  ['L4*', 17e-6],
  [95e-6],
  ['L5', 45e-6],
] as const;
const board = stackup(rows);
const via = (values: Record<string, unknown> = {}, more: Partial<AnyElement> = {}, on: Stackup = board) =>
  element(
    'via',
    { drill: meters(0.25e-3), antipad: meters(0.75e-3), pitch: meters(0.9e-3), ...values },
    { stackup: on, from: 'L1', to: 'L3', ...more },
  );
const facts = (...args: Parameters<typeof via>) => prepared(via(...args)).facts;

describe('stub', () => {
  test('is what stackup, layers and span leave: nothing is typed in', () => {
    const [stub, ...others] = facts().stubs;
    expect(others).toEqual([]);
    expect(stub.side).toBe('bottom');
    expect(stub.lengthMeters).toBeCloseTo(700e-6 + 17e-6 + 95e-6 + 45e-6, 12);
    expect(facts().lengthMeters).toBeCloseTo(45e-6 + 95e-6 + 17e-6 + 300e-6 + 17e-6, 12);
    expect(facts({}, { to: 'L5' }).stubs).toEqual([]);
    expect(facts({ span: ['L1', 'L3'] }).stubs).toEqual([]);
  });

  test('an inner pair of layers leaves one on each side', () => {
    const deep = stackup([['L1', 45e-6], [95e-6], ['L2', 17e-6], [700e-6], ['L3', 17e-6], [95e-6], ['L4', 45e-6]]);
    const { stubs } = facts({}, { from: 'L3', to: 'L2' }, deep);
    expect(stubs.map(({ side, lengthMeters }) => [side, Math.round(lengthMeters * 1e6)])).toEqual([
      ['top', 140],
      ['bottom', 140],
    ]);
  });

  test('a backdrill leaves its remainder, its ± bounds it, and the outer pad is gone', () => {
    const [written] = facts({ backdrill: { bottom: meters(0.3e-3, 0.1e-3) } }).stubs;
    expect(written.lengthMeters).toBe(0.3e-3);
    expect(written.lengthRangeMeters[1]).toBeCloseTo(0.4e-3, 12);
    expect(written.lowestNotchHz).toBeLessThan(written.notchHz);
    const ruled = stackup(rows, material(3.6), smooth, { backdrillToleranceMeters: 0.05e-3 });
    const [byRules] = facts({ backdrill: { bottom: meters(0.3e-3) } }, {}, ruled).stubs;
    expect(byRules.lengthRangeMeters[1]).toBeCloseTo(0.35e-3, 12);
    const [whole] = facts({ backdrill: { bottom: meters(5e-3) } }).stubs;
    expect(whole.lengthMeters).toBeCloseTo(857e-6, 12);
  });

  test('its notch is a dip of the response where the fact says', () => {
    const [{ notchHz }] = facts().stubs;
    const frequencies = Float64Array.from({ length: 801 }, (_, i) => notchHz * (0.96 + i * 1e-4));
    const { differential } = networkOf(via(), frequencies);
    const size = (i: number) => Math.hypot(differential[8 * i + 4], differential[8 * i + 5]);
    const deepest = [...frequencies.keys()].reduce((best, i) => (size(i) < size(best) ? i : best));
    expect(frequencies[deepest] / notchHz).toBeCloseTo(1, 4);
  });

  test('the pad at its end lowers the notch', () => {
    const notch = (pad: number) => facts({ pad: meters(pad) }).stubs[0].notchHz;
    expect(notch(0.5e-3)).toBeLessThan(notch(0.3e-3));
  });
});

describe('barrel', () => {
  test('a pair lies between twice the coaxial value and the pair in open dielectric', () => {
    const { impedanceOhms = 0, commonImpedanceOhms = 0 } = facts({ antipad: meters(0.75e-3) });
    expect(impedanceOhms).toBeGreaterThan(2 * 34.717); // V-04, of nearly the same sizes: 0.254 and 0.762 mm
    expect(impedanceOhms).toBeLessThan(123.509); // V-06
    expect(commonImpedanceOhms).toBeCloseTo(impedanceOhms / 4, 9);
  });

  test('drill, antipad and pitch each move it the right way', () => {
    const at = (values: Record<string, unknown>) => facts(values).impedanceOhms ?? 0;
    expect(at({ drill: meters(0.3e-3) })).toBeLessThan(at({}));
    expect(at({ antipad: meters(0.85e-3) })).toBeGreaterThan(at({}));
    expect(at({ pitch: meters(1e-3) })).toBeGreaterThan(at({}));
  });

  test('single-ended it is the coaxial form', () => {
    const one = prepared(via({ drill: meters(0.254e-3), antipad: meters(0.762e-3), pitch: undefined }), singleEnded);
    expect(one.facts.impedanceOhms).toBeCloseTo(34.717, 3); // V-04
  });

  test('barrels feel the in-plane dielectric constant', () => {
    const anisotropic = stackup(rows, material(3.6, 0, 4.4));
    const ratio = (facts({}, {}, anisotropic).delaySeconds ?? 0) / (facts().delaySeconds ?? 1);
    expect(ratio).toBeCloseTo(Math.sqrt(4.4 / 3.6), 9);
  });
});

test('from below to above is the same via with its ports exchanged', () => {
  const hz = Float64Array.of(9e9);
  const down = networkOf(via(), hz).differential;
  const up = networkOf(via({}, { from: 'L3', to: 'L1' }), hz).differential;
  for (const [one, other] of [
    [0, 6],
    [1, 7],
    [2, 4],
    [3, 5],
  ])
    expect(up[one]).toBeCloseTo(down[other], 12);
});

test('sizes that make no via are said and still give finite numbers', () => {
  for (const values of [{ antipad: meters(0.2e-3) }, { pitch: meters(0.2e-3) }, { antipad: meters(2.5e-3) }]) {
    expect(prepared(via(values)).notes.map(({ rule }) => rule)).toEqual(['model-range']);
    expect(networkOf(via(values), Float64Array.of(0, 1e9, 50e9)).differential.every(Number.isFinite)).toBe(true);
  }
  expect(prepared(via()).notes).toEqual([]);
});

test('layers that are unknown, equal or outside the span make no via', () => {
  for (const more of [{ to: 'L9' }, { to: 'L1' }, { from: undefined }]) expect(() => prepared(via({}, more))).toThrow();
  expect(() => prepared(via({ span: ['L1', 'L2'] }))).toThrow();
});
