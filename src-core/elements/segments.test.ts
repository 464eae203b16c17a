import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import type { AnyElement } from '../model/types';
import { fitLoss } from './declared-line';
import {
  dbPerMeter,
  element,
  grid,
  material,
  meters,
  model,
  networkOf,
  ohms,
  prepared,
  quantity,
  ratio,
  seconds,
  secondsPerMeter,
  singleEnded,
  stackup,
} from './testing';

const DB = 20 / Math.LN10;
const s21 = (s: Float64Array, i = 0) => ({
  db: -DB * Math.log(Math.hypot(s[8 * i + 4], s[8 * i + 5])),
  phase: -Math.atan2(s[8 * i + 5], s[8 * i + 4]),
});
const cable = (more: Record<string, unknown> = {}) =>
  element('cable', { length: meters(0.5), impedance: ohms(100), delay: secondsPerMeter(4.5e-9), ...more });

describe('declared loss', () => {
  test('a point is met, and so are both of a list', () => {
    const one = networkOf(cable({ loss: [dbPerMeter(5.1, 12.9e9)] }), Float64Array.of(12.9e9));
    expect(s21(one.differential).db).toBeCloseTo(2.55, 9);
    const list = cable({ loss: [dbPerMeter(1.6, 1.5e9), dbPerMeter(5.1, 12.9e9)] });
    const two = networkOf(list, Float64Array.of(1.5e9, 12.9e9)).differential;
    expect(s21(two, 0).db).toBeCloseTo(0.8, 3);
    expect(s21(two, 1).db).toBeCloseTo(2.55, 9);
  });

  test('the skin share follows √f, the rest f', () => {
    const at = (share: number) => {
      const of = cable({ loss: [dbPerMeter(5, 10e9)], 'skin-share': ratio(share) });
      return s21(networkOf(of, Float64Array.of(2.5e9)).differential).db;
    };
    expect(at(1)).toBeCloseTo(2.5 / 2, 9);
    expect(at(0)).toBeCloseTo(2.5 / 4, 3);
  });

  test('a list that no a, b ≥ 0 fits takes the better of both alone', () => {
    const steep = fitLoss(
      [
        { db: 1, hz: 1e9 },
        { db: 30, hz: 4e9 },
      ],
      0.5,
    );
    expect(steep.skinNepers).toBe(0);
    expect(steep.linearNepers).toBeGreaterThan(0);
    const flat = fitLoss(
      [
        { db: 3, hz: 1e9 },
        { db: 3.1, hz: 4e9 },
      ],
      0.5,
    );
    expect(flat.linearNepers).toBe(0);
    expect(flat.skinNepers).toBeGreaterThan(0);
  });

  test('the delay is that at the loss point', () => {
    const of = cable({ length: meters(0.01), loss: [dbPerMeter(40, 10e9)] });
    const { phase } = s21(networkOf(of, Float64Array.of(10e9)).differential);
    expect(phase).toBeCloseTo(2 * Math.PI * 10e9 * 45e-12, 9);
  });

  test('no loss: a line of its impedance, exactly', () => {
    const { differential } = networkOf(cable({ impedance: ohms(85) }), Float64Array.of(0, 55.5555e6));
    expect([...differential.subarray(0, 8)].map((x) => x + 0)).toEqual([0, 0, 1, 0, 1, 0, 0, 0]);
    // 4.5 ns/m × 0.5 m at 1/(4 × 2.25 ns) / 2: an eighth of a wave
    expect(Math.hypot(differential[8], differential[9])).toBeLessThan(
      Math.abs((85 ** 2 - 100 ** 2) / (85 ** 2 + 100 ** 2)),
    );
  });
});

checkValues({
  id: 'N-11',
  what: '85 ohm section in a 100 ohm system at its quarter wave: reflection',
  source: '(85² − 100²)/(85² + 100²), exact',
  relativeTolerance: 1e-5,
  compute: () => networkOf(cable({ impedance: ohms(85) }), Float64Array.of(1 / (4 * 2.25e-9))).differential[0],
  rows: [{ expected: -0.161103 }],
});

checkValues({
  id: 'N-13',
  what: 'skew of 5 ps between matched lossless legs at 14 GHz: |Scd21|, |Sdd21|; |Sdd21| at 100 GHz',
  source: '(e^{−jωt1} ∓ e^{−jωt2})/2, exact',
  absoluteTolerance: 1e-5,
  compute: () => {
    const { full, differential } = networkOf(cable({ skew: seconds(5e-12) }), Float64Array.of(14e9, 100e9));
    const s = full as Float64Array;
    return [Math.hypot(s[24], s[25]), Math.hypot(s[16], s[17]), Math.hypot(differential[12], differential[13])];
  },
  rows: [{ expected: [0.218143, 0.975917, 0] }],
});

