import { quoted } from '../model/reports';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import { keyOf, nameOf } from './places';
import type { Rule } from './types';

/** Elements long enough to have an impedance of their own; what joins them is passed over. */
const HAVE_LENGTH = new Set(['package', 'trace', 'cable', 'connector']);

const rangeOf = ({ prepared }: ElementNetwork): readonly [number, number] | undefined => {
  const nominal = prepared?.facts.impedanceOhms;
  return nominal === undefined ? undefined : (prepared!.facts.impedanceRangeOhms ?? [nominal, nominal]);
};

const rangeText = ([low, high]: readonly [number, number]) => show.rangeOf(low, high, 'impedance');

export const impedanceStep: Rule<{ percent: number }> = {
  name: 'impedance-step',
  severity: 'warning',
  reads: 'networks',
  options: { percent: 25 },
  doc: `Two neighbours with length (package, trace, cable, connector; vias, capacitors and stubs between them are passed over) differ in
impedance by more than \`percent\` of the lower one, at the worst ends of their tolerances. A step of 25 % reflects a ninth of the wave,
19 dB of return loss from this joint alone. Both ends are shown. Bring the widths nearer, or tighten the tolerance. Common practice.`,
  bad: 'path: [{ package: chip, length: 2 mm, impedance: 78 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }]',
  good: 'path: [{ package: chip, length: 2 mm, impedance: 82 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }]',
  *check({ networks }, { percent }) {
    let before: { one: ElementNetwork; range: readonly [number, number] } | undefined;
    for (const one of networks!.elements) {
      const range = HAVE_LENGTH.has(one.element.kind) ? rangeOf(one) : undefined;
      if (!range) {
        // A file's impedance is unknown: no step can be told across it.
        if (HAVE_LENGTH.has(one.element.kind) || one.element.kind === 'block') before = undefined;
        continue;
      }
      if (before) {
        const steps = [range[1] / before.range[0], before.range[1] / range[0]];
        const worst = 100 * (Math.max(...steps) - 1);
        if (worst > percent * (1 + 1e-9)) {
          yield {
            at: keyOf(one.element, 'impedance'),
            subject: one.element.name,
            message: `${quoted(one.element.name)} (${rangeText(range)}) differs from ${quoted(before.one.element.name)} (${rangeText(before.range)}) by up to ${show.percent(worst / 100)}, more than ${show.percent(percent / 100)}.`,
            value: worst / 100,
            worse: 'higher',
            valueText: show.percent(worst / 100),
            related: [
              {
                at: nameOf(before.one.element),
                message: `${quoted(before.one.element.name)} has ${rangeText(before.range)}.`,
              },
            ],
          };
        }
      }
      before = { one, range };
    }
  },
};
