import { quoted } from '../model/reports';
import { show } from '../quantity/show';
import type { Related } from '../report';
import { limitValue } from './places';
import type { Judged, Rule } from './types';

export const eye: Rule = {
  name: 'eye',
  severity: 'error',
  reads: 'link',
  options: {},
  doc: `The eye at the target bit error ratio is smaller than its limit: in height, in width, or in the rhombus between them, which must
lie inside the contour: at the voltage of the threshold, at the phase where it fits best, but at most a quarter of its width from the sampling instant. Equalisers, noise and jitter as declared; nominal values. The finding tells, as related place, the
largest cursor that the equalisers leave and what all of them make together; no element is named, since which one makes a cursor is not computed.
The ledger and the resonances say what closes the eye: loss, a notch, reflections.`,
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
        related: interference(judged),
        valueText: byWidth ? outcome.actual.text.split(' × ').at(-1) : outcome.actual.text.split(' × ')[0],
      };
    }
  },
};

/** What symbols do to their neighbours behind all equalisers, at the receiver. */
function interference({ link, model }: Judged): Related[] {
  if (!link || !model.receiver || link.mainCursorVolts <= 0) return [];
  const { cursors, precursors, dfeTaps, mainCursorVolts } = link;
  const left = Array.from(cursors, (volts, i) => ({
    ui: i - precursors,
    volts: volts - (dfeTaps[i - precursors - 1] ?? 0),
  }));
  const others = left.filter(({ ui }) => ui !== 0);
  if (others.length === 0) return [];
  const most = others.reduce((a, b) => (Math.abs(b.volts) > Math.abs(a.volts) ? b : a));
  const where = `${show.unitIntervals(Math.abs(most.ui))} ${most.ui < 0 ? 'before' : 'after'} it`;
  const sum = others.reduce((total, { volts }) => total + Math.abs(volts), 0);
  const largest = `the largest cursor is ${show.percent(most.volts / mainCursorVolts)} of the main one, ${where}`;
  const message = `Behind the equalisers ${largest}; all together they are ${show.percent(sum / mainCursorVolts)} of it.`;
  return [{ at: { ...model.receiver.place, on: 'key' }, message }];
}
