import { show } from '../quantity/show';
import type { Fix } from '../report';
import type { Rule } from './types';

/** Six digits are more than any register of taps has: noise of the sum's last bits is no finding. */
const ROUNDING = 1e-6;

export const tapSum: Rule = {
  name: 'tap-sum',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `The magnitudes of the transmitter's taps add up to more than 1: some pattern would drive more than the declared \`swing\`, which a
driver limited by its peak cannot. Taps multiply the swing as written, so the computed eye would be too large. Lower the main tap, or
declare the swing that the driver really has.`,
  bad: 'transmitter: { swing: 800 mV, rise-time: 20 ps, ffe: { main: 0.95, post: [-0.1] } }',
  good: 'transmitter: { swing: 800 mV, rise-time: 20 ps, ffe: { main: 0.9, post: [-0.1] } }',
  *check({ model: { transmitter } }) {
    if (!transmitter) return;
    const sum = transmitter.taps.reduce((total, tap) => total + Math.abs(tap), 0);
    if (sum <= 1 + ROUNDING) return;
    const ffe = { ...transmitter.place, path: [...transmitter.place.path, 'ffe'] };
    const main = Number((1 - (sum - Math.abs(transmitter.taps[transmitter.mainTap]))).toFixed(6));
    const fixes: Fix[] =
      main > 0
        ? [{ title: `Lower the main tap to ${main}`, edits: [{ op: 'set', at: ffe, key: 'main', text: String(main) }] }]
        : [];
    yield {
      at: ffe,
      subject: 'transmitter',
      message: `The taps' magnitudes add up to ${show.ratio(sum)}, more than 1: some pattern would drive more than the swing.`,
      value: sum,
      worse: 'higher',
      valueText: show.ratio(sum),
      fixes,
    };
  },
};
