import fc from 'fast-check';
import FFT from 'fft.js';
import { describe, expect, test } from 'vitest';
import { starTwoPort } from '../../src-core/cascade/star';
import {
  db,
  dbPerMeter,
  element,
  farads,
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
  stackup,
} from '../../src-core/elements/testing';
import type { AnyElement } from '../../src-core/model/types';
import { toSingleEnded } from '../../src-core/networks/mixed-mode';
import { largestSingularValue } from '../../src-core/networks/singular-value';
import type { Network, TwoPort } from '../../src-core/networks/types';
import type { Roughness } from '../../src-core/physics/roughness';

const board = (dk: number, df: number, roughness: Roughness) =>
  stackup(
    [
      ['L1', 45e-6],
      [95e-6],
      ['L2*', 17e-6],
      [120e-6],
      ['L3', 17e-6],
      [150e-6],
      ['L4*', 17e-6],
      [700e-6],
      ['L5', 45e-6],
    ],
    material(dk, df, dk * 1.07),
    { conductivity: 5.8e7, roughness },
  );

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const rough: fc.Arbitrary<Roughness> = fc.oneof(
  fc.constant<Roughness>({ kind: 'smooth' }),
  number(1e-7, 2e-6).map((rmsMeters): Roughness => ({ kind: 'rms', rmsMeters })),
  fc
    .tuple(number(1e-7, 1e-6), number(0.1, 5))
    .map(([radiusMeters, r]): Roughness => ({ kind: 'huray', radiusMeters, ratio: r })),
);
const anyBoard = fc
  .tuple(number(2.8, 4.6), number(0, 0.03), rough)
  .map(([dk, df, roughness]) => board(dk, df, roughness));

const cables = fc
  .tuple(number(0.01, 1.5), number(70, 130), number(4e-9, 7e-9), number(0, 30), number(0, 1), number(-5e-12, 5e-12))
  .map(([length, z, delay, loss, share, skew]) =>
    element('cable', {
      length: meters(length),
      impedance: ohms(z),
      'common-impedance': ohms(z / 3.3),
      delay: secondsPerMeter(delay),
      loss: [dbPerMeter(loss, 12.9e9)],
      'skin-share': ratio(share),
      skew: seconds(skew),
    }),
  );
const traces = fc
  .tuple(anyBoard, fc.constantFrom('L1', 'L3', 'L5'), number(0.001, 0.4), number(60e-6, 300e-6), number(80e-6, 400e-6))
  .map(([on, layer, length, width, gap]) =>
    element('trace', { length: meters(length), width: meters(width), gap: meters(gap) }, { stackup: on, layer }),
  );
const vias = fc
  .tuple(
    anyBoard,
    fc.constantFrom('L3', 'L5'),
    number(0.15e-3, 0.4e-3),
    number(0.5e-3, 1.2e-3),
    number(0.5e-3, 1.5e-3),
    fc.boolean(),
  )
  .map(([on, to, drill, antipad, pitch, reversed]) =>
    element(
      'via',
      { drill: meters(drill), antipad: meters(antipad), pitch: meters(pitch) },
      { stackup: on, from: 'L1', to, reversed },
    ),
  );
const lumped = fc.oneof(
  fc
    .tuple(number(0, 1e-9), number(0, 2), number(0, 2e-13))
    .map(([esl, esr, pad]) =>
      element('capacitor', { esl: quantity(esl, 'inductance'), esr: ohms(esr), 'pad-capacitance': farads(pad) }),
    ),
  fc
    .tuple(number(0, 5e-3), number(20, 120), number(1, 6), number(0, 0.03), number(0, 1e-13))
    .map(([length, z, dk, df, end]) =>
      element('stub', {
        length: meters(length),
        impedance: ohms(z),
        dk: ratio(dk),
        df: ratio(df),
        'end-capacitance': farads(end),
      }),
    ),
  fc
    .tuple(number(10e-12, 150e-12), number(70, 130), number(0, 3), number(0, 2e-13), number(0, 5e-12))
    .map(([delay, z, loss, c, skew]) =>
      element('connector', {
        delay: seconds(delay),
        impedance: ohms(z),
        loss: [db(loss, 12.9e9)],
        capacitance: farads(c),
        skew: seconds(skew),
      }),
    ),
);
const anyElement: fc.Arbitrary<AnyElement> = fc.oneof(cables, traces, vias, lumped);

