import fc from 'fast-check';
import { expect, test } from 'vitest';
import { channelText, partsText } from '../model/fixtures';
import { applyEdits, resolveEdits } from './edits';
import { parseFile } from './parse';
import { find, rootOf } from './range';
import { FILE, pathsOf, place, plain } from './testing';
import type { PlaceEdit } from './types';

function edited(text: string, ...edits: PlaceEdit[]): string {
  const resolved = resolveEdits(edits, new Map([[FILE, parseFile(FILE, text)]]));
  for (const [i, edit] of resolved.entries()) {
    if (i > 0) expect(resolved[i - 1].range.end).toBeLessThanOrEqual(edit.range.start);
  }
  return applyEdits(text, resolved);
}

const via = `path:
  - via: dive # the first
    drill: 0.25 mm # as the fabricator wants it
    backdrill: { bottom: 0.3 mm }

  # the second
  - via: rise
    drill: 0.3 mm
`;

test('set adds a pair behind another, comments stay', () => {
  expect(edited(via, { op: 'set', at: place(['path', 0]), key: 'to', text: 'L6', after: 'drill' })).toBe(
    via.replace('wants it\n', 'wants it\n    to: L6\n'),
  );
  expect(edited(via, { op: 'set', at: place(['path', 0]), key: 'to', text: 'L6' })).toBe(
    via.replace('0.3 mm }\n', '0.3 mm }\n    to: L6\n'),
  );
});

test('set replaces a value that is there', () => {
  expect(edited(via, { op: 'set', at: place(['path', 0]), key: 'drill', text: '0.2 mm' })).toBe(
    via.replace('0.25 mm', '0.2 mm'),
  );
});

test('set between braces, and makes mappings that are missing', () => {
  expect(edited(via, { op: 'set', at: place(['path', 0, 'backdrill']), key: 'top', text: '0.2 mm' })).toBe(
    via.replace('{ bottom: 0.3 mm }', '{ bottom: 0.3 mm, top: 0.2 mm }'),
  );
  expect(edited(via, { op: 'set', at: place(['path', 1, 'backdrill']), key: 'bottom', text: '0.2 mm' })).toBe(
    via.replace('drill: 0.3 mm\n', 'drill: 0.3 mm\n    backdrill: { bottom: 0.2 mm }\n'),
  );
  expect(edited('', { op: 'set', at: place([]), key: 'lanewright', text: '1' })).toBe('lanewright: 1\n');
  expect(edited('ffe: {}\n', { op: 'set', at: place(['ffe']), key: 'main', text: '1' })).toBe('ffe: { main: 1 }\n');
  expect(edited('receiver:\n', { op: 'set', at: place(['receiver']), key: 'noise', text: '1 mV' })).toBe(
    'receiver: { noise: 1 mV }\n',
  );
});

test('two sets behind one key keep their order', () => {
  const at = place(['path', 0]);
  const after = 'drill';
  expect(
    edited(via, { op: 'set', at, key: 'from', text: 'L1', after }, { op: 'set', at, key: 'to', text: 'L6', after }),
  ).toBe(via.replace('wants it\n', 'wants it\n    from: L1\n    to: L6\n'));
});

test.each([
  ['a: 1 # one\n', 'a: 2 # one\n'],
  ['a:\n', 'a: 2\n'],
  ['a: # none\n', 'a: 2 # none\n'],
  ['a:  \nb: 1\n', 'a: 2\nb: 1\n'],
  ['a: [1,\n  2]\n', 'a: 2\n'],
  ['a:\n  - 1\n  - 3\nb: 1\n', 'a: 2\nb: 1\n'],
  ['{ a, b: 1 }\n', '{ a: 2, b: 1 }\n'],
  ['{ a: , b: 1 }\n', '{ a: 2, b: 1 }\n'],
])('value in %j gives %j', (text, expected) => {
  expect(edited(text, { op: 'value', at: place(['a']), text: '2' })).toBe(expected);
});

