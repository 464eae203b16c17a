import fc from 'fast-check';
import { expect, test, vi } from 'vitest';
import { channelText, partsText } from '../model/fixtures';
import { parseFile } from './parse';
import { reparse } from './reparse';
import { FILE } from './testing';

// The property runs long on a busy machine; none asserts a time.
vi.setConfig({ testTimeout: 120_000 });

const commented = channelText.replace(/\n {2}- /g, '\n\n  # the next one\n  - ').replace(/mm$/gm, 'mm # as measured');
const listsAtTheKey = `a:\n- b: 1\n  c: 2 # two\n\n- d: |\n    text\n    more\n\n# aside\n- [1, 2]\ne: "x\n  y"\nf:\n  g: 'z'\n`;
const texts = [
  channelText,
  partsText,
  commented,
  listsAtTheKey,
  channelText.trimEnd(),
  channelText.replaceAll('\n', '\r\n'),
];

const snippets = [
  '',
  '1',
  '.5',
  ' mm',
  'x',
  ':',
  ': 2',
  ' ',
  '  ',
  '\n',
  '\n\n',
  '\n  ',
  '- ',
  '\n  - via: v',
  '{',
  '}',
];
const marks = [
  '{ a: 1 }',
  '[',
  ']',
  '"',
  "'",
  ',',
  '#',
  ' # note',
  '\n# note\n',
  '|',
  '>',
  '\t',
  '&a',
  '*a',
  '!t ',
  '%',
];
const snippet = fc.constantFrom(...snippets, ...marks, '---\n', '...\n', '? ', '<<: { a: 1 }', '\r\n', '\ufeff', '1,5');
const splice = fc.record({
  // Without the bias towards the ends: all places alike.
  at: fc.noBias(fc.nat(99_999)),
  removed: fc.constantFrom(0, 0, 0, 1, 2, 30),
  added: snippet,
});

const spliced = (text: string, { at, removed, added }: { at: number; removed: number; added: string }) => {
  const start = Math.floor((at / 100_000) * text.length);
  return text.slice(0, start) + added + text.slice(start + removed);
};

test('read on from the text before, a text gives what it gives alone', () => {
  let partly = 0;
  fc.assert(
    fc.property(fc.constantFrom(...texts), fc.array(splice, { minLength: 1, maxLength: 6 }), (start, splices) => {
      let before = parseFile(FILE, start);
      for (const each of splices) {
        const text = spliced(before.text, each);
        if (reparse(before, text)) partly++;
        const alone = parseFile(FILE, text);
        // As text, so that the order of keys counts too.
        expect(JSON.stringify(parseFile(FILE, text, undefined, before))).toBe(JSON.stringify(alone));
        if (alone.reports.length === 0) before = alone;
      }
    }),
    { numRuns: 200, seed: 7 },
  );
  expect(partly).toBeGreaterThan(100);
});

test('an edit inside one entry keeps the values of the others', () => {
  const before = parseFile(FILE, channelText);
  const after = parseFile(FILE, channelText.replace(/length: \S+/, 'length: 77'), undefined, before);
  const elements = (parsed: typeof before) => (parsed.value as { path: unknown[] }).path;
  const kept = elements(after).filter((element, i) => element === elements(before)[i]);
  expect(kept.length).toBe(elements(before).length - 1);
});

test('with a name for a value in the text, all of it is read', () => {
  const text = 'a: &x\n  b: 1\nc: *x\n';
  expect(reparse(parseFile(FILE, text), text.replace('1', '2'))).toBeUndefined();
});
