import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { frequenciesWithin, insertionLossAt } from './measures';
import type { LimitOutcome } from './types';

/** What a limit's path does: the network between its elements, or the whole. undefined where its names are unknown. */
export function networkWithin(
  limit: { between?: readonly [number, number]; values: { between?: unknown } },
  { cascade }: Computed,
) {
  if (!cascade) return undefined;
  if (limit.between) return cascade.between(limit.between[0], limit.between[1]).differential;
  return limit.values.between === undefined ? cascade.total.differential : undefined;
}

/** A mask's points, ascending in frequency, dB. */
export function maskOf(limit: Limit<'insertion-loss'>, nyquist: number): readonly { atHz: number; lossDb: number }[] {
  const points = (limit.values.max ?? []).map(({ value, at }) => ({
    lossDb: value,
    atHz: at === undefined || at === 'nyquist' ? nyquist : at,
  }));
  return points.sort((a, b) => a.atHz - b.atHz);
}

/** The allowed loss at a frequency between the ends of a mask: straight in dB over frequency. */
export function allowedAt(mask: readonly { atHz: number; lossDb: number }[], frequencyHz: number): number {
  const next = mask.findIndex(({ atHz }) => atHz >= frequencyHz * (1 - 1e-12));
  if (next <= 0) return mask[next < 0 ? mask.length - 1 : 0].lossDb;
  const [a, b] = [mask[next - 1], mask[next]];
  if (b.atHz === a.atHz) return Math.min(a.lossDb, b.lossDb);
  return a.lossDb + ((frequencyHz - a.atHz) / (b.atHz - a.atHz)) * (b.lossDb - a.lossDb);
}

/** A loss is the logarithm of a computed number: its last digits fail no limit. */
export const ROUNDING_DB = 1e-9;

function* judgedFrequencies(mask: readonly { atHz: number }[], grid: Parameters<typeof frequenciesWithin>[0]) {
  for (const { atHz } of mask) yield atHz;
  if (mask.length > 1) yield* frequenciesWithin(grid, mask[0].atHz, mask[mask.length - 1].atHz);
}

/** Insertion loss against a value at one frequency, or against a mask between its ends: the point with the least in hand. */
export function insertionLossOutcome(limit: Limit<'insertion-loss'>, computed: Computed): LimitOutcome | undefined {
  const { model, networks } = computed;
  const s = networks && networkWithin(limit, computed);
  const mask = maskOf(limit, model.nyquistFrequency);
  if (!s || mask.length === 0) return undefined;
  let worst: { atHz: number; lossDb: number; allowedDb: number } | undefined;
  const beyond = networks.grid.stepHz * (networks.grid.points - 1) * (1 + 1e-9);
  for (const atHz of judgedFrequencies(mask, networks.grid)) {
    if (atHz > beyond) continue;
    const lossDb = insertionLossAt(s, networks.grid, atHz);
    const allowedDb = allowedAt(mask, atHz);
    if (!worst || allowedDb - lossDb < worst.allowedDb - worst.lossDb) worst = { atHz, lossDb, allowedDb };
  }
  if (!worst) return undefined;
  const { atHz, lossDb, allowedDb } = worst;
  const figure = (name: string, title: string, value: number) =>
    ({
      name,
      title,
      value,
      unit: 'dB',
      text: show.loss(value),
      worse: 'higher',
      note: `at ${show.frequency(atHz)}`,
    }) as const;
  return {
    name: limit.name,
    kind: limit.kind,
    met: lossDb <= allowedDb + ROUNDING_DB,
    limit: figure('limit', 'Most insertion loss', allowedDb),
    actual: figure('insertion-loss', 'Insertion loss', lossDb),
    marginShare: allowedDb > 0 ? (allowedDb - lossDb) / allowedDb : lossDb > 0 ? -1 : 0,
    text: `${show.loss(lossDb)} of ${show.loss(allowedDb)} at ${show.frequency(atHz)}`,
    atHz,
  };
}
