import type { Analysis } from '../analysis';
import { insertionLossAt } from '../figures/measures';
import type { AnyElement } from '../model/types';
import { show } from '../quantity/show';
import { code } from './markdown';

/**
 * How far an element's length may grow, or must shrink, until the first loss limit or budget is met: what is in hand there,
 * over the element's own loss per length. Reflections are taken as they are, so it is an estimate.
 */
export function growthOf(analysis: Analysis, element: AnyElement): string | undefined {
  const { networks, model, limits, ledger } = analysis;
  const network = networks?.elements[element.index];
  const length = network?.prepared?.facts.lengthMeters;
  if (!networks || !network || network.through || !length) return undefined;
  const lossPerMeter = (frequency: number) =>
    insertionLossAt(network.network.differential, networks.grid, frequency) / length;
  const rooms: { meters: number; by: string }[] = [];
  const add = (inHandDb: number, frequency: number, by: string) => {
    const slope = lossPerMeter(frequency);
    if (slope > 0) rooms.push({ meters: inHandDb / slope, by });
  };
  for (const outcome of limits) {
    if (outcome.kind !== 'insertion-loss') continue;
    const limit = model.limits.find(({ name }) => name === outcome.name);
    const [from, to] = limit?.between ?? [0, model.elements.length - 1];
    if (element.index < from || element.index > to) continue;
    add(
      outcome.limit.value - outcome.actual.value,
      outcome.atHz ?? model.nyquistFrequency,
      `limit ${code(outcome.name)}`,
    );
  }
  const row = ledger?.rows.find(({ index }) => index === element.index);
  const at = (frequency: number | 'nyquist' | undefined) =>
    typeof frequency === 'number' ? frequency : model.nyquistFrequency;
  if (row?.budget) add(row.budget.allowedDb - row.budget.spentDb, at(element.budget?.at), 'its budget');
  const owner = ledger?.owners.find((one) => one.owner === element.owner);
  if (owner?.allowedDb !== undefined) {
    const budget = model.owners.find(({ name }) => name === owner.owner)?.budget;
    add(owner.allowedDb - owner.spentDb, at(budget?.at), `the budget of ${code(owner.owner)}`);
  }
  const least = rooms.sort((a, b) => a.meters - b.meters)[0];
  if (!least) return undefined;
  if (least.meters >= 0)
    return `May grow by about ${show.length(least.meters)}, to ${show.length(length + least.meters)}, until ${least.by} is met.`;
  if (-least.meters >= length) return `${capital(least.by)} is exceeded, and no length of this element mends that.`;
  return `Must shrink by about ${show.length(-least.meters)}, to ${show.length(length + least.meters)}, for ${least.by}.`;
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
