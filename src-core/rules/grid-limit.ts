import { show } from '../quantity/show';
import type { Rule } from './types';

export const gridLimit: Rule<{ percent: number }> = {
  name: 'grid-limit',
  severity: 'warning',
  reads: 'networks',
  options: { percent: 0.2 },
  doc: `The response rings for so long that 16,384 points of frequency do not hold it: what is left at the end of the time window folds
back onto its beginning. The finding tells, where it is more than \`percent\`, the share of the main cursor that may be wrong. Mostly a very long path with almost no loss
and a strong reflection at both ends; a file with resonances that hardly decay does it too.`,
  bad: 'path: [{ cable: tail, length: 90 m, impedance: 85 ohm, delay: 6 ns/m, loss: 0.01 dB/m @ 5 GHz }]',
  good: 'path: [{ cable: tail, length: 0.3 m, impedance: 100 ohm, delay: 4 ns/m, loss: 1 dB/m @ 5 GHz }]',
  *check({ model, networks, cascade }, { percent }) {
    const error = cascade?.remainingError;
    if (error === undefined || error <= percent / 100) return;
    yield {
      at: { file: model.file, path: ['path'], on: 'key' },
      message: `The response does not decay within the ${show.count(networks!.grid.points, 'point')} of the grid: cursors may be wrong by ${show.percent(error)} of the main one.`,
      value: error,
      worse: 'higher',
      valueText: show.percent(error),
    };
  },
};
