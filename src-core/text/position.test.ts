import fc from 'fast-check';
import { expect, test } from 'vitest';
import { offsetAt, positionAt } from './position';

test('lines end with LF, CR LF and CR alike', () => {
  const text = 'a\nbc\r\nd\re';
  const lines = [...text].map((_, offset) => positionAt(text, offset).line);
  expect(lines).toEqual([0, 0, 1, 1, 1, 1, 2, 2, 3]);
  expect(positionAt(text, text.indexOf('c'))).toEqual({ line: 1, character: 1 });
});

test('characters are counted in UTF-16 units', () => {
  expect(positionAt('😀x', 2)).toEqual({ line: 0, character: 2 });
});

test('what lies outside is moved inside', () => {
  expect(positionAt('ab\nc', 99)).toEqual({ line: 1, character: 1 });
  expect(positionAt('ab\nc', -1)).toEqual({ line: 0, character: 0 });
  expect(offsetAt('ab\nc', { line: 7, character: 0 })).toBe(4);
  expect(offsetAt('ab\nc', { line: 0, character: 50 })).toBe(3);
});

test('an offset comes back from its position, whatever the text', () => {
  const sign = fc.constantFrom('a', ' ', '\n', '\r', '\r\n', 'ü', '😀');
  fc.assert(
    fc.property(fc.array(sign, { maxLength: 30 }), (signs) => {
      const text = signs.join('');
      for (let offset = 0; offset <= text.length; offset++)
        if (offsetAt(text, positionAt(text, offset)) !== offset) return false;
      return true;
    }),
    { seed: 3 },
  );
});
