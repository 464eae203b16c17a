import { analyse } from '../../src-core/analyse';
import type { Analysis } from '../../src-core/analysis';
import { gatherInputs } from '../../src-core/inputs';
import type { FileContent, FilePath } from '../../src-core/text/types';

/**
 * Milliseconds from texts to results, gathering included: of a channel never seen (cold), and after an edit of one element.
 * Ten of one and ten of the other in turn, so that what else the machine does weighs on both.
 *
 * Cold is a first analysis, of files in a folder of its own: no text, value, network, product or pulse of before is found. What a
 * process keeps for good is there: compiled code, the tables of Fourier transforms by their length, schemas and units.
 */
export async function benchAnalysis(boardText: string, variants: readonly string[], count: number) {
  const gather = (folder: string, text: string, before?: Analysis) => {
    const read = async (path: FilePath): Promise<FileContent> => {
      if (path === `${folder}/lane.channel.yaml`) return { kind: 'text', text };
      return path === `${folder}/board.parts.yaml` ? { kind: 'text', text: boardText } : { kind: 'missing' };
    };
    return gatherInputs({ read }, `${folder}/lane.channel.yaml`, '2026-12-01', before?.inputs, before?.parsed);
  };
  let folders = 0;
  const cold = async (text: string, until: 'model' | 'time' | 'link') =>
    analyse(await gather(`cold-${++folders}`, text), undefined, { until });
  const times = {
    cold: [] as number[],
    coldUntilModel: [] as number[],
    coldUntilTime: [] as number[],
    edit: [] as number[],
    eye: [] as number[],
  };
  const time = async <T>(name: keyof typeof times, work: () => T | Promise<T>) => {
    const start = performance.now();
    const result = await work();
    times[name].push(performance.now() - start);
    return result;
  };
  let kept = await cold(variants[0], 'link');
  const folder = kept.inputs.file.slice(0, kept.inputs.file.indexOf('/'));
  for (let i = 0; i < count; i++) {
    const text = variants[(i + 1) % variants.length];
    if (i % 20 < 10) {
      await time('coldUntilModel', () => cold(text, 'model'));
      await time('coldUntilTime', () => cold(text, 'time'));
      await time('cold', () => cold(text, 'link'));
    } else {
      const before = kept;
      kept = await time('edit', async () => analyse(await gather(folder, text, before), before, { until: 'time' }));
      kept = await time('eye', () => analyse(kept.inputs, kept, { until: 'link' }));
    }
  }
  return { ...times, points: kept.networks?.grid.points ?? 0, elements: kept.model.elements.length };
}
