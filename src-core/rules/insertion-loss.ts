import { quoted } from '../model/reports';
import type { Limit } from '../model/types';
import { MOST_LOSS_DB, show } from '../quantity/show';
import { spendsMost } from './blame';
import { limitValue, nameOf } from './places';
import type { Rule } from './types';

export const insertionLoss: Rule = {
  name: 'insertion-loss',
  severity: 'error',
  reads: 'cascade',
  options: {},
  doc: `The path, or the part that \`between\` cuts out, loses more than its limit allows, at a frequency or against a mask that is
straight in dB over frequency and judged between its ends. The finding tells the point with the least in hand and, as related place,
what it is made of: a via, stub or capacitor that alone takes as
much as is lacking; else the element with the largest own loss, or, where that one or its owner has a budget, the one that is the most over
its own. Where reflections between the elements take more than any of them, none is named. Nominal values. Shorten that element, use a laminate or foil with less loss, or mend its reflections.`,
  bad: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]',
  good: 'limits: [{ insertion-loss: whole, max: 12 dB @ nyquist }]',
  *check(judged) {
    for (const outcome of judged.limits) {
      if (outcome.kind !== 'insertion-loss' || outcome.met) continue;
      const limit = judged.model.limits.find(({ name }) => name === outcome.name) as Limit<'insertion-loss'>;
      const over = outcome.actual.value - outcome.limit.value;
      const most = spendsMost(judged, limit, {
        spentDb: outcome.actual.value,
        allowedDb: outcome.limit.value,
        atHz: outcome.atHz!,
      });
      // a loss that is only told as a bound has no difference either
      const more = outcome.actual.value > MOST_LOSS_DB ? 'far more' : `${show.loss(over)} more`;
      const where = limit.values.max!.length > 1 ? 'its mask' : 'its limit';
      yield {
        at: limitValue(limit, 'max'),
        subject: limit.name,
        message: `${quoted(limit.name)} loses ${outcome.actual.text} at ${show.frequency(outcome.atHz!)}, ${more} than the ${outcome.limit.text} of ${where}.`,
        value: outcome.actual.value,
        worse: 'higher',
        valueText: outcome.actual.text,
        related: most ? [{ at: nameOf(most.element), message: most.message }] : [],
      };
    }
  },
};
