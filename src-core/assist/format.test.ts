import fc from 'fast-check';
import { expect, test } from 'vitest';
import { formatText } from './format';

test('ends of lines and of the file are made even, all else stays', () => {
  expect(formatText('\n\na: 1   \n\n\n\nb:    [1,2]  # why\t\n\n\n')).toBe('a: 1\n\nb:    [1,2]  # why\n');
  expect(formatText('a: 1\r\nb: 2')).toBe('a: 1\r\nb: 2\r\n');
  expect(formatText('')).toBe('');
});

test('text in blocks and quotes is the author’s', () => {
  const block = 'note: |\n  two  \n\n\n  three \nb: 1\n';
  expect(formatText(block)).toBe(block);
  const quoted = 'title: "one  \n\n\n  two"\nb: 1\n';
  expect(formatText(quoted)).toBe(quoted);
});

test('a second time changes nothing', () => {
  const piece = fc.constantFrom(
    'a: 1',
    '  b: 2 ',
    '',
    '',
    '- x',
    "'",
    '"',
    'c: |',
    '    deep  ',
    '# note  ',
    '\r',
    'path:',
  );
  fc.assert(
    fc.property(fc.array(piece), fc.constantFrom('\n', '\r\n'), (lines, end) => {
      const once = formatText(lines.join(end));
      expect(formatText(once)).toBe(once);
    }),
  );
});
