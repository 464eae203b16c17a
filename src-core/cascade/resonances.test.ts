import { describe, expect, test } from 'vitest';
import { contextOf, lineOf } from '../networks/testing';
import { cascadeOf } from './cascade';
import { networkAt } from './network-at';
import { lossDb } from './own-dips';
import { resonancesOf } from './resonances';
import { legElement, lossyLine, networksOf, stub } from './testing';

const found = (...elements: Parameters<typeof networksOf>[0]) => resonancesOf(networksOf(elements));

describe('a stub', () => {
  test('is named at its notch, far finer than the grid, with depth, loss and Q', () => {
    // between two grid points 98 MHz apart
    const notch = 19.637e9;
    const [only, ...others] = found(lossyLine('in', 100e-12, 2), stub('dive', notch), lossyLine('out', 150e-12, 2));
    expect(others).toEqual([]);
    expect(only.elements).toEqual(['dive']);
    expect(only.frequencyHz / notch).toBeCloseTo(1, 6);
    // at the notch the branch is tanh(1e-3)·50 ohm: 1 + 50/(2·0.05) = 501 in depth
    expect(only.depthDb).toBeCloseTo(20 * Math.log10(501), 2);
    expect(only.lossDb - only.depthDb).toBeCloseTo(4 * Math.sqrt(notch / 10e9), 2);
    expect(only.quality).toBeGreaterThan(300);
  });

  test('has the width that the response itself shows 3 dB above the bottom', () => {
    const notch = 15e9;
    const networks = networksOf([stub('dive', notch, 0.05)]);
    const [{ quality, lossDb: bottom }] = resonancesOf(networks);
    const edge = notch * (1 + 0.5 / quality);
    const loss = lossDb(networkAt(networks, Float64Array.of(edge)).differential, 0);
    expect(bottom - loss).toBeGreaterThan(2.5);
    expect(bottom - loss).toBeLessThan(3.5);
  });

  test('is found where the line hides its dip in a slope of loss', () => {
    const networks = networksOf([lossyLine('run', 2e-9, 30), stub('dive', 20e9, 0.4), lossyLine('rest', 1e-9, 20)]);
    expect(resonancesOf(networks).map(({ elements }) => elements)).toEqual([['dive']]);
  });

  test('repeats at three times its notch, within the grid', () => {
    expect(found(stub('dive', 12e9)).map(({ frequencyHz }) => Math.round(frequencyHz / 1e8) / 10)).toEqual([12, 36]);
  });
});

describe('which element', () => {
  test('of two stubs apart: each its own', () => {
    const resonances = found(stub('dive', 18e9), lossyLine('run', 300e-12, 3), stub('rise', 21e9));
    expect(resonances.map(({ elements }) => elements)).toEqual([['dive'], ['rise']]);
  });

  test('of two within 2 %: both, as one', () => {
    const resonances = found(stub('dive', 18e9), lossyLine('run', 300e-12, 3), stub('rise', 18.3e9));
    expect(resonances.map(({ elements }) => elements)).toEqual([['dive', 'rise']]);
  });

  test('a lossy trace is blamed for nothing, and a mismatched one for none of its ripple', () => {
    expect(found(lossyLine('run', 1e-9, 40))).toEqual([]);
    expect(found(legElement('wide', (f) => lineOf(35, 2 * Math.PI * f * 200e-12)))).toEqual([]);
  });

  test('a stub whose notch lies beyond the grid is not named', () => {
    expect(found(stub('short', 80e9))).toEqual([]);
  });

  test('a straight through is not looked at', () => {
    expect(found({ ...stub('gone', 18e9), through: true })).toEqual([]);
  });
});

test('what is kept of untouched elements gives the same as a cold start', () => {
  const before = networksOf([lossyLine('in', 100e-12, 2), stub('dive', 19e9), lossyLine('out', 150e-12, 2)]);
  const edited = lossyLine('out', 250e-12, 1);
  const after = {
    ...before,
    elements: [
      ...before.elements.slice(0, 2),
      { ...edited, network: edited.evaluate(contextOf(before.grid.frequencies)) },
    ],
  };
  expect(cascadeOf(after, cascadeOf(before)).resonances).toEqual(cascadeOf(after).resonances);
});
