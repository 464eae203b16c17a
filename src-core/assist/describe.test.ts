import { describe, expect, test } from 'vitest';
import { describeAt } from './describe';
import { hintsOf } from './hints';
import { lensesOf } from './lenses';
import { analysed, atCursor, BOARD, HEAD, LANE } from './testing';

const PATH = `path:
  - trace: start
    stackup: board.main
    layer: L1
    length: 20 mm
    width: 180 um
    gap: 200 um
  - via: dive
    stackup: board.main
    drill: 0.2 mm
    antipad: 0.7 mm
    pitch: 0.8 mm
  - trace: run
    stackup: board.main
    layer: L3
    length: 60 mm
    impedance: 100 ohm
    budget: 2 dB @ nyquist
  - connector: mate
    part: board.mate
limits:
  - insertion-loss: whole
    max: 6 dB @ nyquist
`;
const TEXT = HEAD + PATH;

async function hover(marked: string) {
  const { text, offset } = atCursor(TEXT.replace(marked.replace('‸', ''), marked));
  const analysis = await analysed(text);
  const found = describeAt(analysis, LANE, offset);
  return { analysis, markdown: found?.markdown ?? '', token: found && text.slice(found.range.start, found.range.end) };
}

const figure = (analysis: Awaited<ReturnType<typeof analysed>>, element: string, name: string) =>
  analysis.ledger!.rows.find((row) => row.element === element)!.figures.find((one) => one.name === name)!.text;

