import { returnLossAt } from '../figures/measures';
import { quoted } from '../model/reports';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Related } from '../report';
import { elementsWithin } from './blame';
import { limitValue, nameOf } from './places';
import type { Judged, Rule } from './types';

/** The element that reflects the most by itself where the whole does its worst. */
function reflectsMost(judged: Judged, limit: Limit, atHz: number): readonly Related[] {
  const grid = judged.networks!.grid;
  if (atHz > grid.stepHz * (grid.points - 1)) return []; // the elements' own networks end there
  const reflections = elementsWithin(judged, limit).map(({ element, network }) => ({
    element,
    lossDb: Math.min(
      ...(['transmitter', 'receiver'] as const).map((end) => returnLossAt(network.differential, grid, end, atHz)),
    ),
  }));
  if (reflections.length === 0) return [];
  const { element, lossDb } = reflections.reduce((a, b) => (b.lossDb < a.lossDb ? b : a));
  return [
    {
      at: nameOf(element),
      message: `${quoted(element.name)} reflects the most there: ${show.returnLoss(lossDb)} of return loss by itself.`,
    },
  ];
}

export const returnLoss: Rule = {
  name: 'return-loss',
  severity: 'error',
  reads: 'cascade',
  options: {},
  doc: `Less return loss than the limit wants, somewhere in its band, seen from its end (both where it names none) into the path
matched in the reference impedance. The finding tells the worst point; its related place is the element that reflects the most there by
itself. Nominal values. Bring that element's impedance nearer to the reference, or shorten what stands between two reflections.`,
  bad: 'path: [{ package: chip, length: 10 mm, impedance: 80 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }]\nlimits: [{ return-loss: match, band: 50 MHz to 5 GHz, min: 16 dB }]',
  good: 'limits: [{ return-loss: match, band: 50 MHz to 5 GHz, min: 10 dB }]',
  *check(judged) {
    for (const outcome of judged.limits) {
      if (outcome.kind !== 'return-loss' || outcome.met) continue;
      const limit = judged.model.limits.find(({ name }) => name === outcome.name)!;
      yield {
        at: limitValue(limit, 'min'),
        subject: limit.name,
        message: `${quoted(limit.name)} has ${outcome.actual.text} of return loss ${outcome.actual.note}, less than the ${outcome.limit.text} of its limit.`,
        value: outcome.actual.value,
        worse: 'lower',
        valueText: outcome.actual.text,
        related: reflectsMost(judged, limit, outcome.atHz!),
      };
    }
  },
};