const modes = ({ differential, common }: Network) => [differential, common as TwoPort];
const sweep = Float64Array.from([0, 1e3, 1e6, 3e7, ...grid(0.4e9, 260).subarray(1)]);

/** Largest |Sij − Sji|. */
function lopsidedness(s: ArrayLike<number>, ports: number): number {
  let worst = 0;
  for (let at = 0; at < s.length; at += 2 * ports * ports)
    for (let row = 0; row < ports; row++)
      for (let column = 0; column < row; column++) {
        const one = at + 2 * (row * ports + column);
        const other = at + 2 * (column * ports + row);
        worst = Math.max(worst, Math.hypot(s[one] - s[other], s[one + 1] - s[other + 1]));
      }
  return worst;
}

describe('any element', () => {
  test('is passive: no singular value above 1 + 1e-9', () => {
    fc.assert(
      fc.property(anyElement, (one) => {
        const network = networkOf(one, sweep);
        let largest = 0;
        for (const s of modes(network))
          for (let at = 0; at < s.length; at += 8) largest = Math.max(largest, largestSingularValue(s, 2, at));
        const full = network.full ?? new Float64Array(0);
        for (let at = 0; at < full.length; at += 32) largest = Math.max(largest, largestSingularValue(full, 4, at));
        expect(largest).toBeGreaterThan(0);
        expect(largest).toBeLessThanOrEqual(1 + 1e-9);
      }),
      { numRuns: 150, seed: 1 },
    );
  });

  test('is reciprocal to 1e-12, and finite', () => {
    fc.assert(
      fc.property(anyElement, (one) => {
        const network = networkOf(one, sweep);
        for (const s of modes(network)) {
          expect(s.every(Number.isFinite)).toBe(true);
          expect(lopsidedness(s, 2)).toBeLessThanOrEqual(1e-12);
        }
        if (network.full) expect(lopsidedness(toSingleEnded(network.full), 4)).toBeLessThanOrEqual(1e-12);
      }),
      { numRuns: 150, seed: 2 },
    );
  });

  test('the other way round it has its ports exchanged; a via follows its layers instead', () => {
    fc.assert(
      fc.property(anyElement, (one) => {
        const forwards = networkOf({ ...one, reversed: false }, sweep);
        const backwards = networkOf({ ...one, reversed: true }, sweep);
        if (one.kind === 'via') {
          expect(backwards).toEqual(forwards);
          return;
        }
        const at = 8 * 20;
        expect(backwards.differential[at]).toBe(forwards.differential[at + 6]);
        expect(backwards.differential[at + 2]).toBe(forwards.differential[at + 4]);
        if (forwards.full) expect(backwards.full?.[32 * 20 + 2]).toBe(forwards.full[32 * 20 + 22]); // d1c1 and d2c2
      }),
      { numRuns: 40, seed: 3 },
    );
  });
});

const cascade = (parts: readonly TwoPort[]) => parts.reduce((chain, part) => starTwoPort(chain, part));
const furthest = (a: TwoPort, b: TwoPort) => a.reduce((worst, value, i) => Math.max(worst, Math.abs(value - b[i])), 0);

