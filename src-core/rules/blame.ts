import { measuresOf } from '../figures/element-measures';
import { insertionLossAt } from '../figures/measures';
import { quoted } from '../model/reports';
import type { AnyElement, Limit } from '../model/types';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import type { Judged } from './types';

/** The elements that a limit judges, in order. */
export function elementsWithin({ networks }: Judged, limit: Pick<Limit, 'between'>): readonly ElementNetwork[] {
  const [first, last] = limit.between ?? [0, networks!.elements.length - 1];
  return networks!.elements.slice(first, last + 1).filter(({ through }) => !through);
}

/** A transition that takes less than this is harmless and never named. */
const HARMLESS_DB = 0.5;
/** Beside an element that takes so many times more, a transition is not what the loss is made of. */
const OVERSHADOWED = 4;
/** What needs almost no loss to do its work. */
const TRANSITIONS = new Set(['via', 'stub', 'capacitor']);

interface Spender {
  readonly element: AnyElement;
  readonly spentDb: number;
  /** What it or its owner was given, and in which words. */
  readonly share?: { readonly allowedDb: number; readonly words: string };
}

/** Its budget; failing that its part, by delay, of its owner's. */
function shareOf(one: ElementNetwork, all: readonly ElementNetwork[], judged: Judged): Spender['share'] {
  const { element } = one;
  if (element.budget) return { allowedDb: element.budget.value, words: 'its budget' };
  const owner = judged.model.owners.find(({ name }) => name === element.owner);
  if (!owner) return undefined;
  const owned = all.filter((other) => other.element.owner === owner.name);
  const delay = (other: ElementNetwork) =>
    Math.max(0, measuresOf(other, judged.networks!.grid, judged.model.nyquistFrequency).delaySeconds);
  const whole = owned.reduce((sum, other) => sum + delay(other), 0);
  const part = whole > 0 ? delay(one) / whole : 1 / owned.length;
  return {
    allowedDb: owner.budget.value * part,
    words:
      owned.length > 1 ? `its share of the budget of ${quoted(owner.name)}` : `the budget of ${quoted(owner.name)}`,
  };
}

const largest = <T>(items: readonly T[], size: (item: T) => number): T | undefined =>
  items.reduce<T | undefined>((most, item) => (most && size(most) >= size(item) ? most : item), undefined);

/**
 * What a failing limit of loss is made of, by the elements' own losses at a frequency: a transition that alone takes as much as is
 * lacking, since it needs none of it; else, where the element with the largest loss was given a budget, the one that is the most over
 * its own; else the element with the largest loss.
 * @param spentDb what the limit's path loses there, above `allowedDb`
 * @returns undefined where reflections between the elements take more than any of them
 */
export function spendsMost(
  judged: Judged,
  limit: Pick<Limit, 'between'>,
  { spentDb, allowedDb, atHz }: { readonly spentDb: number; readonly allowedDb: number; readonly atHz: number },
): { readonly element: AnyElement; readonly message: string } | undefined {
  const within = elementsWithin(judged, limit);
  const all: readonly Spender[] = within.map((one) => ({
    element: one.element,
    spentDb: insertionLossAt(one.network.differential, judged.networks!.grid, atHz),
    share: shareOf(one, within, judged),
  }));
  const named = all.filter((one) => !TRANSITIONS.has(one.element.kind) || one.spentDb >= HARMLESS_DB);
  const most = largest(named, (one) => one.spentDb);
  const reflectedDb = spentDb - all.reduce((sum, one) => sum + one.spentDb, 0);
  if (!most || most.spentDb < reflectedDb) return undefined;
  // reflections between elements may give back what one of them takes
  const part = (one: Spender) =>
    `${quoted(one.element.name)} spends ${show.loss(one.spentDb)}${one.spentDb < spentDb ? ` of ${show.loss(spentDb)}` : ' by itself'}`;
  const transition = largest(
    named.filter((one) => TRANSITIONS.has(one.element.kind)),
    (one) => one.spentDb,
  );
  if (transition && transition.spentDb >= Math.max(spentDb - allowedDb, most.spentDb / OVERSHADOWED))
    return {
      element: transition.element,
      message: `${part(transition)}; a ${transition.element.kind} needs almost none.`,
    };
  const overDb = (one: Spender) => (one.share ? one.spentDb - one.share.allowedDb : 0);
  const over = most.share && largest(named, overDb);
  if (over?.share && overDb(over) > 0)
    return { element: over.element, message: `${part(over)}, ${show.loss(overDb(over))} over ${over.share.words}.` };
  return { element: most.element, message: `${part(most)}, more than any other element.` };
}
