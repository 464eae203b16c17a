import { expect, test } from 'vitest';
import { channelText, partsText } from '../model/fixtures';
import { applyEdits } from './edits';
import { parseFile } from './parse';
import { rangeOf } from './range';
import { FILE, place, plain, reportsOf, strayRanges } from './testing';

const read = (text: string) => plain(parseFile(FILE, text).value);

test('values, and where they stand', () => {
  const text = 'a: 1\npath:\n  - trace: x\n    length: 5 mm # long\n    empty:\n';
  const parsed = parseFile(FILE, text);
  expect(plain(parsed.value)).toEqual({ a: 1, path: [{ trace: 'x', length: '5 mm', empty: null }] });
  const at = (path: (string | number)[], on?: 'key' | 'value' | 'entry') => {
    const { start, end } = rangeOf(parsed, place(path, on));
    return text.slice(start, end);
  };
  expect(at(['path', 0, 'length'])).toBe('5 mm');
  expect(at(['path', 0, 'length'], 'key')).toBe('length');
  expect(at(['path', 0, 'length'], 'entry')).toBe('length: 5 mm');
  expect(at(['path', 0, 'empty'])).toBe('empty');
  expect(at(['path', 0], 'entry')).toBe('- trace: x\n    length: 5 mm # long\n    empty:');
  expect(at(['path', 0])).toBe('trace: x');
  expect(at(['path', 0, 'missing'])).toBe('trace: x');
  expect(at(['path', 7])).toBe('path');
});

test('scalars are those of YAML 1.2, whatever the directive says', () => {
  expect(
    read(
      '%YAML 1.1\n---\na: on\nb: yes\nc: 010\nd: 1e-12\ne: ~\nf: true\ng: "1"\nh: .inf\ni: .nan\nj: 0x10\nk: 2027-03-31\n',
    ),
  ).toEqual({
    a: 'on',
    b: 'yes',
    c: 10,
    d: 1e-12,
    e: null,
    f: true,
    g: '1',
    h: '.inf',
    i: '.nan',
    j: 16,
    k: '2027-03-31',
  });
});

test('`__proto__` is a key like any other', () => {
  const value = parseFile(FILE, '__proto__: { polluted: 1 }\nconstructor: 2\n').value as Record<string, unknown>;
  expect(Object.keys(value)).toEqual(['__proto__', 'constructor']);
  expect(Object.getPrototypeOf(value)).toBeNull();
  expect(({} as Record<string, unknown>).polluted).toBeUndefined();
});

test('anchors, aliases and merge keys', () => {
  const text =
    'base: &base { drill: 0.25 mm, pad: 1 }\npath:\n  - via: a\n    <<: *base\n    pad: 2\n  - <<: [*base, { antipad: 3 }]\nsame: *base\n';
  const parsed = parseFile(FILE, text);
  expect(parsed.reports).toEqual([]);
  expect(plain(parsed.value)).toEqual({
    base: { drill: '0.25 mm', pad: 1 },
    path: [
      { via: 'a', pad: 2, drill: '0.25 mm' },
      { drill: '0.25 mm', pad: 1, antipad: 3 },
    ],
    same: { drill: '0.25 mm', pad: 1 },
  });
  expect(rangeOf(parsed, place(['path', 0, 'drill']))).toEqual({
    start: text.indexOf('0.25'),
    end: text.indexOf('0.25') + 7,
  });
});

test('an alias that refers to nothing, or to itself, is told', () => {
  expect(reportsOf('a: *gone\n')).toEqual(['yaml «*gone»']);
  expect(reportsOf('a: &a [*a]\n')).toEqual(['yaml «*a»']);
});

test('a key written twice: both places, the first counts, the fix removes the second', () => {
  const text = 'path:\n  - trace: x\n    length: 1 mm\n    length: 2 mm # wrong\n    width: 3\n';
  const parsed = parseFile(FILE, text);
  expect(reportsOf(text)).toEqual(['duplicate-key «length»']);
  const [report] = parsed.reports;
  expect(report.range?.start).toBe(text.lastIndexOf('length'));
  expect(report.related?.map(({ at }) => rangeOf(parsed, at).start)).toEqual([text.indexOf('length')]);
  expect(plain(parsed.value)).toEqual({ path: [{ trace: 'x', length: '1 mm', width: 3 }] });
  const [edit] = report.fixes![0].edits;
  expect(edit.op === 'range' && applyEdits(text, [edit])).toBe('path:\n  - trace: x\n    length: 1 mm\n    width: 3\n');
  expect(reportsOf('a: { b: 1, b: 2 }\n')).toEqual(['duplicate-key «b»']);
});

