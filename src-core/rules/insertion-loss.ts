import { quoted } from '../model/reports';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
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
the element that spends the most over its fair share: its budget, else its part by delay of its
owner's budget, else its part by delay of the allowed loss. Nominal values. Shorten that element, use a laminate or foil with less loss, or mend its reflections.`,
  bad: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]',
  good: 'limits: [{ insertion-loss: whole, max: 12 dB @ nyquist }]',
  *check(judged) {
    for (const outcome of judged.limits) {
      if (outcome.kind !== 'insertion-loss' || outcome.met) continue;
      const limit = judged.model.limits.find(({ name }) => name === outcome.name) as Limit<'insertion-loss'>;
      const over = outcome.actual.value - outcome.limit.value;
      const most = spendsMost(judged, limit, outcome.limit.value, outcome.atHz!);
      const where = limit.values.max!.length > 1 ? 'its mask' : 'its limit';
      yield {
        at: limitValue(limit, 'max'),
        subject: limit.name,
        message: `${quoted(limit.name)} loses ${outcome.actual.text} at ${show.frequency(outcome.atHz!)}, ${show.loss(over)} more than the ${outcome.limit.text} of ${where}.`,
        value: outcome.actual.value,
        worse: 'higher',
        valueText: outcome.actual.text,
        related: most ? [{ at: nameOf(most.element), message: most.message }] : [],
      };
    }
  },
};
