import { quoted } from '../model/reports';
import { show } from '../quantity/show';
import { keyOf } from './places';
import type { Rule } from './types';

export const skew: Rule<{ percent: number }> = {
  name: 'skew',
  severity: 'warning',
  reads: 'networks',
  options: { percent: 20 },
  doc: `The legs of the pair differ in delay, summed along the path, by more than \`percent\` of a unit interval. Skew turns the signal into
common mode: at Nyquist, a tenth of a unit interval converts a sixth of it, a fifth a third. It is named at the element that adds the most.
Nominal values. Match the legs where they part, near the bend or the connector. The share is common practice.`,
  bad: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, skew: 21 ps }]',
  good: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, skew: 19 ps }]',
  *check({ model, networks }, { percent }) {
    const skews = networks!.elements.map(({ element, prepared }) => ({
      element,
      seconds: prepared?.facts.skewSeconds ?? 0,
    }));
    const sum = skews.reduce((total, { seconds }) => total + seconds, 0);
    const share = Math.abs(sum) / model.unitInterval;
    if (share <= (percent / 100) * (1 + 1e-9)) return;
    const most = skews.reduce((a, b) => (b.seconds * Math.sign(sum) > a.seconds * Math.sign(sum) ? b : a));
    yield {
      at: keyOf(most.element, 'skew'),
      subject: most.element.name,
      message: `The legs differ by ${show.time(Math.abs(sum))}, ${show.percent(share)} of a unit interval (${show.time(model.unitInterval)}), more than ${show.percent(percent / 100)}; most of it comes from ${quoted(most.element.name)}.`,
      value: Math.abs(sum),
      worse: 'higher',
      valueText: show.time(Math.abs(sum)),
    };
  },
};