test('a skew written as a length counts at the line’s own delay; the other leg has the other sign', () => {
  expect(prepared(cable({ skew: meters(1e-3) })).facts.skewSeconds).toBeCloseTo(4.5e-12, 18);
  const at = (skew: number) => networkOf(cable({ skew: seconds(skew) }), Float64Array.of(5e9)).full as Float64Array;
  expect(at(-2e-12)[24]).toBeCloseTo(-at(2e-12)[24], 12);
});

const board = stackup(
  [
    ['L1', 45e-6],
    [95e-6],
    ['L2*', 17e-6],
    [120e-6],
    ['L3', 17e-6],
    [150e-6],
    ['L4*', 17e-6],
    [200e-6],
    ['L5', 17e-6],
    [300e-6],
    ['L6', 45e-6],
  ],
  material(3.6, 0.004),
);
const trace = (layer: string, values: Record<string, unknown>, more: Partial<AnyElement> = {}) =>
  element('trace', { length: meters(0.1), ...values }, { stackup: board, layer, ...more });

describe('trace geometry', () => {
  test('an inner layer between planes is a stripline, an outer one a microstrip that says its mask is left out', () => {
    const written = { width: meters(110e-6), gap: meters(140e-6) };
    expect(prepared(trace('L3', written)).facts.construction).toBe('stripline');
    expect(prepared(trace('L1', written)).facts.construction).toBe('microstrip, solder mask neglected');
    expect(prepared(trace('L5', written)).facts.construction).toBe('buried microstrip');
  });

  test('impedance alone finds the width that gives it, with a gap of 1.5 widths', () => {
    for (const layer of ['L1', 'L3']) {
      const { facts } = prepared(trace(layer, { impedance: ohms(92, 8) }));
      const { widthMeters = 0, gapMeters = 0 } = facts;
      expect(gapMeters / widthMeters).toBeCloseTo(1.5, 9);
      expect(facts.impedanceRangeOhms).toEqual([84, 100]);
      const back = prepared(trace(layer, { width: meters(widthMeters), gap: meters(gapMeters) }));
      expect(back.facts.impedanceOhms).toBeCloseTo(92, 6);
    }
  });

  test('where no width gives the impedance, it holds with the nearest width’s copper, and that is said', () => {
    const one = trace('L3', { impedance: ohms(200) });
    const { facts, notes } = prepared(one);
    expect(facts.impedanceOhms).toBe(200);
    expect(notes[0].message).toMatch(
      /^No width on L3 with a gap of 1.5 widths gives 200 ohm: 1\d\d ohm is the nearest/,
    );
    const { differential } = networkOf(one, Float64Array.of(10e9), model({ referenceOhms: 200 }));
    expect(s21(differential).db).toBeGreaterThan(1);
    expect(Math.hypot(differential[0], differential[1])).toBeLessThan(0.02);
  });

  test('a written common impedance holds', () => {
    const one = trace('L3', { width: meters(110e-6), gap: meters(140e-6), 'common-impedance': ohms(27) });
    expect(prepared(one).facts.commonImpedanceOhms).toBe(27);
  });

  test('a target is judged by its own ±', () => {
    const written = { width: meters(110e-6), gap: meters(140e-6) };
    const actual = prepared(trace('L3', written)).facts.impedanceOhms ?? 0;
    const notes = (target: number, tolerance: number) =>
      prepared(trace('L3', { ...written, impedance: ohms(target, tolerance) })).notes.map(({ rule }) => rule);
    expect(notes(actual - 4, 4.01)).toEqual([]);
    expect(notes(actual - 4, 3.99)).toEqual(['impedance-target']);
    expect(notes(actual / 1.049, 0)).toEqual([]);
    expect(notes(actual / 1.051, 0)).toEqual(['impedance-target']);
  });

  test('the ends of the tolerances of width and gap bound the impedance', () => {
    const { impedanceRangeOhms = [0, 0], impedanceOhms = 0 } = prepared(
      trace('L3', { width: meters(110e-6, 10e-6), gap: meters(140e-6, 10e-6) }),
    ).facts;
    expect(impedanceRangeOhms[0]).toBeLessThan(impedanceOhms);
    expect(impedanceRangeOhms[1]).toBeGreaterThan(impedanceOhms);
  });

  test('at DC a leg has the resistance of its copper, 1/(σ w t), warmer copper more', () => {
    const of = trace('L3', { width: meters(110e-6), gap: meters(140e-6) });
    const resistance = (celsius: number) => {
      const s = networkOf(of, Float64Array.of(0), model({ temperatureCelsius: celsius })).differential[4];
      return 200 / s - 200; // of both legs, between ports of 100 ohm
    };
    expect(resistance(20)).toBeCloseTo((2 * 0.1) / (5.8e7 * 110e-6 * 17e-6), 9);
    expect(resistance(85) / resistance(20)).toBeCloseTo(1 + 0.00393 * 65, 9);
  });

  test('skin effect takes over: loss grows by √2 an octave in smooth copper without laminate loss', () => {
    const on = stackup([['L2*', 17e-6], [120e-6], ['L3', 17e-6], [150e-6], ['L4*', 17e-6]], material(3.6));
    const of = element(
      'trace',
      { length: meters(0.1), width: meters(110e-6), gap: meters(140e-6) },
      { stackup: on, layer: 'L3' },
    );
    const { facts } = prepared(of);
    const { differential } = networkOf(of, Float64Array.of(10e9, 20e9), model({ referenceOhms: facts.impedanceOhms }));
    // A little more than √2: the internal inductance falls, and the line's impedance with it.
    const growth = s21(differential, 1).db / s21(differential, 0).db / Math.SQRT2;
    expect(growth).toBeGreaterThan(1);
    expect(growth).toBeLessThan(1.002);
  });

  test('declared loss takes the layer’s delay where none is written', () => {
    const { facts } = prepared(trace('L3', { impedance: ohms(100), loss: [dbPerMeter(30, 12.9e9)] }));
    // A little more than the layer's: the loss comes with its own phase.
    const share = facts.delaySeconds! / ((0.1 * Math.sqrt(3.6)) / 299792458);
    expect(share).toBeGreaterThan(1);
    expect(share).toBeLessThan(1.005);
  });

  test('without stackup it is what it declares', () => {
    const bare = element('trace', {
      length: meters(0.1),
      impedance: ohms(100),
      delay: secondsPerMeter(7e-9),
      loss: [dbPerMeter(30, 12.9e9)],
    });
    expect(prepared(bare).facts.construction).toBe('declared');
  });

  test('dk and df without copper: the laminate’s loss alone', () => {
    const of = element('package', {
      length: meters(0.1),
      impedance: ohms(100),
      dk: ratio(4, 14e9),
      df: ratio(0.02, 14e9),
    });
    const { differential } = networkOf(of, Float64Array.of(14e9));
    expect(s21(differential).db / (1.2947 * (100 / 25.4))).toBeCloseTo(1, 3); // check value M-19
  });

  test('no plane anywhere, and formulas out of range, are said', () => {
    const loose = stackup([['L1', 17e-6], [200e-6], ['L2', 17e-6]]);
    const one = element(
      'trace',
      { length: meters(0.1), width: meters(100e-6), gap: meters(100e-6) },
      { stackup: loose, layer: 'L1' },
    );
    expect(prepared(one).notes[0].message).toContain('No plane');
    const thin = prepared(trace('L1', { width: meters(8e-6), gap: meters(300e-6) }));
    expect(thin.notes.map(({ rule }) => rule)).toEqual(['model-range']);
  });

  test('odd and even differ, single-ended is one strip', () => {
    const pair = networkOf(trace('L1', { width: meters(110e-6), gap: meters(140e-6) }), grid(5e9, 3));
    expect(pair.common).not.toEqual(pair.differential);
    const alone = networkOf(trace('L1', { width: meters(110e-6) }), grid(5e9, 3), singleEnded);
    expect(alone.common).toBeUndefined();
    expect(prepared(trace('L1', { width: meters(110e-6) }), singleEnded).facts.commonImpedanceOhms).toBeUndefined();
  });
});

test('what is missing makes no element, and never throws', () => {
  for (const kind of ['package', 'trace', 'cable', 'via', 'connector', 'stub', 'block'] as const)
    expect(() => prepared(element(kind, {}))).toThrow('cannot be prepared');
  expect(() => prepared(trace('L9', { width: quantity(1e-4, 'length') }))).toThrow('cannot be prepared');
});