describe('a cascade of equal parts', () => {
  test('equals one of n-fold length', () => {
    fc.assert(
      fc.property(fc.oneof(cables, traces), fc.integer({ min: 2, max: 8 }), (one, n) => {
        const values = { ...one.values, skew: undefined } as unknown as { length: ReturnType<typeof meters> };
        const of = (lengthMeters: number) =>
          ({ ...one, values: { ...values, length: meters(lengthMeters) } }) as AnyElement;
        const whole = networkOf(of(values.length.value), sweep);
        const part = networkOf(of(values.length.value / n), sweep);
        expect(furthest(cascade(new Array(n).fill(part.differential)), whole.differential)).toBeLessThan(1e-9);
        expect(furthest(cascade(new Array(n).fill(part.common)), whole.common as TwoPort)).toBeLessThan(1e-9);
      }),
      { numRuns: 60, seed: 4 },
    );
  });

  test('a lossless line cut into 30 unequal pieces equals the whole within 1e-9', () => {
    const of = (lengthMeters: number) =>
      networkOf(
        element('trace', {
          length: meters(lengthMeters),
          impedance: ohms(83),
          delay: secondsPerMeter(6.9e-9),
          loss: [dbPerMeter(0, 10e9)],
        }),
        sweep,
      ).differential;
    const pieces = Array.from({ length: 30 }, (_, i) => 1e-3 * (1 + ((i * 7) % 11) + 0.37 * i));
    const whole = of(pieces.reduce((sum, piece) => sum + piece));
    expect(furthest(cascade(pieces.map(of)), whole)).toBeLessThan(1e-9);
  });
});

/** e^{-x²/2σ²} is 80 dB down at the grid's end: σω = √(2 ln 1e4). */
const sigmaFor = (endHz: number) => Math.sqrt(2 * Math.log(1e4)) / (2 * Math.PI * endHz);

/**
 * Share of a Gaussian pulse's energy, sent through `s21`, that arrives before `beforeSeconds`. The period is 16 times what the pulse
 * needs to pass, so that its slow tail does not come round into the time before it.
 */
function earlyShare(
  s21: (i: number) => readonly [number, number],
  stepHz: number,
  points: number,
  beforeSeconds: number,
): number {
  const sigma = sigmaFor(stepHz * (points - 1));
  const samples = 4 * (points - 1);
  const fft = new FFT(samples);
  const spectrum = fft.createComplexArray();
  for (let i = 0; i < points; i++) {
    const size = Math.exp(-((2 * Math.PI * i * stepHz * sigma) ** 2) / 2) * (i === 0 ? 0.5 : 1);
    const [re, im] = s21(i);
    spectrum[2 * i] = re * size;
    spectrum[2 * i + 1] = im * size;
  }
  const wave = fft.createComplexArray();
  fft.inverseTransform(wave, spectrum);
  let early = 0;
  let all = 0;
  for (let n = 0; n < samples; n++) {
    // the last eighth of the period stands for negative time
    const t = (n < 0.875 * samples ? n : n - samples) / (samples * stepHz);
    const power = wave[2 * n] ** 2;
    all += power;
    if (t < beforeSeconds - 5 * sigma) early += power;
  }
  return early / all;
}

