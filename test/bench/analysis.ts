import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { gatherInputs } from '../../src-core/inputs';
import type { FileContent } from '../../src-core/text/types';

/** Milliseconds of `count` cold analyses and of as many one-element edits, each after a warm-up. */
export async function benchAnalysis(
  texts: Readonly<Record<string, string>>,
  variants: readonly string[],
  count: number,
) {
  const inputsOf = (text: string) =>
    gatherInputs(
      {
        read: async (file): Promise<FileContent> =>
          file === 'lane.channel.yaml'
            ? { kind: 'text', text }
            : texts[file] === undefined
              ? { kind: 'missing' }
              : { kind: 'text', text: texts[file] },
      },
      'lane.channel.yaml',
      '2026-12-01',
    );
  const inputs = await Promise.all(variants.map(inputsOf));
  const time = (work: () => void) => {
    const start = performance.now();
    work();
    return performance.now() - start;
  };
  const cold: number[] = [];
  const coldUntilTime: number[] = [];
  for (let i = 0; i < count; i++) {
    coldUntilTime.push(time(() => analyse(inputs[i % inputs.length], undefined, { until: 'time' })));
    cold.push(time(() => analyse(inputs[i % inputs.length], undefined, { until: 'link' })));
  }
  let kept: Analysis = analyse(inputs[0], undefined, { until: 'link' });
  const edit: number[] = [];
  const eye: number[] = [];
  for (let i = 0; i < count; i++) {
    const next = inputs[(i + 1) % inputs.length];
    edit.push(time(() => void (kept = analyse(next, kept, { until: 'time' }))));
    eye.push(time(() => void (kept = analyse(next, kept, { until: 'link' }))));
  }
  const last = analyse(inputs[0], undefined, { until: 'link' });
  return {
    cold,
    coldUntilTime,
    edit,
    eye,
    points: last.networks?.grid.points ?? 0,
    elements: last.model.elements.length,
  };
}
