import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { keepSame } from './keep-same';
import { sameValue } from './same-value';

describe('what says the same stays the same object', () => {
  const before = { name: 'a', list: [{ name: 'x', at: [1, 2] }, { name: 'y', at: [3] }], other: { deep: { n: Number.NaN } } }; // biome-ignore format: a value
  const copy = () => structuredClone(before);

  test('all of it', () => {
    expect(keepSame(copy(), before)).toBe(before);
  });

  test('all but what changed', () => {
    const next = copy();
    next.list[0].at[1] = 7;
    const result = keepSame(next, before);
    expect(result).toEqual(next);
    expect(result.other).toBe(before.other);
    expect(result.list[1]).toBe(before.list[1]);
    expect(before.list[0].at).toEqual([1, 2]);
  });

  test('entries by name, where one was put in between or taken out', () => {
    const next = copy();
    next.list.unshift({ name: 'new', at: [] });
    const longer = keepSame(next, before);
    expect([longer.list[1], longer.list[2]]).toEqual(before.list);
    expect(longer.list[2]).toBe(before.list[1]);
    expect(keepSame({ list: [copy().list[1]] }, before).list[0]).toBe(before.list[1]);
  });

  test('a key more or less is a change', () => {
    expect(keepSame({ ...copy(), more: 1 }, before)).toMatchObject({ more: 1 });
    expect(keepSame({ name: 'a' }, before)).toEqual({ name: 'a' });
    expect(keepSame({ name: undefined }, {})).toHaveProperty('name', undefined);
  });

  test('a part shared in two places, compared with two unlike ones', () => {
    const shared = { n: 1 };
    const result = keepSame({ a: shared, b: shared }, { a: { n: 1 }, b: { n: 2 } });
    expect(result).toEqual({ a: { n: 1 }, b: { n: 1 } });
  });
});

test('the result always says what the new value says, and equals the old one just if they are the same', () => {
  const value = fc.anything({
    maxDepth: 3,
    key: fc.constantFrom('a', 'name', '__proto__'),
    values: [fc.integer({ max: 2, min: 0 }), fc.constantFrom('x', 'y')],
    withNullPrototype: true,
  });
  fc.assert(
    fc.property(value, value, (next, before) => {
      const result = keepSame(next, before);
      expect(sameValue(result, next)).toBe(true);
      expect(Object.is(result, before)).toBe(sameValue(next, before));
    }),
    { seed: 5, numRuns: 2000 },
  );
});

test('two entries of one name, each kept for what it is', () => {
  const before = {
    parts: [
      { name: 'mate', file: 'a' },
      { name: 'mate', file: 'b' },
    ],
  };
  expect(keepSame(structuredClone(before), before)).toBe(before);
});