describe('hover', () => {
  test('an element: what it spends here, in the ledger’s own words, and how much is used so far', async () => {
    const { analysis, markdown, token } = await hover('trace: ru‸n');
    expect(token).toBe('run');
    expect(markdown).toContain(`Own loss at Nyquist | ${figure(analysis, 'run', 'own-loss-at-nyquist')}`);
    expect(markdown).toContain(figure(analysis, 'run', 'impedance'));
    expect(markdown).toContain('of what may be lost');
    expect(markdown).toContain('Budget');
  });
  test('a via: its stub and first resonance', async () => {
    const { analysis, markdown } = await hover('via: di‸ve');
    expect(markdown).toContain(figure(analysis, 'dive', 'first-resonance'));
    expect(markdown).toMatch(/Stub, bottom \| .* mm, notch at .* GHz/);
  });
  test('a length: conversions, what it costs, and how far it may grow', async () => {
    const { markdown, token } = await hover('length: 60‸ mm');
    expect(token).toBe('60 mm');
    expect(markdown).toContain('2.36 in');
    expect(markdown).toMatch(/May grow by about .* mm, to .* mm, until .* is met\./);
  });
  test('growth is right: at that length the limit is just met', async () => {
    const { markdown } = await hover('length: 60‸ mm');
    const [, meters, by] = /to ([\d.]+) mm, until (.*) is met/.exec(markdown) ?? [];
    expect(by).toBeDefined();
    const row = (await analysed(TEXT.replace('length: 60 mm', `length: ${meters} mm`))).ledger!.rows.find(
      ({ element }) => element === 'run',
    )!;
    // The hover shows three digits of the length: half a unit of the third is 0.5 % at most.
    expect(Math.abs(row.budget!.spentDb / row.budget!.allowedDb - 1)).toBeLessThan(0.005);
  });
  test('keys, layers, stackups, parts, limits, the line rate', async () => {
    expect((await hover('anti‸pad: 0.7')).markdown).toContain('Diameter of the clearance');
    expect((await hover('layer: L‸3')).markdown).toContain('signal layer of `main`');
    expect((await hover('stackup: board.ma‸in\n    layer: L1')).markdown).toContain('Signals | `L1` `L3`');
    expect((await hover('part: board.ma‸te')).markdown).toContain('**mate**: part in `board.parts.yaml`');
    expect((await hover('insertion-loss: who‸le')).markdown).toContain('In hand');
    expect((await hover('10 Gb‸/s')).markdown).toContain('Unit interval | 100 ps');
  });
  test('is at most twelve lines everywhere, without HTML, within the text', async () => {
    const analysis = await analysed(TEXT);
    for (let offset = 0; offset <= TEXT.length; offset++) {
      const found = describeAt(analysis, LANE, offset);
      if (!found) continue;
      expect(found.markdown.split('\n').length).toBeLessThanOrEqual(12);
      expect(found.markdown).not.toMatch(/<[a-z/]/i);
      expect(found.range.start).toBeLessThanOrEqual(offset);
      expect(found.range.end).toBeGreaterThanOrEqual(offset);
    }
  });
  test('nothing written in a file becomes markup or a link', async () => {
    const hostile = 'note: "<img src=x onerror=alert(1)> [a](command:x) **b** https://example.invalid `c` | d"';
    const analysis = await analysed(`${TEXT.replace('length: 60 mm', `length: 60 mm\n    ${hostile}`)}`);
    const text = analysis.parsed.get(LANE)!.text;
    const { markdown } = describeAt(analysis, LANE, text.indexOf('trace: run') + 8)!;
    expect(markdown).not.toMatch(/<img|\]\(command|\*\*b\*\*|https:\/\//);
    expect(markdown).toContain('&lt;img');
  });
  test('in a parts file too', async () => {
    const analysis = await analysed(BOARD, {}, 'link', 'board.parts.yaml');
    expect(describeAt(analysis, 'board.parts.yaml', BOARD.indexOf('110 um') + 1)!.markdown).toContain('4.33 mil');
    expect(describeAt(analysis, 'board.parts.yaml', BOARD.indexOf('material: core') + 12)!.markdown).toContain(
      'material in',
    );
  });
});

describe('hints', () => {
  test('loss, stub, what follows from the neighbours, what holds by default', async () => {
    const analysis = await analysed(TEXT);
    const labels = hintsOf(analysis, LANE).map(({ kind, label }) => `${kind}: ${label}`);
    expect(labels).toContain(`loss: ≈ ${figure(analysis, 'run', 'own-loss-at-nyquist')}`);
    expect(labels).toContain('derived: to: L3');
    expect(labels.some((label) => /^stub: ≈ stub 0\.\d+ mm → \d/.test(label))).toBe(true);
    expect(labels.some((label) => label.startsWith('derived: → width '))).toBe(true);
    expect(labels.some((label) => label.startsWith('defaults: NRZ · '))).toBe(true);
  });
  test('only within the range, marked where they are old', async () => {
    const analysis = await analysed(TEXT);
    const start = TEXT.indexOf('  - trace: run');
    const within = hintsOf(analysis, LANE, { start, end: TEXT.indexOf('  - connector') }, true);
    expect(within.map(({ element }) => element)).toEqual(['run', 'run']);
    expect(within[0].label).toMatch(/^~ /);
  });
  test('a double click writes what was derived, and the hint is then gone', async () => {
    const analysis = await analysed(TEXT);
    const hint = hintsOf(analysis, LANE).find(({ label }) => label === 'to: L3')!;
    const { range, text } = hint.insert!;
    const after = TEXT.slice(0, range.start) + text + TEXT.slice(range.end);
    const again = await analysed(after);
    expect(again.findings.filter(({ severity }) => severity === 'error')).toEqual([]);
    expect(hintsOf(again, LANE).map(({ label }) => label)).not.toContain('to: L3');
  });
});

test('the lens has the verdict, marked while the eye is old', async () => {
  const analysis = await analysed(TEXT);
  const [lens] = lensesOf(analysis);
  expect(lens.title).toBe(analysis.verdict.text);
  expect(TEXT.slice(lens.range.start, lens.range.end)).toBe('path');
  expect(lensesOf({ ...analysis, linkIsStale: true })[0].title).toBe(`~ ${analysis.verdict.text}`);
});
