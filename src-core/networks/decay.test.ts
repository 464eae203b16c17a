import { describe, expect, test } from 'vitest';
import type { Model } from '../model/types';
import { estimatedDecay, measuredDecay, probeFrequencies, probeOf } from './decay';
import { gridOf } from './grid';
import { equalLegs, lineOf, twoPortOf } from './testing';

const model = {
  symbolRate: 25e9,
  nyquistFrequency: 12.5e9,
  unitInterval: 40e-12,
  signalling: 'differential',
  referenceOhms: 100,
} as Model;
const grid = gridOf(25e9, 12, 0);
const line =
  (ohms: number, seconds: number, lossDb = 0) =>
  (f: number) =>
    lineOf(ohms, 2 * Math.PI * f * seconds, (lossDb / 8.6859) * Math.sqrt(f / 12.5e9));
const networkOf = (at: ReturnType<typeof line>, frequencies = grid.frequencies) =>
  equalLegs(twoPortOf(frequencies, at, 50));
const estimate = (at: ReturnType<typeof line>, delaySeconds: number) =>
  estimatedDecay(model, [probeOf(networkOf(at, probeFrequencies(12.5e9)), { delaySeconds, stubs: [] }, 12.5e9)]);
const nanoseconds = (seconds: number) => seconds * 1e9;

describe('measured on the response', () => {
  test('a matched line without loss has decayed with its pulse', () => {
    const { delaySeconds, decaySeconds } = measuredDecay(model, networkOf(line(50, 2e-9)), grid);
    expect(nanoseconds(delaySeconds)).toBeCloseTo(2, 2);
    expect(nanoseconds(decaySeconds)).toBeGreaterThan(2);
    expect(nanoseconds(decaySeconds)).toBeLessThan(2.2);
  });

  test('a mismatched one rings: two ends of Γ = 1/3, 60 dB after 3.14 round trips', () => {
    // (1/9)^3 = 1.4e-3 is still above 1/1000 of the pulse, (1/9)^4 below
    const { decaySeconds } = measuredDecay(model, networkOf(line(25, 1e-9)), grid);
    expect(nanoseconds(decaySeconds)).toBeGreaterThanOrEqual(7);
    expect(nanoseconds(decaySeconds)).toBeLessThan(7.2);
  });

  test('terminations are part of it: a matched line between mismatched ends rings as well', () => {
    const ends = {
      transmitter: { impedanceOhms: 50, capacitanceFarads: 0 },
      receiver: { impedanceOhms: 200, capacitanceFarads: 0 },
    } as Partial<Model>;
    const { decaySeconds } = measuredDecay({ ...model, ...ends }, networkOf(line(50, 1e-9)), grid);
    expect(nanoseconds(decaySeconds)).toBeGreaterThan(6.9);
  });
});

test.each([
  ['a matched line', line(50, 2e-9), 2e-9],
  ['a line of skin loss', line(50, 3e-9, 12), 3e-9],
  ['a lossy mismatched one', line(40, 3e-9, 3), 3e-9],
])('the estimate of %s is within a factor of two of the measured decay', (_, at, delaySeconds) => {
  const ratio = estimate(at, delaySeconds).decaySeconds / measuredDecay(model, networkOf(at), grid).decaySeconds;
  expect(ratio).toBeGreaterThan(0.5);
  expect(ratio).toBeLessThan(2);
});

test('probes take the delay of an element that states none from its phase', () => {
  const network = networkOf(line(50, 100e-12), probeFrequencies(12.5e9));
  expect(probeOf(network, undefined, 12.5e9).delaySeconds).toBeCloseTo(100e-12, 15);
});
