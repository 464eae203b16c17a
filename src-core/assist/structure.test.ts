import { describe, expect, test } from 'vitest';
import { actionsAt, editsOfFix, fixAllOf, placeKey } from './actions';
import { foldsOf } from './folds';
import { linksOf } from './links';
import { elementAt, outlineOf } from './outline';
import { selectionAt } from './selection';
import { analysed, atCursor, HEAD, LANE } from './testing';

const TEXT = `${HEAD}path:
  - trace: start
    stackup: board.main
    layer: L1
    lenght: 20 mm
    impedance: 100 ohm
  - connector: mate
    part: board.mate
`;

test('the outline has sections, elements with figures, and ranges that hold each other', async () => {
  const analysis = await analysed(TEXT.replace('lenght', 'length'));
  const outline = outlineOf(analysis.parsed.get(LANE)!, analysis);
  expect(outline.map(({ name }) => name)).toEqual(['lanewright', 'line-rate', 'use', 'path']);
  const path = outline[3];
  expect(path.detail).toBe(analysis.verdict.text);
  expect(path.children.map(({ name }) => name)).toEqual(['start', 'mate']);
  expect(path.children[0].detail).toMatch(/^trace · .* dB · .* ohm$/);
  for (const { range, selection } of path.children) {
    expect(range.start).toBeLessThanOrEqual(selection.start);
    expect(range.end).toBeGreaterThanOrEqual(selection.end);
  }
  const { text } = analysis.parsed.get(LANE)!;
  expect(elementAt(analysis, text.indexOf('board.mate'))).toBe('mate');
  const lineOfMate = text.lastIndexOf('\n', text.indexOf('board.mate') - 1) + 1;
  const firstLine = text.lastIndexOf('\n', text.lastIndexOf('- ', lineOfMate + 4)) + 1;
  expect(elementAt(analysis, firstLine), 'at the start of its first line').toBe('mate');
});

test('folds follow the indentation, comments and regions', () => {
  expect(foldsOf('# a\n# b\npath:\n- trace: a\n  length: 1\n- via: b\n# region x\nlimits: []\n# endregion\n')).toEqual([
    { startLine: 0, endLine: 1, kind: 'comment' },
    { startLine: 2, endLine: 5 },
    { startLine: 3, endLine: 4 },
    { startLine: 6, endLine: 8, kind: 'region' },
  ]);
});

test('a selection grows from the value to the file', async () => {
  const { text, offset } = atCursor(TEXT.replace('100 ohm', '100 o‸hm'));
  const parsed = (await analysed(text, {}, 'model')).parsed.get(LANE)!;
  const pieces = selectionAt(parsed, offset).map(({ start, end }) => text.slice(start, end));
  expect(pieces[0]).toBe('100 ohm');
  expect(pieces[1]).toBe('impedance: 100 ohm');
  expect(pieces[2]).toMatch(/^- trace: start/);
  expect(pieces.at(-1)).toBe(text);
});

test('links lead to files below the root and nowhere else', async () => {
  const { parsed } = await analysed(
    TEXT.replace(
      'board: board.parts.yaml',
      'board: board.parts.yaml\n  out: ../../x.parts.yaml\n  abs: /etc/x.parts.yaml',
    ),
  );
  expect(linksOf(parsed, LANE).map(({ target }) => target)).toEqual(['board.parts.yaml']);
});

describe('actions', () => {
  test('a misspelt key has a preferred fix, whose edit is found when it is wanted', async () => {
    const analysis = await analysed(TEXT);
    const at = TEXT.indexOf('lenght');
    const fix = actionsAt(analysis, LANE, { start: at, end: at }).find(({ kind }) => kind === 'fix')!;
    expect(fix).toMatchObject({ preferred: true });
    const [edit] = editsOfFix(analysis, fix.finding.rule, fix.title, placeKey(fix.finding));
    expect(TEXT.slice(0, edit.range.start) + edit.text + TEXT.slice(edit.range.end)).toBe(
      TEXT.replace('lenght', 'length'),
    );
  });
  test('fix all takes the safe ones', async () => {
    const edits = fixAllOf(await analysed(TEXT), LANE);
    const fixed = [...edits]
      .sort((a, b) => b.range.start - a.range.start)
      .reduce((text, { range, text: by }) => text.slice(0, range.start) + by + text.slice(range.end), TEXT);
    expect(fixed).toBe(TEXT.replace('lenght', 'length'));
  });
  test('what a rule judged can be accepted, what is misspelt cannot', async () => {
    const limits = 'limits:\n  - insertion-loss: whole\n    max: 3 dB @ nyquist\n';
    const lossy = `${TEXT.replace('lenght: 20 mm', 'length: 900 mm')}${limits}`;
    const accepted = actionsAt(await analysed(lossy), LANE, { start: 0, end: lossy.length });
    expect(accepted.some(({ kind, finding }) => kind === 'accept' && finding.rule === 'insertion-loss')).toBe(true);
    const misspelt = actionsAt(await analysed(TEXT), LANE, { start: 0, end: TEXT.length });
    const refused = misspelt.find(({ kind, finding }) => kind === 'accept' && finding.rule === 'schema');
    expect(refused).toMatchObject({ refused: expect.stringContaining('mended') });
  });
});
