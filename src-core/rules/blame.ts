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

/** A transition that takes less than this is harmless: it is not named, however little its delay would allow it. */
const HARMLESS_DB = 0.5;
const TRANSITIONS = new Set(['via', 'stub', 'capacitor']);

/** What an element may fairly spend, and in which words. */
interface Share {
  readonly allowedDb: number;
  readonly words: string;
}

/** Its budget; failing that its part, by delay, of its owner's budget; failing that its part, by delay, of what the limit allows. */
function shareOf({ element }: ElementNetwork, { model }: Judged, delays: Delays, allowedDb: number): Share {
  if (element.budget) return { allowedDb: element.budget.value, words: 'its budget' };
  const own = delays.of(element);
  const owner = model.owners.find(({ name }) => name === element.owner);
  if (!owner) return { allowedDb: allowedDb * own, words: 'its share by delay' };
  const owners = delays.all.filter((one) => one.element.owner === owner.name);
  const whole = owners.reduce((sum, one) => sum + delays.of(one.element), 0);
  const part = whole > 0 ? own / whole : 1 / owners.length;
  return {
    allowedDb: owner.budget.value * part,
    words:
      owners.length > 1 ? `its share of the budget of ${quoted(owner.name)}` : `the budget of ${quoted(owner.name)}`,
  };
}

interface Delays {
  readonly all: readonly ElementNetwork[];
  /** An element's part of the delay of them all, 0 to 1. */
  of(element: AnyElement): number;
}

function delaysOf(all: readonly ElementNetwork[], { model, networks }: Judged): Delays {
  const seconds = new Map(
    all.map((one) => [one.element, Math.max(0, measuresOf(one, networks!.grid, model.nyquistFrequency).delaySeconds)]),
  );
  const whole = [...seconds.values()].reduce((sum, delay) => sum + delay, 0);
  return { all, of: (element) => (whole > 0 ? (seconds.get(element) ?? 0) / whole : 1 / all.length) };
}

/**
 * The element whose own loss at a frequency exceeds its fair share the most.
 * @returns undefined where no element spends more than its share (reflections between them do)
 */
export function spendsMost(judged: Judged, limit: Pick<Limit, 'between'>, allowedDb: number, atHz: number) {
  const elements = elementsWithin(judged, limit);
  const delays = delaysOf(elements, judged);
  let most: { element: AnyElement; spentDb: number; overDb: number; words: string } | undefined;
  for (const one of elements) {
    const spentDb = insertionLossAt(one.network.differential, judged.networks!.grid, atHz);
    if (TRANSITIONS.has(one.element.kind) && spentDb < HARMLESS_DB) continue;
    const share = shareOf(one, judged, delays, allowedDb);
    const overDb = spentDb - share.allowedDb;
    if (overDb > (most?.overDb ?? 0)) most = { element: one.element, spentDb, overDb, words: share.words };
  }
  if (!most) return undefined;
  const { element, spentDb, overDb, words } = most;
  return {
    element,
    message: `${quoted(element.name)} spends the most over its share: ${show.loss(spentDb)}, ${show.loss(overDb)} over ${words}.`,
  };
}