test('value completes what is half typed', () => {
  expect(edited('path:\n  - tr\n', { op: 'value', at: place(['path', 0]), text: 'trace: a' })).toBe(
    'path:\n  - trace: a\n',
  );
  expect(edited('path:\n  -\n', { op: 'value', at: place(['path', 0]), text: 'trace: a' })).toBe(
    'path:\n  - trace: a\n',
  );
  expect(
    edited('path:\n  - stub\n    length: 1 mm\n', { op: 'value', at: place(['path', 0, 'stub']), text: 'a' }),
  ).toBe('path:\n  - stub: a\n    length: 1 mm\n');
});

test('key renames', () => {
  expect(edited(via, { op: 'key', at: place(['path', 0, 'drill']), name: 'hole' })).toBe(
    via.replace('drill: 0.25', 'hole: 0.25'),
  );
});

test('remove takes lines, and with the last entry what held it', () => {
  expect(edited(via, { op: 'remove', at: place(['path', 0, 'drill']) })).toBe(
    via.replace('    drill: 0.25 mm # as the fabricator wants it\n', ''),
  );
  expect(edited(via, { op: 'remove', at: place(['path', 1]) })).toBe(via.slice(0, via.indexOf('  - via: rise')));
  expect(edited(via, { op: 'remove', at: place(['path', 0, 'backdrill', 'bottom']) })).toBe(
    via.replace('{ bottom: 0.3 mm }', '{  }'),
  );
  expect(edited('a: 1\nwaivers:\n  - rule: x\n    at: y\n', { op: 'remove', at: place(['waivers', 0]) })).toBe(
    'a: 1\n',
  );
  expect(
    edited(
      'a: 1\nwaivers:\n  - rule: x\n  - rule: y\n',
      { op: 'remove', at: place(['waivers', 0]) },
      { op: 'remove', at: place(['waivers', 1]) },
    ),
  ).toBe('a: 1\n');
  expect(edited('a: [1, 2, 3]\n', { op: 'remove', at: place(['a', 1]) })).toBe('a: [1, 3]\n');
  expect(edited('a: [1, 2, 3]\n', { op: 'remove', at: place(['a', 2]) })).toBe('a: [1, 2]\n');
  expect(edited('path:\n  - x: 1\n    y: 2\n', { op: 'remove', at: place(['path', 0, 'x']) })).toBe(
    'path:\n  - y: 2\n',
  );
});

test('append adds entries, and makes the list that is not there', () => {
  const lines = ['rule: eye', 'at: main'];
  const entry = '  - rule: eye\n    at: main\n';
  expect(edited('a: 1\n', { op: 'append', at: place(['waivers']), lines })).toBe(`a: 1\nwaivers:\n${entry}`);
  expect(edited('a: 1', { op: 'append', at: place(['waivers']), lines })).toBe(`a: 1\nwaivers:\n${entry.trimEnd()}`);
  expect(edited('waivers:\n', { op: 'append', at: place(['waivers']), lines })).toBe(`waivers:\n${entry}`);
  expect(edited('waivers:\n  - rule: x # why\nb: 1\n', { op: 'append', at: place(['waivers']), lines })).toBe(
    `waivers:\n  - rule: x # why\n${entry}b: 1\n`,
  );
  expect(edited('waivers:\n- rule: x\n', { op: 'append', at: place(['waivers']), lines })).toBe(
    'waivers:\n- rule: x\n- rule: eye\n  at: main\n',
  );
  expect(edited('waivers:\n  - rule: x\n', { op: 'append', at: place(['waivers']), lines, index: 0 })).toBe(
    `waivers:\n${entry}  - rule: x\n`,
  );
  expect(edited('waivers: []\n', { op: 'append', at: place(['waivers']), lines })).toBe(
    'waivers: [{ rule: eye, at: main }]\n',
  );
  expect(edited('a: [b]\n', { op: 'append', at: place(['a']), lines: ['c'] })).toBe('a: [b, c]\n');
  const twice: PlaceEdit = { op: 'append', at: place(['waivers']), lines };
  expect(edited('a: 1\n', twice, twice)).toBe(`a: 1\nwaivers:\n${entry}${entry}`);
});

