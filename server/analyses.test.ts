import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { AnalyseOptions, Analysis, Inputs } from '../src-core/analysis';
import type { FilePath } from '../src-core/text/types';
import { type AnalysesParts, keepAnalyses } from './analyses';
import type { Located } from './roots';

const ROOT = { uri: 'file:///r', key: 'file:///r' };
const at = (file: FilePath): Located => ({ root: ROOT, file });

/** Analyses whose “figure” is the texts that they read; files, and what is read beside them, as a test says. */
function harness(uses: Readonly<Record<FilePath, readonly FilePath[]>> = {}) {
  const texts = new Map<FilePath, string>();
  const runs: string[] = [];
  const announced: string[] = [];
  let gate: Promise<void> = Promise.resolve();
  const parts: AnalysesParts = {
    analyse: (inputs: Inputs, _previous: Analysis | undefined, { until }: AnalyseOptions) => {
      const read = [...inputs.files]
        .map(([file, content]) => `${file}=${content.kind === 'text' ? content.text : ''}`)
        .join(' ');
      runs.push(`${until} ${read}`);
      if (read.includes('poison')) throw new Error('poisoned');
      return { inputs, read, until, computed: { model: 1 } } as unknown as Analysis;
    },
    gather: async (_files, file, today) => {
      await gate;
      return {
        file,
        files: new Map([file, ...(uses[file] ?? [])].map((one) => [one, { kind: 'text', text: texts.get(one) ?? '' }])),
        today,
      };
    },
    filesOf: () => ({ read: async () => ({ kind: 'missing' }) }),
    today: () => '2026-12-01',
    now: () => 0,
    pause: () => new Promise((resolve) => setTimeout(resolve, 0)),
    announce: async ({ file }, running) => void announced.push(`${running ? 'begin' : 'end'} ${file}`),
    failed: () => undefined,
  };
  const analyses = keepAnalyses(parts);
  const edit = (file: FilePath, text: string) => {
    texts.set(file, text);
    analyses.changed(at(file), 1_000_000);
  };
  const read = (analysis: Analysis | undefined) => (analysis as unknown as { read: string } | undefined)?.read;
  return { analyses, texts, runs, announced, edit, read, hold: (until: Promise<void>) => void (gate = until) };
}

describe('what is asked for is answered from the newest text', () => {
  test('also if the text changes while files are read', async () => {
    const { analyses, edit, read, hold, texts } = harness();
    texts.set('a', '1');
    analyses.open(at('a'));
    let release = () => {};
    hold(new Promise((resolve) => void (release = resolve)));
    const asked = analyses.current(at('a'));
    edit('a', '2');
    release();
    expect(read(await asked)).toBe('a=2');
    analyses.close(at('a'));
  });
  test('an edit of a file that another uses renews that one', async () => {
    const { analyses, edit, read } = harness({ lane: ['board'] });
    analyses.open(at('lane'));
    await analyses.current(at('lane'));
    edit('board', 'new');
    expect(read(await analyses.current(at('lane')))).toBe('lane= board=new');
    analyses.close(at('lane'));
  });
  test('a text that did not change is not analysed again', async () => {
    const { analyses, runs } = harness();
    analyses.open(at('a'));
    await analyses.current(at('a'), undefined, 'link');
    const count = runs.length;
    await Promise.all([analyses.current(at('a')), analyses.current(at('a'), undefined, 'link')]);
    expect(runs).toHaveLength(count);
    analyses.close(at('a'));
  });
  test('whatever the order of edits and questions', async () => {
    const step = fc.record({
      file: fc.constantFrom('lane', 'board', 'other'),
      text: fc.string({ maxLength: 3 }),
      ask: fc.constantFrom('lane', 'other', undefined),
      until: fc.constantFrom('time' as const, 'link' as const),
    });
    await fc.assert(
      fc.asyncProperty(fc.array(step, { maxLength: 12 }), async (steps) => {
        const { analyses, edit, read, texts } = harness({ lane: ['board'] });
        analyses.open(at('lane'));
        analyses.open(at('other'));
        const answers: Promise<void>[] = [];
        for (const { file, text, ask, until } of steps) {
          edit(file, text);
          if (ask) answers.push(analyses.current(at(ask), undefined, until).then(() => undefined));
        }
        await Promise.all(answers);
        expect(read(await analyses.current(at('lane'), undefined, 'link'))).toBe(
          `lane=${texts.get('lane') ?? ''} board=${texts.get('board') ?? ''}`,
        );
        expect(read(await analyses.current(at('other')))).toBe(`other=${texts.get('other') ?? ''}`);
        analyses.close(at('lane'));
        analyses.close(at('other'));
      }),
      { numRuns: 50 },
    );
  });
});

test('a cancelled question ends between two stages', async () => {
  const { analyses, runs } = harness();
  analyses.open(at('a'));
  const token = { isCancellationRequested: false, onCancellationRequested: () => ({ dispose: () => undefined }) };
  const asked = analyses.current(at('a'), token, 'link');
  token.isCancellationRequested = true;
  await expect(asked).rejects.toMatchObject({ code: -32800 });
  expect(runs.length).toBeLessThanOrEqual(3);
  analyses.close(at('a'));
});

test('an analysis that throws is told, and the next text is analysed as ever', async () => {
  const { analyses, edit, read } = harness();
  analyses.open(at('a'));
  edit('a', 'poison');
  expect(await analyses.current(at('a'))).toBeUndefined();
  expect(analyses.failure(at('a'))).toBe('poisoned');
  edit('a', 'well');
  expect(read(await analyses.current(at('a')))).toBe('a=well');
  expect(analyses.failure(at('a'))).toBeUndefined();
  analyses.close(at('a'));
});

test('each piece of work is announced before it begins and after it ended', async () => {
  const { analyses, announced } = harness();
  analyses.open(at('a'));
  await analyses.current(at('a'), undefined, 'link');
  expect(announced.length).toBeGreaterThan(0);
  expect(announced).toEqual(announced.map((_, index) => (index % 2 === 0 ? 'begin a' : 'end a')));
  analyses.close(at('a'));
});
