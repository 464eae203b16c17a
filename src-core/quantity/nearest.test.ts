import fc from 'fast-check';
import { expect, test } from 'vitest';
import { editDistance, nearest } from './nearest';

test.each([
  ['lenght', 'length', 1],
  ['traec', 'trace', 1],
  ['width', 'width', 0],
  ['', 'via', 3],
  ['drill', 'drll', 1],
  ['ca', 'abc', 3],
])('%s to %s costs %i', (a, b, expected) => {
  expect(editDistance(a, b)).toBe(expected);
  expect(editDistance(b, a)).toBe(expected);
});

test('the distance is a metric’s: none below zero, none above the longer word, one more for a letter appended', () => {
  fc.assert(
    fc.property(fc.string({ maxLength: 12 }), fc.string({ maxLength: 12 }), (a, b) => {
      const distance = editDistance(a, b);
      expect(distance === 0).toBe(a === b);
      expect(distance).toBeLessThanOrEqual(Math.max(a.length, b.length));
      expect(editDistance(a, `${a}x`)).toBe(1);
    }),
    { seed: 3 },
  );
});

test.each([
  ['lenght', 'length'],
  ['Length', 'length'],
  ['antpad', 'antipad'],
  ['zebra', undefined],
  ['x'.repeat(1e5), undefined],
])('%s is meant to be %s', (word, expected) => {
  expect(nearest(word, ['length', 'width', 'antipad', 'pad'])).toBe(expected);
});