test('line endings of the text are kept', () => {
  const text = via.replaceAll('\n', '\r\n');
  const result = edited(
    text,
    { op: 'set', at: place(['path', 0]), key: 'to', text: 'L6' },
    { op: 'append', at: place(['waivers']), lines: ['rule: eye', 'at: x'] },
    { op: 'remove', at: place(['path', 1, 'drill']) },
  );
  expect(result.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
  expect(parseFile(FILE, result).reports).toEqual([]);
});

test('what is not there, or in a file that is not known, is left alone', () => {
  expect(edited(via, { op: 'value', at: place(['path', 9]), text: 'x' }, { op: 'remove', at: place(['gone']) })).toBe(
    via,
  );
  expect(resolveEdits([{ op: 'value', at: { file: 'other', path: [] }, text: 'x' }], new Map())).toEqual([]);
});

test('after any removal, value or set the example parses, comments stay, and the change is there', () => {
  for (const text of [channelText, partsText]) {
    const parsed = parseFile(FILE, text);
    const paths = pathsOf(parsed.value, []).filter((path) => path.length > 0);
    fc.assert(
      fc.property(fc.constantFrom(...paths), fc.constantFrom('remove', 'value', 'set'), (path, op) => {
        const at = place(path);
        const { node } = find(rootOf(parsed), path);
        if (op === 'set' && node.type !== 'map') return;
        const edit: PlaceEdit =
          op === 'remove'
            ? { op, at }
            : op === 'value'
              ? { op, at, text: 'new' }
              : { op: 'set', at, key: 'x-new', text: 'new' };
        const result = parseFile(FILE, edited(text, edit));
        expect(result.reports).toEqual([]);
        if (op === 'value') expect(plain(valueAt(result.value, path))).toBe('new');
        if (op === 'set') expect(valueAt(result.value, [...path, 'x-new'])).toBe('new');
        if (op === 'remove') expect(result.value).not.toEqual(parsed.value);
        if (op === 'set') expect(result.text.match(/#/g)).toEqual(text.match(/#/g));
      }),
      { numRuns: 150, seed: 3 },
    );
  }
});

function valueAt(value: unknown, path: readonly (string | number)[]): unknown {
  return path.reduce<unknown>((here, step) => (here as Record<string | number, unknown>)?.[step], value);
}

test('a pair moves before all others with its comment, which stay as they are', () => {
  const text = 'path:\n  - length: 1 mm # short\n    # of the run\n    trace: run # moved\n    layer: L1\n';
  expect(edited(text, { op: 'first', at: place(['path', 0, 'trace']) })).toBe(
    'path:\n  - trace: run # moved\n    length: 1 mm # short\n    # of the run\n    layer: L1\n',
  );
  expect(
    edited('path: [{ length: 1 mm, dk: 3, trace: run }]\n', { op: 'first', at: place(['path', 0, 'trace']) }),
  ).toBe('path: [{ trace: run, length: 1 mm, dk: 3 }]\n');
  expect(edited(text, { op: 'first', at: place(['path', 0, 'length']) })).toBe(text);
});

test('set before all others', () => {
  const first = { op: 'set', at: place([]), key: 'lanewright', text: '1', first: true } as const;
  expect(edited('# a lane\nline-rate: 10 Gb/s\npath: []\n', first)).toBe(
    '# a lane\nlanewright: 1\nline-rate: 10 Gb/s\npath: []\n',
  );
  expect(edited('path: [{ length: 1 mm }]\n', { ...first, at: place(['path', 0]), key: 'trace', text: 'a' })).toBe(
    'path: [{ trace: a, length: 1 mm }]\n',
  );
});
