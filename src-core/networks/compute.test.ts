import { describe, expect, test } from 'vitest';
import { channelText, exampleModel, exampleTexts } from '../model/fixtures';
import { computeNetworks } from './compute';
import type { Kept } from './shelf';
import type { Networks } from './types';

const none = () => undefined;
const modelOf = (change: (text: string) => string = (text) => text) =>
  exampleModel(exampleTexts({ channel: change(channelText) })).model;
const model = modelOf();
const kept = (networks: Networks) => networks.kept as Kept;

describe('networks are kept by content', () => {
  test('a cold start computes each element once', () => {
    const networks = computeNetworks(model, none);
    expect(networks.computed).toBe(9);
    expect(networks.elements.map(({ through }) => through)).toEqual(Array(9).fill(false));
    expect(networks.without).toEqual([]);
  });

  test('nothing changed: the same object', () => {
    const networks = computeNetworks(model, none);
    expect(computeNetworks(modelOf(), none, networks)).toBe(networks);
  });

  test('one element changed: its network alone, the others are the same arrays', () => {
    const before = computeNetworks(model, none);
    const after = computeNetworks(
      modelOf((text) => text.replace('length: 12 mm', 'length: 13 mm')),
      none,
      before,
    );
    expect(after.computed).toBe(1);
    expect(after.elements.filter(({ network }, i) => network !== before.elements[i].network)).toHaveLength(1);
  });

  test('an element put in between: the others keep theirs', () => {
    const before = computeNetworks(model, none);
    const stub = '  - stub: spare\n    length: 1.3 mm\n    impedance: 50 ohm\n    dk: 3.6\n  - connector: sled-mate';
    const after = computeNetworks(
      modelOf((text) => text.replace('  - connector: sled-mate', stub)),
      none,
      before,
    );
    expect([after.elements.length, after.computed]).toEqual([10, 1]);
    expect(after.elements[9].network).toBe(before.elements[8].network);
    expect(after.elements[9].element.place.path).toEqual(['path', 9]);
  });

  test('the last edit taken back finds what it left', () => {
    const before = computeNetworks(model, none);
    const edited = computeNetworks(
      modelOf((text) => text.replace('length: 12 mm', 'length: 13 mm')),
      none,
      before,
    );
    expect(computeNetworks(model, none, edited).computed).toBe(0);
  });

  test('a hundred edits hold no more than the current and the last one’s networks', () => {
    let networks = computeNetworks(model, none);
    for (let i = 0; i < 100; i++) {
      networks = computeNetworks(
        modelOf((text) => text.replace('length: 12 mm', `length: ${13 + i / 100} mm`)),
        none,
        networks,
      );
    }
    const { current, last } = kept(networks);
    const sizes = (used: typeof last) => [...(used?.networks.values() ?? [])].map((byContent) => byContent.size);
    expect([sizes(current), sizes(last)]).toEqual([[9], [9]]);
    expect(Object.keys(current)).toEqual(['networks', 'probes']);
  });
});

const through = Float64Array.of(0, 0, 1, 0, 1, 0, 0, 0);

test('what is incomplete is a straight through, and told', () => {
  const networks = computeNetworks(
    modelOf((text) => text.replace('    length: 0.5 m\n', '')),
    none,
  );
  expect(networks.without).toEqual(['twinax']);
  expect(networks.elements[8].network.differential.slice(8, 16)).toEqual(through);
});

test('what a neighbour’s file already holds is a straight through, and nothing is missing', () => {
  const elements = model.elements.map((element) =>
    element.name === 'dive' ? { ...element, includedIn: 'main-run' } : element,
  );
  const networks = computeNetworks({ ...model, elements }, none);
  expect(networks.without).toEqual([]);
  expect(networks.elements[2].network.differential.slice(8, 16)).toEqual(through);
});

test('the time for a file over: given up where it is asked', () => {
  const stop = () => {
    throw new Error('over');
  };
  expect(() => computeNetworks(model, none, undefined, { checkTime: stop })).toThrow('over');
});
