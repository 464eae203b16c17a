import { droopOf } from '../link/droop';
import { quoted } from '../model/reports';
import type { AnyElement, Element, Model } from '../model/types';
import { show } from '../quantity/show';
import type { Fix } from '../report';
import { keyOf } from './places';
import type { Rule } from './types';
import { changed, modelWith } from './what-if';

type Capacitor = Element<'capacitor'>;

const capacitance = (element: AnyElement) => (element as Capacitor).values.value;

/** The channel with each capacitor at one end of its tolerance. */
const atEnd = (model: Model, end: (value: NonNullable<Capacitor['values']['value']>) => number): Model => ({
  ...model,
  elements: model.elements.map((element) => {
    const value = element.kind === 'capacitor' ? capacitance(element) : undefined;
    return value ? changed(element, { value: { ...value, value: end(value) } }) : element;
  }),
});

const lowest = (model: Model) => droopOf(atEnd(model, ({ value, minus }) => value - minus));
const highest = (model: Model) => droopOf(atEnd(model, ({ value, plus }) => value + plus));

/** The next larger value of the E3 series with which the droop is allowed. */
function larger(model: Model, capacitor: AnyElement, share: number): { value: number; share: number } | undefined {
  const { minus, value: nominal } = capacitance(capacitor)!;
  for (let decade = Math.floor(Math.log10(nominal)); decade < 0; decade++) {
    for (const digits of [1, 2.2, 4.7]) {
      const value = Number(`${digits}e${decade}`);
      if (value <= nominal) continue;
      const larger = changed(capacitor, {
        value: { ...capacitance(capacitor)!, value, minus: (minus / nominal) * value },
      });
      const after = lowest(modelWith(model, larger))!.share;
      if (after <= share) return { value, share: after };
    }
  }
  return undefined;
}

function fixesFor(model: Model, capacitor: AnyElement, share: number): readonly Fix[] {
  const fits = larger(model, capacitor, share);
  if (!fits) return [];
  const tolerance = /\s*(?:±|\+).*$/.exec(capacitance(capacitor)!.text)?.[0] ?? '';
  // An absolute tolerance belongs to the value that it was written for.
  const text = show.capacitance(fits.value) + (tolerance.includes('%') ? tolerance : '');
  const title = `Use ${show.capacitance(fits.value)}: ${show.percent(fits.share)} of droop`;
  return [{ title, edits: [{ op: 'set', at: capacitor.place, key: 'value', text }] }];
}

export const droop: Rule<{ percent: number }> = {
  name: 'droop',
  severity: 'warning',
  reads: 'model',
  options: { percent: 1 },
  doc: `The series capacitors let a run of equal symbols sag, over the longest run of the coding (8b10b 5; scrambled the run met once in
1/target-ber bits), by more than \`percent\` of the level, at the lower end of their tolerance. Closed form, 1 − e^(−t/RC), with R the
leg's two terminations in series. It is named at the smallest capacitor. Take a larger one, or a coding with a shorter run. The share is
common practice.`,
  bad: 'path: [{ capacitor: coupling, value: 2.2 nF }]',
  good: 'path: [{ capacitor: coupling, value: 10 nF }]',
  *check({ model }, { percent }) {
    const worst = lowest(model);
    if (!worst || worst.share <= percent / 100) return;
    const best = highest(model)!.share;
    const capacitors = model.elements.filter(({ name }) => worst.capacitors.includes(name));
    const smallest = capacitors.reduce((a, b) => (capacitance(b)!.value < capacitance(a)!.value ? b : a));
    const also =
      best < worst.share ? ` at the lower end of its tolerance (${show.percent(best)} at the upper one)` : '';
    yield {
      at: keyOf(smallest, 'value'),
      subject: smallest.name,
      message: `${quoted(smallest.name)} lets ${model.longestRun} equal bits sag by ${show.percent(worst.share)}${also}, more than ${show.percent(percent / 100)}.`,
      value: worst.share,
      worse: 'higher',
      valueText: show.percent(worst.share),
      fixes: fixesFor(model, smallest, percent / 100),
    };
  },
};
