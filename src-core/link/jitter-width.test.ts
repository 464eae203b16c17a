import { describe, expect, test } from 'vitest';
import { computeTime } from '../time/compute-time';
import { delayOf, gridFor, matchedPath, modelOf } from '../time/testing';
import { computeLink } from './compute-link';

const symbolRate = 10e9;
const grid = gridFor(symbolRate, 8, 1);

/** A line that only delays, DJ 20 ps and RJ 2 ps of a UI of 100 ps: jitter alone closes the eye, at edges far steeper than the noise is wide. */
function linkOf(bandwidthHz: number, noiseVolts: number) {
  const model = modelOf({
    symbolRate,
    transmitter: { riseTimeSeconds: 20e-12, randomJitterSeconds: 2e-12, deterministicJitterSeconds: 20e-12 },
    receiver: { bandwidthHz, noiseVolts },
  });
  return computeLink(model, computeTime(model, { total: matchedPath(grid, delayOf(1e-9)) }, { grid }));
}

describe('jitter alone', () => {
  // D-12 keeps the density of edges, half: 1e-12 is 23.677 ps from the mean crossing
  test.each([
    [7.5e9, 0],
    [7.5e9, 1e-3],
    [7.5e9, 5e-3],
    [12e9, 0],
    [12e9, 1e-3],
    [12e9, 5e-3],
  ])('D-12: both edges of %d Hz and %d V of noise leave 52.646 ps to 0.5 ps', (bandwidthHz, noiseVolts) => {
    expect(Math.abs(linkOf(bandwidthHz, noiseVolts).eyeWidthUi - 0.52646)).toBeLessThan(0.005);
  });

  // all 4,096 patterns of 12 neighbours at 256 samples a UI, in NumPy
  test.each([
    [7.5e9, 0, 0.338],
    [7.5e9, 1e-3, 0.336],
    [7.5e9, 5e-3, 0.33],
    [12e9, 0, 0.174],
    [12e9, 1e-3, 0.176],
    [12e9, 5e-3, 0.176],
    [20e9, 1e-3, 0],
  ])('height at %d Hz and %d V of noise: %d V to 2 % of the main cursor', (bandwidthHz, noiseVolts, expected) => {
    const { eyeHeightVolts, mainCursorVolts } = linkOf(bandwidthHz, noiseVolts);
    expect(Math.abs(eyeHeightVolts - expected)).toBeLessThan(0.02 * mainCursorVolts);
  });
});
