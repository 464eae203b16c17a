import { expect, test } from 'vitest';
import { parseFile } from './parse';
import { placeAt } from './spot';
import { FILE } from './testing';

/** `‸` is the cursor. */
function at(marked: string) {
  const offset = marked.indexOf('‸');
  const { place, on, typed, holder, holderType, flow, column } = placeAt(
    parseFile(FILE, marked.replace('‸', '')),
    offset,
  );
  return { path: place.path, on, typed, holder, holderType, flow, column };
}

test.each([
  [
    'a key',
    'path:\n  - trace: a\n    len‸gth: 5 mm\n',
    { path: ['path', 0, 'length'], on: 'key', typed: 'len', holder: ['path', 0], column: 4 },
  ],
  [
    'a value',
    'path:\n  - trace: a\n    length: 5 m‸m\n',
    { path: ['path', 0, 'length'], on: 'value', typed: '5 m', holder: ['path', 0] },
  ],
  [
    'an empty value',
    'path:\n  - trace: a\n    length: ‸\n',
    { path: ['path', 0, 'length'], on: 'value', typed: '', holder: ['path', 0] },
  ],
  ['between braces', 'a: { b: 1, c: 2‸ }\n', { path: ['a', 'c'], on: 'value', typed: '2', holder: ['a'], flow: true }],
  ['a key between braces', 'a: { b: 1, ‸ }\n', { path: ['a'], on: 'blank', holder: ['a'], flow: true }],
  [
    'a word behind a dash',
    'path:\n  - tr‸\n',
    { path: ['path', 0], on: 'value', typed: 'tr', holder: ['path'], holderType: 'list' },
  ],
  ['a dash', 'path:\n  - ‸\n', { path: ['path', 0], on: 'value', holder: ['path'], holderType: 'list' }],
  [
    'a blank line in an entry',
    'path:\n  - trace: a\n    length: 5 mm\n    ‸\n',
    { path: ['path', 0], on: 'blank', holder: ['path', 0], column: 4 },
  ],
  [
    'a blank line at the dashes',
    'path:\n  - trace: a\n  ‸\n',
    { path: ['path'], on: 'blank', holder: ['path'], holderType: 'list', column: 2 },
  ],
  ['a blank line at the left', 'path:\n  - trace: a\n‸\n', { path: [], on: 'blank', holder: [], column: 0 }],
  [
    'below a key that waits',
    'a: 1\nreceiver:\n  ‸\n',
    { path: ['receiver'], on: 'blank', holder: ['receiver'], column: 2 },
  ],
  [
    'a half-typed key',
    'path:\n  - trace: a\n    le‸\n    width: 1 um\n',
    { path: ['path', 0, 'le'], on: 'key', typed: 'le', holder: ['path', 0] },
  ],
  ['nothing at all', '‸', { path: [], on: 'value' }],
])('%s', (_, marked, expected) => {
  expect(at(marked)).toMatchObject(expected);
});
