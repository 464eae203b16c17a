import { describe, expect, test } from 'vitest';
import type { Model } from '../model/types';
import { chooseGrid, gridOf, mostPoints } from './grid';

const model = (more: Partial<Model> = {}): Model =>
  ({
    symbolRate: 25e9,
    nyquistFrequency: 12.5e9,
    unitInterval: 40e-12,
    signalling: 'differential',
    referenceOhms: 100,
    ...more,
  }) as Model;
const decay = (nanoseconds: number) => ({ decaySeconds: nanoseconds * 1e-9, delaySeconds: nanoseconds * 0.25e-9 });

describe('the rule', () => {
  test('step = symbol rate / 2^k, the largest that is at most 1/(4 × decay); end = 4 × Nyquist × 2^j', () => {
    for (const nanoseconds of [3, 5.1, 5.13, 7, 11]) {
      const { stepHz, k, j, points, frequencies } = chooseGrid(model(), decay(nanoseconds));
      expect(stepHz).toBe(25e9 / 2 ** k);
      expect(stepHz).toBeLessThanOrEqual(1 / (4 * nanoseconds * 1e-9));
      expect(2 * stepHz).toBeGreaterThan(1 / (4 * nanoseconds * 1e-9));
      expect(frequencies[points - 1]).toBe(4 * 12.5e9 * 2 ** j);
      expect([frequencies[0], frequencies[1], frequencies.length]).toEqual([0, stepHz, points]);
    }
  });

  test('a short response still has symbol rate / 256', () => {
    expect(chooseGrid(model(), decay(0.1)).k).toBe(8);
  });

  test('the end follows what the pulse holds: a fast edge into a wide receiver asks for more', () => {
    const wide = { transmitter: { riseTimeSeconds: 4e-12 }, receiver: { bandwidthHz: 60e9 } } as Partial<Model>;
    expect(chooseGrid(model(), decay(3)).j).toBe(0);
    expect(chooseGrid(model(wide), decay(3)).j).toBeGreaterThan(0);
  });

  test('at most 16,384 points; what they cannot hold is said', () => {
    const coarse = [20, 40, 41, 1000, 1e6].map((nanoseconds) => {
      const grid = chooseGrid(model(), decay(nanoseconds));
      expect(grid.points).toBeLessThanOrEqual(mostPoints);
      return grid.tooCoarse ?? false;
    });
    expect(coarse).toEqual([false, false, true, true, true]); // 4,096 UI of 40 ps are 4 × 40.96 ns
  });
});

describe('while one types', () => {
  const [coarse, fine] = [gridOf(25e9, 9, 0), gridOf(25e9, 11, 0)];
  test('a grid that suffices is kept, up to two halvings finer than needed', () => {
    expect(chooseGrid(model(), decay(5), coarse)).toBe(coarse); // 20.5 ns of window
    expect(chooseGrid(model(), decay(3), fine)).toBe(fine);
    expect(chooseGrid(model(), decay(1), gridOf(25e9, 12, 0)).k).toBe(8);
  });

  test('one that does not suffice is not', () => {
    expect(chooseGrid(model(), decay(5.2), coarse).k).toBe(10);
  });

  test('nor one of another symbol rate', () => {
    expect(chooseGrid(model({ symbolRate: 26e9, nyquistFrequency: 13e9 }), decay(3), coarse)).not.toBe(coarse);
  });
});
