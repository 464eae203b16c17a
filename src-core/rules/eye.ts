import { quoted } from '../model/reports';
import { limitValue } from './places';
import type { Rule } from './types';

export const eye: Rule = {
  name: 'eye',
  severity: 'error',
  reads: 'link',
  options: {},
  doc: `The eye at the target bit error ratio is smaller than its limit: in height, in width, or in the rhombus between them, which must
lie inside the contour: at the voltage of the threshold, at the phase where it fits best, but at most a quarter of its width from the sampling instant. Equalisers, noise and jitter as declared; nominal values. The ledger and the resonances say what closes it:
loss, a notch, reflections; so do the cursors of the pulse.`,
  bad: 'limits: [{ eye: main, height: 790 mV, width: 0.3 UI }]',
  good: 'limits: [{ eye: main, height: 40 mV, width: 0.3 UI }]',
  *check(judged) {
    for (const outcome of judged.limits) {
      if (outcome.kind !== 'eye' || outcome.met) continue;
      const limit = judged.model.limits.find(({ name }) => name === outcome.name)!;
      const byWidth = outcome.actual.unit === 'UI';
      const shut = judged.link!.eyeHeightVolts <= 0 || judged.link!.eyeWidthUi <= 0;
      const size = shut ? 'is shut' : `is ${outcome.actual.text}`;
      yield {
        at: limitValue(limit, byWidth ? 'width' : 'height'),
        subject: limit.name,
        message: `The eye of ${quoted(limit.name)} ${size}; ${outcome.limit.text} is wanted${outcome.cornersCut ? ', and its corners cut the contour' : ''}.`,
        value: outcome.actual.value,
        worse: 'lower',
        valueText: byWidth ? outcome.actual.text.split(' × ').at(-1) : outcome.actual.text.split(' × ')[0],
      };
    }
  },
};