test.each([
  [
    'a brace',
    'path:\n  - trace: x\n    ffe: { a: 1, b: [2\n    c: 3\n  - via: y\n',
    'yaml «{»',
    { path: [{ trace: 'x', ffe: { a: 1, b: [2] }, c: 3 }, { via: 'y' }] },
  ],
  ['a bracket inside braces', 'a: { pre: [-0.06, main: 0.82 }\nb: 2\n', 'yaml «[»', undefined],
  ['a quote', 'title: "Camera\nb: 2\n', 'yaml «"Camera»', { title: 'Camera', b: 2 }],
  [
    'a quote in an entry',
    "path:\n  - trace: x\n    note: 'long\n    c: 3\n  - via: y\n",
    "yaml «'long»",
    { path: [{ trace: 'x', note: 'long', c: 3 }, { via: 'y' }] },
  ],
  [
    'an entry between braces',
    'path:\n  - { trace: x, a: 1\n  - { via: y }\nlimits: []\n',
    'yaml «{»',
    { path: [{ trace: 'x', a: 1 }, { via: 'y' }], limits: [] },
  ],
])('%s that is not closed is told where it opens and ends with its entry', (_, text, expected, value) => {
  expect(reportsOf(text)).toEqual([expected]);
  if (value) expect(read(text)).toEqual(value);
  const fix = parseFile(FILE, text).reports[0].fixes![0].edits[0];
  expect(fix.op === 'range' && reportsOf(applyEdits(text, [fix]))).toEqual([]);
});

test('a bracket that closes nothing', () => {
  expect(reportsOf('a: [1, 2]]\nb: 1\n')).toEqual(['yaml «]»']);
});

test('a number without a unit is one, whichever half its comma cut it into', () => {
  const text = 'ffe: { pre: [-0,06], main: 0,82, post: [-0,12, 0.02] }\nports: [0,12]\n';
  expect(reportsOf(text)).toEqual(['quantity «-0,06»', 'quantity «0,82»', 'quantity «-0,12»']);
  expect(read(text)).toEqual({ ffe: { pre: [-0.06], main: 0.82, post: [-0.12, 0.02] }, ports: [0, 12] });
});
test.each(['{ width: 0,11 mm, gap: 0,14 mm }', '[1,6 dB/m @ 1.5 GHz, 5,1 dB/m @ 12.9 GHz]'])(
  'a decimal comma in `%s` is one finding for both halves, and meant as a point',
  (flow) => {
    const text = `a: ${flow}\n`;
    const parsed = parseFile(FILE, text);
    expect(parsed.reports.map(({ rule }) => rule)).toEqual(['quantity', 'quantity']);
    const fixed = applyEdits(
      text,
      parsed.reports.flatMap(({ fixes }) =>
        fixes!.flatMap(({ edits }) => edits.flatMap((edit) => (edit.op === 'range' ? [edit] : []))),
      ),
    );
    expect(parseFile(FILE, fixed).reports).toEqual([]);
    expect(plain(parseFile(FILE, fixed).value)).toEqual(plain(parsed.value));
  },
);

test('lists of whole numbers are no decimals', () => {
  expect(reportsOf('ports: { enter: [1,3], leave: [2,4] }\nffe: { pre: [1,2,3] }\n')).toEqual([]);
});

test.each(['a:\n  length:42 mm\n  b: 1\n', 'a: { length:42 mm, b: 1 }\n'])('a colon without its space: %j', (text) => {
  const parsed = parseFile(FILE, text);
  expect(parsed.reports.map(({ rule, message }) => [rule, message.includes('space')])).toEqual([['yaml', true]]);
  expect(plain(parsed.value)).toEqual({ a: { length: '42 mm', b: 1 } });
});

test('tabs as indentation: one finding, the fix writes spaces, values are kept', () => {
  const text = 'path:\n\t- trace: x\n\t\tlength: 1 mm\nb: 2\n';
  const parsed = parseFile(FILE, text);
  expect(parsed.reports.map(({ rule }) => rule)).toEqual(['tab']);
  expect(plain(parsed.value)).toEqual({ path: [{ trace: 'x', length: '1 mm' }], b: 2 });
  const { start, end } = rangeOf(parsed, place(['path', 0, 'length']));
  expect(text.slice(start, end)).toBe('1 mm');
  const edits = parsed.reports[0].fixes![0].edits.flatMap((edit) => (edit.op === 'range' ? [edit] : []));
  expect(reportsOf(applyEdits(text, edits))).toEqual([]);
});

test('line endings, byte order mark and surrogates count in UTF-16', () => {
  const text = `\ufefftitle: "🍎 sorting"\r\npath:\r\n  - trace: x\r\n    length: 5 mm\r\n`;
  const parsed = parseFile(FILE, text);
  expect(plain(parsed.value)).toEqual({ title: '🍎 sorting', path: [{ trace: 'x', length: '5 mm' }] });
  const { start, end } = rangeOf(parsed, place(['path', 0, 'length']));
  expect(text.slice(start, end)).toBe('5 mm');
  const broken = parseFile(FILE, text.replace('trace: x', 'trace: [x'));
  expect(broken.reports).toHaveLength(1);
  expect(plain(broken.value)).toMatchObject({ title: '🍎 sorting', path: [{ length: '5 mm' }] });
});

test('a second document is told and not read', () => {
  expect(reportsOf('a: 1\n---\nb: 2\n')).toEqual(['yaml «---»']);
  expect(read('a: 1\n---\nb: 2\n')).toEqual({ a: 1 });
});

test('a value with a colon in it wants quotes and is kept as text', () => {
  expect(reportsOf('title: Camera: sled\nb: 1\n')).toHaveLength(1);
  expect(read('title: Camera: sled\nb: 1\n')).toEqual({ title: 'Camera: sled', b: 1 });
});

test('the examples have no report and no range outside', () => {
  for (const text of [channelText, partsText]) {
    const parsed = parseFile(FILE, text);
    expect(parsed.reports).toEqual([]);
    expect(strayRanges(parsed)).toEqual([]);
  }
});
