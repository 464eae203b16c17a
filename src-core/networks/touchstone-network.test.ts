import { describe, expect, test } from 'vitest';
import { toMixedMode, toSingleEnded } from './mixed-mode';
import { contextOf, farthest, lineOf, linspace, magnitude, scatteringOf, seriesOhms, twoPortOf } from './testing';
import { readTouchstone } from './touchstone';
import { placementProblem, touchstoneNetwork } from './touchstone-network';
import { mendedMap, portMapOf } from './touchstone-ports';
import type { TouchstoneData } from './touchstone-types';
import { writeTouchstone } from './touchstone-write';

const read = (text: string, name: string): TouchstoneData => readTouchstone(text, name).data!;

/** A line of loss and mismatch, 60 ohm a leg, 300 ps. */
const frequencies = linspace(0, 20e9, 401);
const leg = twoPortOf(frequencies, (f) => lineOf(60, 2 * Math.PI * f * 300e-12, 0.02 * Math.sqrt(f / 1e9)), 50);
/** Legs of unlike length, coupled by nothing: converts. */
const longer = twoPortOf(frequencies, (f) => lineOf(55, 2 * Math.PI * f * 320e-12, 0.02 * Math.sqrt(f / 1e9)), 50);

/** Two uncoupled legs as a single-ended four-port p1, n1, p2, n2. */
function legs(p: Float64Array, n: Float64Array): Float64Array {
  const out = new Float64Array(4 * p.length);
  for (let i = 0; i < p.length / 8; i++) {
    for (const [which, s] of [p, n].entries()) {
      for (let row = 0; row < 2; row++) {
        for (let column = 0; column < 2; column++) {
          const at = 32 * i + 8 * (2 * row + which) + 2 * (2 * column + which);
          out[at] = s[8 * i + 4 * row + 2 * column];
          out[at + 1] = s[8 * i + 4 * row + 2 * column + 1];
        }
      }
    }
  }
  return out;
}
const converting = { differential: leg, common: leg, full: toMixedMode(legs(leg, longer)) };
const context = contextOf(frequencies);

describe('what is written and read again is the same', () => {
  test('a pair as four single-ended ports, where the modes convert', () => {
    const data = read(writeTouchstone(converting, { ...context, comment: 'invented\nfor ± a test' }), 'pair.s4p');
    const again = touchstoneNetwork(data, { enter: [1, 3], leave: [2, 4] }, context);
    expect(farthest(again.full!, converting.full)).toBeLessThan(1e-14);
  });

  test('the modes themselves, each with its own reference', () => {
    const data = read(writeTouchstone(converting, { ...context, form: 'modes' }), 'modes.s4p');
    expect(data.referenceOhms).toEqual([100, 25, 100, 25]);
    expect(farthest(data.s, converting.full)).toBe(0);
  });

  test('a single-ended channel as a two-port in its reference', () => {
    const single = contextOf(frequencies, { referenceOhms: 50, singleEnded: true });
    const data = read(writeTouchstone({ differential: leg }, single), 'line.s2p');
    expect(farthest(touchstoneNetwork(data, { enter: [1], leave: [2] }, single).differential, leg)).toBeLessThan(1e-14);
  });
});

