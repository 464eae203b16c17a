import type { Element, Model } from '../model/types';
import { show } from '../quantity/show';
import { keyOf } from './places';
import type { Fix, Rule } from './types';

/** What the capacitor of one leg sees: the leg's share of both terminations in series. */
function legOhms({ transmitter, receiver, referenceOhms, signalling }: Model): number {
  const both = (transmitter?.impedanceOhms ?? referenceOhms) + (receiver?.impedanceOhms ?? referenceOhms);
  return signalling === 'single-ended' ? both : both / 2;
}

/** Share of the level that is lost over a run of equal symbols: 1 - e^(-t/RC). */
const droopOf = (farads: number, ohms: number, seconds: number) => -Math.expm1(-seconds / (ohms * farads));

/** The next larger value of the E3 series that keeps the droop, as it is written. */
function larger(farads: number, ohms: number, seconds: number, most: number) {
  const least = seconds / (-Math.log1p(-most) * ohms);
  for (let decade = Math.floor(Math.log10(farads)); decade < 0; decade++) {
    for (const digits of [1, 2.2, 4.7]) {
      const value = digits * 10 ** decade;
      if (value >= least && value > farads) return value;
    }
  }
  return undefined;
}

export const droop: Rule<{ percent: number }> = {
  name: 'droop',
  severity: 'warning',
  reads: 'model',
  options: { percent: 1 },
  doc: `A series capacitor lets a run of equal symbols sag: over the longest run of the coding (8b10b 5; scrambled the run met once in
1/target-ber bits) by more than \`percent\` of the level, at the lower end of the capacitor's tolerance. Closed form, 1 − e^(−t/RC), with
R the leg's two terminations in series. Take a larger capacitor or a coding with a shorter run. The share is common practice.`,
  bad: 'path: [{ capacitor: coupling, value: 2.2 nF }]',
  good: 'path: [{ capacitor: coupling, value: 10 nF }]',
  *check({ model }, { percent }) {
    const seconds = model.longestRun / model.symbolRate;
    const ohms = legOhms(model);
    for (const element of model.elements) {
      const value = element.kind === 'capacitor' ? (element as Element<'capacitor'>).values.value : undefined;
      if (!value || element.file || element.incomplete) continue;
      const [least, most] = [value.value - value.minus, value.value + value.plus];
      const worst = droopOf(least, ohms, seconds);
      if (worst <= percent / 100) continue;
      const best =
        most > least ? ` (${show.percent(droopOf(most, ohms, seconds))} at the upper end of its tolerance)` : '';
      const fits = larger(value.value, ohms, seconds, percent / 100);
      const fixes: Fix[] =
        fits === undefined
          ? []
          : [
              {
                title: `Use ${show.capacitance(fits)}: ${show.percent(droopOf(fits, ohms, seconds))} of droop`,
                edits: [{ op: 'set', at: element.place, key: 'value', text: show.capacitance(fits) }],
              },
            ];
      yield {
        at: keyOf(element, 'value'),
        subject: element.name,
        message: `\`${element.name}\` (${show.capacitance(least)}) sags by ${show.percent(worst)} over ${model.longestRun} equal bits${best}, more than ${show.percent(percent / 100)}.`,
        value: worst,
        worse: 'higher',
        valueText: show.percent(worst),
        fixes,
      };
    }
  },
};
