import { quoted } from '../model/reports';
import type { AnyElement } from '../model/types';
import type { StubFact } from '../networks/types';
import { show } from '../quantity/show';
import { keyOf } from './places';
import { backdrillFixes, shortenFixes } from './stub-fixes';
import type { Rule } from './types';

/** Both ends where a tolerance is declared, since the worst one is judged. */
function lengthText({ lengthMeters, lengthRangeMeters: [shortest, longest] }: StubFact): string {
  const range = longest > shortest ? ` (${show.rangeOf(shortest, longest, 'length')})` : '';
  return `${show.length(lengthMeters)}${range}`;
}

function notchText({ notchHz, lowestNotchHz }: StubFact): string {
  const nominal = notchHz > lowestNotchHz ? ` at its longest (nominal ${show.frequency(notchHz)})` : '';
  return `${show.frequency(lowestNotchHz)}${nominal}`;
}

/** A via in the middle of a board has a stub at either side; the one with the lower notch speaks for both. */
const worstStub = (stubs: readonly StubFact[]) => stubs.reduce((a, b) => (b.lowestNotchHz < a.lowestNotchHz ? b : a));

const placeOf = (element: AnyElement) =>
  element.kind === 'via' ? keyOf(element, 'backdrill', 'to', 'from') : keyOf(element, 'length');

export const stubResonance: Rule<{ multiple: number }> = {
  name: 'stub-resonance',
  severity: 'warning',
  reads: 'networks',
  options: { multiple: 3 },
  doc: `A stub is a quarter-wave resonator: where it is a quarter of a wavelength long it shorts the line, cuts a notch into the
loss and takes from the signal well below it. Warns when the notch of the stub with its pads, at the worst end of its tolerance, lies
below \`multiple\` × Nyquist. The fixes drill a via's barrel back: to the least that may be left, no shorter at
the lower end of the drill's tolerance than the fabricator's \`backdrill-minimum\`, and to the most, short enough at its upper end;
without \`drill-rules\` none is offered. The multiple is common practice.`,
  bad: 'path: [{ via: dive, part: board.long-hole }]',
  good: 'path: [{ via: dive, part: board.long-hole, backdrill: { bottom: 0.3 mm } }]',
  *check(judged, { multiple }) {
    const { model, networks } = judged;
    const wanted = multiple * model.nyquistFrequency;
    for (const { element, prepared } of networks!.elements) {
      const stubs = prepared?.facts.stubs.filter(({ lowestNotchHz }) => lowestNotchHz < wanted) ?? [];
      if (stubs.length === 0) continue;
      const worst = worstStub(stubs);
      const fixes =
        element.kind === 'via'
          ? backdrillFixes(judged, element, stubs, wanted)
          : shortenFixes(judged, element, worst, wanted);
      yield {
        at: placeOf(element),
        subject: element.name,
        message: `The ${lengthText(worst)} stub of ${quoted(element.name)} cuts a notch at ${notchText(worst)}, below ${multiple} × Nyquist (${show.frequency(wanted)}).`,
        value: worst.lowestNotchHz,
        worse: 'lower',
        valueText: show.frequency(worst.lowestNotchHz),
        fixes,
      };
    }
  },
};
