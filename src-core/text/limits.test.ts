import { expect, test, vi } from 'vitest';
import { tooDeepAt, utf8Length } from './limits';
import { parseFile } from './parse';
import { FILE, plain } from './testing';

// These run long on a busy machine; none asserts a time.
vi.setConfig({ testTimeout: 120_000 });

const shapes: [string, (depth: number) => string][] = [
  ['brackets', (n) => `${'['.repeat(n)}${']'.repeat(n)}`],
  ['open brackets', (n) => '['.repeat(n)],
  ['braces', (n) => `${'{a: '.repeat(n)}1${'}'.repeat(n)}`],
  ['dashes on a line', (n) => `${'- '.repeat(n)}a`],
  ['question marks', (n) => `${'? '.repeat(n)}a`],
  ['indentation', (n) => Array.from({ length: n }, (_, i) => `${' '.repeat(i)}a:`).join('\n')],
  [
    'lists in mappings',
    (n) => Array.from({ length: n / 2 }, (_, i) => `${' '.repeat(2 * i)}${i ? '- ' : ''}a:`).join('\n'),
  ],
];

test.each(shapes)('nesting by %s: 63 and 64 levels are read, 65 and 6,400 are a finding', (_, shape) => {
  expect(tooDeepAt(shape(63 - (63 % 2)))).toBeUndefined();
  expect(tooDeepAt(shape(64))).toBeUndefined();
  for (const depth of [66, 6400]) {
    const text = shape(depth);
    const { reports } = parseFile(FILE, text);
    expect(reports.filter(({ rule }) => rule === 'limit')).toHaveLength(1);
    expect(reports[0].range!.end).toBeLessThanOrEqual(text.length);
  }
});

test('65 brackets are one too many', () => {
  expect(tooDeepAt('['.repeat(64))).toBeUndefined();
  expect(tooDeepAt('['.repeat(65))).toBe(64);
});

test('what nests too deeply spoils its own entry only', () => {
  const parsed = parseFile(
    FILE,
    `a: 1\npath:\n  - trace: x\n    note: ${'['.repeat(2000)}\n    length: 1 mm\n  - via: y\n`,
  );
  expect(parsed.reports.map(({ rule }) => rule)).toEqual(['limit']);
  expect(plain(parsed.value)).toMatchObject({ a: 1, path: [{ trace: 'x', length: '1 mm' }, { via: 'y' }] });
});

test.each([
  [1024 * 1024 - 1, []],
  [1024 * 1024, []],
  [1024 * 1024 + 1, ['limit']],
  [100 * 1024 * 1024, ['limit']],
])('a text of %i bytes', (bytes, rules) => {
  const text = `a: 1\n#${'x'.repeat(bytes - 6)}`;
  expect(parseFile(FILE, text).reports.map(({ rule }) => rule)).toEqual(rules);
});

test('bytes are those of UTF-8', () => {
  for (const text of ['', 'a', 'µ±Ω', '€', '🍎🍎', 'a\ud800b'])
    expect(utf8Length(text)).toBe(new TextEncoder().encode(text).length);
});

/** `count` values in one anchor, each alias adding them again. */
const aliases = (count: number, times: number) =>
  `a: &a [${Array(count - 1)
    .fill(1)
    .join(', ')}]\nb: [${Array(times).fill('*a').join(', ')}]\nc: 3\n`;

test.each([
  [999, 1, []],
  [1000, 1, []],
  [1001, 1, ['limit']],
  [100, 1000, ['limit']],
])('an anchor of %i values, %i times', (count, times, rules) => {
  const { reports, value } = parseFile(FILE, aliases(count, times));
  expect(reports.map(({ rule }) => rule)).toEqual(rules);
  expect(value).toMatchObject({ c: 3 });
});

test('aliases of aliases of aliases end', () => {
  const bomb = Array.from(
    { length: 30 },
    (_, i) => `k${i}: &k${i} [${i ? `*k${i - 1}, *k${i - 1}, *k${i - 1}` : '1'}]`,
  ).join('\n');
  const { reports, value } = parseFile(FILE, bomb);
  expect(reports.map(({ rule }) => rule)).toEqual(['limit']);
  expect(JSON.stringify(value).length).toBeLessThan(20000);
});

test('20,000 keys, alike or not, and 20,000 broken lines are read', () => {
  expect(parseFile(FILE, Array.from({ length: 20000 }, (_, i) => `k${i}: ${i}`).join('\n')).reports).toEqual([]);
  expect(parseFile(FILE, Array.from({ length: 20000 }, () => 'k: 1').join('\n')).reports).toHaveLength(200);
  expect(parseFile(FILE, Array.from({ length: 20000 }, () => 'k: [').join('\n')).reports).toHaveLength(200);
});
