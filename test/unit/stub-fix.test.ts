import { readFile } from 'node:fs/promises';
import { describe, expect, test } from 'vitest';
import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { gatherInputs } from '../../src-core/inputs';
import type { Fix } from '../../src-core/report';
import { applyEdits, resolveEdits } from '../../src-core/text/edits';
import { rangeOf } from '../../src-core/text/index';
import type { FileContent, FilePath } from '../../src-core/text/types';

const LANE = 'lanes/camera-sled.channel.yaml';
const BOARD = 'boards/sled.parts.yaml';

/** The demo's lane that fails by a via stub, with some of its texts changed. */
async function analyseLane(change: (text: string, file: FilePath) => string = (text) => text): Promise<Analysis> {
  const read = async (file: FilePath): Promise<FileContent> => {
    try {
      const text = await readFile(new URL(`../../examples/${file}`, import.meta.url), 'utf8');
      return { kind: 'text', text: change(text, file) };
    } catch {
      return { kind: 'missing' };
    }
  };
  return analyse(await gatherInputs({ read }, LANE, '2026-12-01'), undefined, { until: 'link' });
}

const applied = (analysis: Analysis, fix: Fix) => (text: string, file: FilePath) =>
  file === LANE ? applyEdits(text, resolveEdits(fix.edits, analysis.parsed)) : text;

const figure = ({ figures }: Analysis, name: string) => figures.find((one) => one.name === name);
const ofStubs = ({ findings }: Analysis) => findings.filter(({ rule }) => rule === 'stub-resonance');

describe('the example that fails by a via stub', () => {
  test('names it once, on the lines of the via, as an error', async () => {
    const analysis = await analyseLane();
    const [finding, ...others] = ofStubs(analysis);
    expect(others).toEqual([]);
    expect(finding).toMatchObject({ subject: 'dive', severity: 'error' });
    const parsed = analysis.parsed.get(LANE)!;
    const entry = rangeOf(parsed, { file: LANE, path: ['path', 2], on: 'entry' });
    const { start, end } = rangeOf(parsed, finding.at);
    expect(start).toBeGreaterThanOrEqual(entry.start);
    expect(end).toBeLessThanOrEqual(entry.end);
    expect(analysis.findings.some(({ severity, waivedBy }) => severity === 'error' && !waivedBy)).toBe(true);
  });

  test.each([0, 1])('fix %d does to the response what its title says, and nothing comes back', async (index) => {
    const before = await analyseLane();
    const fix = ofStubs(before)[0].fixes![index];
    const { title } = fix.resolve!();
    const after = await analyseLane(applied(before, fix));
    expect(ofStubs(after)).toEqual([]);

    // the notch of the response itself: named for this via before, at no lower frequency afterwards
    const notch = before.cascade!.resonances.find(({ elements }) => elements.includes('dive'))!;
    expect(title).toContain(`notch from ${(notch.frequencyHz / 1e9).toFixed(1)} GHz`);
    const lowest = after.cascade!.resonances.find(({ elements }) => elements.includes('dive'));
    expect(lowest?.frequencyHz ?? Number.POSITIVE_INFINITY).toBeGreaterThan(1.2 * notch.frequencyHz);

    for (const [name, words] of [
      ['insertion-loss-at-nyquist', 'loss at Nyquist'],
      ['eye-height', 'eye height'],
      ['eye-width', 'eye width'],
    ]) {
      expect(title).toContain(`${words} from ${figure(before, name)!.text} to ${figure(after, name)!.text}`);
    }
    expect(figure(after, 'eye-height')!.value).toBeGreaterThan(figure(before, 'eye-height')!.value);
    expect(after.findings.filter(({ rule }) => !before.findings.some((one) => one.rule === rule))).toEqual([]);
  });

  test('drilled to be harmless, or on a thin board, no stub is named', async () => {
    const drilled = await analyseLane((text, file) =>
      file === LANE ? text.replace(/(- via: dive\n)/, '$1    backdrill: { bottom: 0.3 mm ± 0.1 mm }\n') : text,
    );
    expect(ofStubs(drilled)).toEqual([]);
    expect(drilled.findings.filter(({ rule }) => rule === 'schema')).toEqual([]);
  });

  test('a copy that fails by a lossy trace blames the trace, not the harmless stub', async () => {
    const lossy = await analyseLane((text, file) => {
      if (file === BOARD) return text.replace(/df: 0\.\d+/g, 'df: 0.045');
      if (file !== LANE) return text;
      return text
        .replace(/(- via: dive\n)/, '$1    backdrill: { bottom: 0.3 mm ± 0.1 mm }\n')
        .replace(/max: \d+ dB/, 'max: 12 dB');
    });
    expect(ofStubs(lossy)).toEqual([]);
    const loss = lossy.findings.find(({ rule }) => rule === 'insertion-loss')!;
    expect(loss.related![0].message).toMatch(/^`main-run` spends [\d.]+ dB of [\d.]+ dB, /);
    const words = lossy.findings.flatMap(({ message, related = [] }) => [
      message,
      ...related.map((one) => one.message),
    ]);
    expect(words.filter((message) => message.includes('`dive`') || message.includes('`rise`'))).toEqual([]);
  });
});