describe('how a file is placed', () => {
  const pair = read(writeTouchstone(converting, context), 'pair.s4p');

  test('a two-port in a pair is one leg used for both, renormalised to half of the reference', () => {
    const data = read(
      writeTouchstone({ differential: leg }, contextOf(frequencies, { referenceOhms: 50, singleEnded: true })),
      'leg.s2p',
    );
    const network = touchstoneNetwork(data, { enter: [1], leave: [2] }, contextOf(frequencies, { referenceOhms: 85 }));
    const direct = twoPortOf(
      frequencies,
      (f) => lineOf(60, 2 * Math.PI * f * 300e-12, 0.02 * Math.sqrt(f / 1e9)),
      42.5,
    );
    expect(network.common).toBe(network.differential);
    expect(farthest(network.differential, direct)).toBeLessThan(1e-12);
  });

  test('reversed, the receiver side is where the transmitter side was', () => {
    const there = touchstoneNetwork(pair, { enter: [1, 3], leave: [2, 4] }, context).full!;
    const back = touchstoneNetwork(pair, { enter: [1, 3], leave: [2, 4], reversed: true }, context).full!;
    expect(farthest(back, touchstoneNetwork(pair, { enter: [2, 4], leave: [1, 3] }, context).full!)).toBe(0);
    expect([back[32 * 200], back[32 * 200 + 20]]).toEqual([there[32 * 200 + 20], there[32 * 200]]);
  });

  test('ports left out end in the file’s reference', () => {
    const single = contextOf(frequencies, { referenceOhms: 50, singleEnded: true });
    // the positive leg alone: what the other leg does, uncoupled, is not seen
    expect(farthest(touchstoneNetwork(pair, { enter: [1], leave: [2] }, single).differential, leg)).toBeLessThan(1e-13);
  });

  test('a one-port is a branch in parallel with each leg', () => {
    // 25 ohm to ground on a leg of 50 ohm: s21 = 2Z/(2Z + R) = 0.5
    const data = read('# GHz S RI R 75\n1 -0.5 0\n40 -0.5 0\n', 'branch.s1p');
    const { differential } = touchstoneNetwork(data, { enter: [1], leave: [] }, contextOf(Float64Array.of(2e9)));
    expect([...differential]).toEqual([-0.5, 0, 0.5, 0, 0.5, 0, -0.5, 0].map((value) => expect.closeTo(value, 12)));
  });

  test('what does not fit is told in words', () => {
    expect(placementProblem(4, { enter: [1, 3], leave: [2, 5] })).toBe(
      'The file has ports 1 to 4; there is no port 5.',
    );
    expect(placementProblem(4, { enter: [1, 3], leave: [3, 4] })).toContain('one place only');
    expect(placementProblem(4, { enter: [1, 3], leave: [2] })).toContain('As many ports');
    expect(placementProblem(1, { enter: [1], leave: [] })).toBeUndefined();
    expect(() => touchstoneNetwork(pair, { enter: [9], leave: [2] }, context)).toThrow(RangeError);
  });
});

describe('which ports go through is seen in the data', () => {
  const single = toSingleEnded(converting.full);
  /** The file's ports 1 to 4 are these of p1, n1, p2, n2. */
  const numbered = (order: readonly number[]): TouchstoneData => {
    const s = new Float64Array(single.length);
    for (let at = 0; at < s.length; at += 32) {
      order.forEach((from, row) => {
        order.forEach((into, column) => {
          s[at + 8 * row + 2 * column] = single[at + 8 * from + 2 * into];
          s[at + 8 * row + 2 * column + 1] = single[at + 8 * from + 2 * into + 1];
        });
      });
    }
    return { ports: 4, referenceOhms: [50, 50, 50, 50], frequencies, s, quality: {} as never };
  };

  test.each([
    ['1-3 and 2-4', [0, 1, 2, 3], { enter: [1, 2], leave: [3, 4] }],
    ['1-2 and 3-4', [0, 2, 1, 3], { enter: [1, 3], leave: [2, 4] }],
    ['1-4 and 2-3', [0, 1, 3, 2], { enter: [1, 2], leave: [4, 3] }],
  ])('throughs %s', (_, order, map) => {
    expect(portMapOf(numbered(order))).toEqual(map);
  });

  test('a written map is mended by as little as will do', () => {
    const through = { enter: [1, 3], leave: [2, 4] };
    expect(mendedMap({ enter: [1, 2], leave: [3, 4] }, through)).toEqual(through);
    expect(mendedMap({ enter: [1, 3], leave: [4, 2] }, through)).toEqual(through);
    expect(mendedMap({ enter: [4, 2], leave: [1, 3] }, through)).toEqual({ enter: [4, 2], leave: [3, 1] });
  });

  test('ports that all see each other alike do not say', () => {
    const even = { ...numbered([0, 1, 2, 3]), s: new Float64Array(single.length).fill(0.3) };
    expect(portMapOf(even)).toBeUndefined();
  });

  test('a series capacitor that hides the lowest tenth of the band is looked past', () => {
    // 1 fF a leg: far above -20 dB only where the band ends
    const blocked = twoPortOf(
      frequencies,
      (f) => seriesOhms([0, f === 0 ? -1e9 : -1 / (2 * Math.PI * f * 100e-15)]),
      50,
    );
    const data = { ...numbered([0, 2, 1, 3]) };
    const s = legs(blocked, blocked);
    const order = [0, 2, 1, 3];
    for (let at = 0; at < s.length; at += 32) {
      order.forEach((from, row) => {
        order.forEach((into, column) => {
          data.s[at + 8 * row + 2 * column] = s[at + 8 * from + 2 * into];
          data.s[at + 8 * row + 2 * column + 1] = s[at + 8 * from + 2 * into + 1];
        });
      });
    }
    expect(portMapOf(data)).toEqual({ enter: [1, 3], leave: [2, 4] });
  });
});