describe('causality: of a Gaussian pulse 80 dB down at the end of the grid, at most 1e-5 comes before its fastest part can', () => {
  const nyquist = 12.890625e9;
  const points = 2 ** 14 + 1;
  const stepHz = (4 * nyquist) / (points - 1);
  const frequencies = grid(stepHz, points);

  /** Length over the fastest phase velocity on the grid: the least of phase over ω. */
  function firstArrival(s: TwoPort): number {
    let phase = 0;
    let least = Number.POSITIVE_INFINITY;
    let last = 0;
    for (let i = 1; i < points; i++) {
      const angle = -Math.atan2(s[8 * i + 5], s[8 * i + 4]);
      phase += angle - last - 2 * Math.PI * Math.round((angle - last) / (2 * Math.PI));
      last = angle;
      if (i > 4) least = Math.min(least, phase / (2 * Math.PI * frequencies[i]));
    }
    return least;
  }

  const shareOf = (one: AnyElement) => {
    const { differential } = networkOf(one, frequencies, model({ nyquistFrequency: nyquist }));
    return earlyShare(
      (i) => [differential[8 * i + 4], differential[8 * i + 5]],
      stepHz,
      points,
      firstArrival(differential),
    );
  };
  const lossAtNyquist = (s: TwoPort) => -20 * Math.log10(Math.hypot(s[4], s[5]));

  for (const loss of [6, 24, 35]) {
    for (const [name, roughness] of [
      ['smooth', { kind: 'smooth' }],
      ["Hammerstad's", { kind: 'rms', rmsMeters: 0.6e-6 }],
      ["Huray's", { kind: 'huray', radiusMeters: 0.5e-6, ratio: 2.1 }],
    ] as const) {
      test(`computed trace of ${loss} dB, ${name} surface`, () => {
        // impedance 100 ohm by its own width, so that no reflection disturbs
        const of = (length: number) =>
          element(
            'trace',
            { length: meters(length), impedance: ohms(100) },
            { stackup: board(3.6, 0.004, roughness), layer: 'L3' },
          );
        const perMeter = lossAtNyquist(networkOf(of(1), Float64Array.of(nyquist)).differential);
        expect(shareOf(of(loss / perMeter))).toBeLessThanOrEqual(1e-5);
      });
    }
    for (const share of [0, 0.5, 1]) {
      test(`declared loss of ${loss} dB, skin share ${share}`, () => {
        const cable = element('cable', {
          length: meters(0.4),
          impedance: ohms(100),
          delay: secondsPerMeter(6.5e-9),
          loss: [dbPerMeter(loss / 0.4, nyquist)],
          'skin-share': ratio(share),
        });
        expect(shareOf(cable)).toBeLessThanOrEqual(1e-5);
      });
    }
  }

  test('the test can fail: a real roughness factor on the whole surface impedance answers too early', () => {
    // 24 dB of skin loss whose factor grows from 1 to 2 around 5 GHz, on resistance and reactance alike
    const s21 = (i: number) => {
      const f = frequencies[i];
      const nepers = (24 / 8.686) * Math.sqrt(f / nyquist) * (1 + (2 / Math.PI) * Math.atan(f / 5e9)) * 0.57;
      const angle = -nepers - 2 * Math.PI * f * 2e-9;
      return [Math.exp(-nepers) * Math.cos(angle), Math.exp(-nepers) * Math.sin(angle)] as const;
    };
    const fastest = (frequencies.length - 1) * stepHz;
    const arrival =
      2e-9 +
      ((24 / 8.686) * Math.sqrt(fastest / nyquist) * (1 + (2 / Math.PI) * Math.atan(fastest / 5e9)) * 0.57) /
        (2 * Math.PI * fastest);
    expect(earlyShare(s21, stepHz, points, arrival)).toBeGreaterThan(1e-5);
  });
});

describe('notches', () => {
  test('an ideal stub shorts its leg within 0.1 % of c/(4 L √Dk)', () => {
    for (const [length, dk] of [
      [0.9e-3, 3.6],
      [1.905e-3, 4],
      [5e-3, 2.2],
    ]) {
      const one = element('stub', { length: meters(length), impedance: ohms(50), dk: ratio(dk) });
      const expected = 299792458 / (4 * length * Math.sqrt(dk));
      expect(prepared(one).facts.stubs[0].notchHz / expected).toBeCloseTo(1, 6);
      const frequencies = Float64Array.from({ length: 401 }, (_, i) => expected * (0.99 + i * 5e-5));
      const { differential } = networkOf(one, frequencies);
      const size = (i: number) => Math.hypot(differential[8 * i + 4], differential[8 * i + 5]);
      const deepest = [...frequencies.keys()].reduce((best, i) => (size(i) < size(best) ? i : best));
      expect(Math.abs(frequencies[deepest] / expected - 1)).toBeLessThan(1e-3);
      expect(size(deepest)).toBeLessThan(1e-3);
    }
  });
});
