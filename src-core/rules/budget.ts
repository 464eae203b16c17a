import type { Quantity } from '../../schemas/format/types';
import { spentAt } from '../figures/ledger';
import { quoted } from '../model/reports';
import type { Model } from '../model/types';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import type { Related, Report } from '../report';
import { keyOf, nameOf } from './places';
import type { Judged, Rule } from './types';

/** What is spent is a logarithm of a computed number: its last digits are no finding. */
const ROUNDING_DB = 1e-9;

const frequencyOf = ({ at }: Quantity, { nyquistFrequency }: Model) =>
  at === undefined || at === 'nyquist' ? nyquistFrequency : at;

const overspent = (
  what: string,
  spentDb: number,
  budget: Quantity,
  atHz: number,
): Pick<Report, 'message' | 'value' | 'worse' | 'valueText'> => ({
  message: `${what} ${show.loss(spentDb)} at ${show.frequency(atHz)}, ${show.loss(spentDb - budget.value)} more than the budget of ${show.loss(budget.value)}.`,
  value: spentDb,
  worse: 'higher',
  valueText: show.loss(spentDb),
});

function* elementsOver(judged: Judged) {
  for (const one of judged.networks!.elements) {
    const { budget, name } = one.element;
    if (!budget || one.through) continue;
    const atHz = frequencyOf(budget, judged.model);
    const spentDb = spentAt([one], judged, atHz);
    if (spentDb <= budget.value + ROUNDING_DB) continue;
    yield {
      at: keyOf(one.element, 'budget'),
      subject: name,
      ...overspent(`${quoted(name)} spends`, spentDb, budget, atHz),
    };
  }
}

/** The largest spenders that together make four fifths of it: what is left is not worth a look. */
function mostOf(own: readonly ElementNetwork[], judged: Judged, atHz: number, wholeDb: number): readonly Related[] {
  const spenders = own
    .map((one) => ({ element: one.element, db: spentAt([one], judged, atHz) }))
    .sort((a, b) => b.db - a.db);
  let sum = 0;
  const told = spenders.filter(({ db }) => {
    const isTold = sum < 0.8 * wholeDb;
    sum += db;
    return isTold;
  });
  return told.slice(0, 3).map(({ element, db }) => ({
    at: nameOf(element),
    message: `${quoted(element.name)} spends ${show.loss(db)} of it.`,
  }));
}

function* ownersOver(judged: Judged) {
  for (const { name, budget, place } of judged.model.owners) {
    const own = judged.networks!.elements.filter(({ element }) => element.owner === name);
    const atHz = frequencyOf(budget, judged.model);
    const spentDb = spentAt(own, judged, atHz);
    if (spentDb <= budget.value + ROUNDING_DB) continue;
    const related = mostOf(own, judged, atHz, spentDb);
    yield {
      at: place,
      subject: name,
      related,
      ...overspent(`The elements of ${quoted(name)} spend`, spentDb, budget, atHz),
    };
  }
}

export const budget: Rule = {
  name: 'budget',
  severity: 'error',
  reads: 'networks',
  options: {},
  doc: `An element loses more by itself, in the reference impedance, than its \`budget\`; or the elements that name an owner lose more
together than that owner's. What elements lose by reflecting at each other is nobody's and not counted here: see the ledger's last row.
Nominal values.`,
  bad: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, budget: 0.1 dB @ nyquist }]',
  good: 'path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm, budget: 5 dB @ nyquist }]',
  *check(judged) {
    yield* elementsOver(judged);
    yield* ownersOver(judged);
  },
};
