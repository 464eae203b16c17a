import { describe, expect, test } from 'vitest';
import { farthest, linspace } from '../networks/testing';
import type { ElementNetwork, Networks } from '../networks/types';
import { cascadeOf } from './cascade';
import { networkAt } from './network-at';
import { lossyLine, networksOf, stub } from './testing';

const thirty = networksOf(
  Array.from({ length: 30 }, (_, i) =>
    i % 3 === 1 ? stub(`s${i}`, (20 + i) * 1e9) : lossyLine(`t${i}`, (10 + i) * 1e-12, 0.3),
  ),
);

const withElement = (networks: Networks, index: number, element: ElementNetwork): Networks => ({
  ...networks,
  elements: networks.elements.map((one, i) =>
    i === index ? { ...element, network: element.evaluate(networks.context) } : one,
  ),
});

describe('partial products', () => {
  test('a cold start multiplies each once', () => {
    expect(cascadeOf(thirty).products).toBe(29);
  });

  test('an edit costs the products above it, and ends bit for bit as a cold start', () => {
    let cascade = cascadeOf(thirty);
    for (const index of [0, 7, 15, 29]) {
      const edited = withElement(thirty, index, lossyLine('edited', 33e-12, 1));
      const next = cascadeOf(edited, cascade);
      expect(next.products).toBeLessThanOrEqual(10); // the old element's branch comes back, the new one's is new: 2 × log2(30)
      expect(next.total.differential).toEqual(cascadeOf(edited).total.differential);
      cascade = next;
    }
  });

  test('the same networks give the same object', () => {
    const cascade = cascadeOf(thirty);
    expect(cascadeOf({ ...thirty }, cascade)).toBe(cascade);
  });

  test('an element in between moves the tree, and still ends as a cold start', () => {
    const elements = [...thirty.elements.slice(0, 4), lossyLine('new', 5e-12, 0.1), ...thirty.elements.slice(4)];
    const longer = networksOf(elements);
    expect(cascadeOf(longer, cascadeOf(thirty)).total.differential).toEqual(cascadeOf(longer).total.differential);
  });

  test('straight throughs cost nothing and change nothing', () => {
    const through: ElementNetwork = { ...lossyLine('gap', 1e-9, 9), through: true };
    const padded = networksOf([thirty.elements[0], through, thirty.elements[1]]);
    const cascade = cascadeOf(padded);
    expect(cascade.products).toBe(1);
    expect(cascade.between(1, 1).differential.slice(0, 8)).toEqual(Float64Array.of(0, 0, 1, 0, 1, 0, 0, 0));
    expect(farthest(cascade.between(1, 2).differential, thirty.elements[1].network.differential)).toBe(0);
  });

  test('a path of nothing is a straight through', () => {
    expect(cascadeOf(networksOf([])).total.differential.slice(0, 8)).toEqual(Float64Array.of(0, 0, 1, 0, 1, 0, 0, 0));
  });
});

describe('a piece of the path', () => {
  const cascade = cascadeOf(thirty);
  test.each([
    [0, 29],
    [0, 0],
    [3, 3],
    [5, 17],
    [13, 14],
    [1, 29],
  ])('from %i to %i equals that piece alone', (from, to) => {
    // biome-ignore format: a table
    const alone = cascadeOf(networksOf(thirty.elements.slice(from, to + 1))).total;
    expect(farthest(cascade.between(from, to).differential, alone.differential)).toBeLessThan(1e-13);
  });

  test('is computed once', () => {
    expect(cascade.between(5, 17)).toBe(cascade.between(5, 17));
  });

  test('can be had at any other frequencies', () => {
    const frequencies = linspace(0, 50e9, 5);
    const at = networkAt(thirty, frequencies, [5, 17]).differential;
    const onGrid = cascade.between(5, 17).differential;
    frequencies.forEach((f, i) => {
      const point = Math.round(f / thirty.grid.stepHz);
      expect(farthest(at.slice(8 * i, 8 * i + 8), onGrid.slice(8 * point, 8 * point + 8))).toBeLessThan(1e-12);
    });
  });
});