describe('between and beyond the data', () => {
  const line = (f: number) => lineOf(50, 2 * Math.PI * f * 1e-9, 0.03 * Math.sqrt(f / 1e9));
  const known = linspace(10e6, 20e9, 1000);
  const data: TouchstoneData = {
    ports: 2,
    referenceOhms: [50, 50],
    frequencies: known,
    s: twoPortOf(known, line, 50),
    quality: {} as never,
  };
  const single = (list: Float64Array) => contextOf(list, { referenceOhms: 50, singleEnded: true });
  const at = (list: Float64Array) => touchstoneNetwork(data, { enter: [1], leave: [2] }, single(list)).differential;

  test('between: a nanosecond of delay at 20 MHz spacing to 1e-4', () => {
    const between = linspace(0.3e9, 19.9e9, 777);
    expect(farthest(at(between), twoPortOf(between, line, 50))).toBeLessThan(1e-4);
  });

  test('between: a notch is passed through its zero', () => {
    const stubbed = (f: number) => scatteringOf([[1, 0], [0, 0], [0, Math.tan((Math.PI / 2) * (f / 9.87654e9)) / 50], [1, 0]], 50); // biome-ignore format: a matrix
    const s = new Float64Array(8 * known.length);
    for (let i = 0; i < known.length; i++) s.set(stubbed(known[i]), 8 * i);
    const notch = touchstoneNetwork(
      { ...data, s },
      { enter: [1], leave: [2] },
      single(Float64Array.of(9.87654e9)),
    ).differential;
    expect(magnitude(notch, 4)).toBeLessThan(1e-4);
  });

  test('on the data’s own points: the data', () => {
    expect(farthest(at(known), data.s)).toBeLessThan(1e-12);
  });

  test('below: real at 0 Hz, and near what the line really does there', () => {
    const low = at(Float64Array.of(0, 5e6));
    expect([low[1], low[3], low[5], low[7]]).toEqual([0, 0, 0, 0]);
    expect(low[4]).toBeGreaterThan(0.995);
    expect(low[4]).toBeLessThanOrEqual(1);
    expect(low[12]).toBeCloseTo(twoPortOf(Float64Array.of(5e6), line, 50)[4], 3);
  });

  test('above: half of the last value a quarter above, nothing from 1.5 times on', () => {
    const last = magnitude(data.s, 8 * 999 + 4);
    const high = at(Float64Array.of(25e9, 30e9, 60e9));
    expect(magnitude(high, 4)).toBeCloseTo(last / 2, 9);
    expect([...high.subarray(8)].every((value) => Math.abs(value) < 1e-15)).toBe(true);
  });
});
