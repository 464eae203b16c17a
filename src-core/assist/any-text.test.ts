import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { TextRange } from '../text/types';
import { actionsAt, fixAllOf } from './actions';
import { completionsAt } from './completions';
import { describeAt } from './describe';
import { foldsOf } from './folds';
import { hintsOf } from './hints';
import { lensesOf } from './lenses';
import { linksOf } from './links';
import { definitionAt, prepareRename, referencesOf, renameAt } from './names';
import { type OutlineItem, outlineOf } from './outline';
import { selectionAt } from './selection';
import { analysed, HEAD, LANE } from './testing';

const TEXT = `${HEAD}path:
  - trace: start
    stackup: board.main
    layer: L1
    length: 20 mm
    impedance: 100 ohm
  - { via: dive, stackup: board.main, drill: 0.2 mm, antipad: 0.7 mm, pitch: 0.8 mm, backdrill: { bottom: 0.2 mm } }
  - { connector: mate, part: board.mate, includes: [dive] }
limits:
  - insertion-loss: whole
    between: [start, mate]
    max: [2 dB @ 1 GHz, 6 dB @ nyquist]
waivers:
  - { rule: insertion-loss, at: whole, until: 2027-01-01, by: us, reason: "a: b" }
`;

const piece = fc.constantFrom(
  '{',
  '}',
  '[',
  ']',
  ':',
  '- ',
  '\n',
  '\r\n',
  '\t',
  '"',
  "'",
  '#',
  ' ',
  '&a',
  '*a',
  '|',
  '<<: ',
  '__proto__: 1',
  '😀',
  'ü',
  'trace',
  '@',
  '%',
);
const edit = fc.record({ at: fc.double({ min: 0, max: 1, noNaN: true }), remove: fc.nat(20), insert: piece });
const mutated = fc.array(edit, { maxLength: 4 }).map((edits) =>
  edits.reduce((text, { at, remove, insert }) => {
    const start = Math.floor(at * text.length);
    return text.slice(0, start) + insert + text.slice(start + remove);
  }, TEXT),
);
const cut = fc.nat(TEXT.length).map((length) => TEXT.slice(0, length));

/** Everything the editor may ask of one text, at some offsets; each range inside the text. */
async function askAll(text: string, offsets: readonly number[]): Promise<void> {
  const analysis = await analysed(text, {}, 'model');
  const parsed = analysis.parsed.get(LANE)!;
  const inside = ({ start, end }: TextRange) => {
    expect(start).toBeGreaterThanOrEqual(0);
    expect(end).toBeGreaterThanOrEqual(start);
    expect(end).toBeLessThanOrEqual(text.length);
  };
  const outline = (items: readonly OutlineItem[]) =>
    items.forEach(({ range, selection, children }) => {
      inside(range);
      inside(selection);
      expect(selection.start >= range.start && selection.end <= range.end).toBe(true);
      outline(children);
    });
  outline(outlineOf(parsed, analysis));
  for (const { offset, insert } of hintsOf(analysis, LANE)) {
    inside({ start: offset, end: offset });
    if (insert) inside(insert.range);
  }
  for (const { range } of lensesOf(analysis)) inside(range);
  for (const { range } of linksOf(analysis.parsed, LANE)) inside(range);
  for (const { range } of fixAllOf(analysis, LANE)) inside(range);
  const lines = text.split(/\r\n|\r|\n/).length;
  for (const { startLine, endLine } of foldsOf(text)) expect(startLine < endLine && endLine < lines).toBe(true);
  for (const offset of offsets) {
    const described = describeAt(analysis, LANE, offset);
    if (described) inside(described.range);
    for (const { range, also } of await completionsAt(parsed, analysis, offset, {
      list: async () => [],
      library: async () => analysis.parsed,
    })) {
      inside(range);
      for (const edit of also ?? []) inside(edit.range);
    }
    const definition = definitionAt(analysis.parsed, LANE, offset);
    if (definition) inside(definition.origin);
    for (const { file, range } of referencesOf(analysis.parsed, LANE, offset)) if (file === LANE) inside(range);
    for (const range of selectionAt(parsed, offset)) inside(range);
    actionsAt(analysis, LANE, { start: offset, end: offset });
    prepareRename(analysis.parsed, LANE, offset);
    renameAt(analysis.parsed, LANE, offset, 'other');
  }
}

test('no text, however broken, makes a feature throw or point outside', async () => {
  await fc.assert(
    fc.asyncProperty(
      fc.oneof(mutated, cut),
      fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 3, maxLength: 8 }),
      (text, shares) =>
        askAll(
          text,
          shares.map((share) => Math.floor(share * text.length)),
        ),
    ),
    { numRuns: 60, seed: 20261201 },
  );
}, 30000);

test('at every offset of a whole text', async () => {
  await askAll(
    TEXT,
    Array.from({ length: TEXT.length + 1 }, (_, offset) => offset),
  );
}, 30000);
