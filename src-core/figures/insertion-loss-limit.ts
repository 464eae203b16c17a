import { networkAt } from '../cascade/network-at';
import type { Limit } from '../model/types';
import type { Grid, Networks, TwoPort } from '../networks/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { frequenciesWithin, insertionLossAt, insertionLossOf } from './measures';
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

type Mask = readonly { readonly atHz: number; readonly lossDb: number }[];
interface Judged {
  readonly atHz: number;
  readonly lossDb: number;
}

const onGrid = ({ stepHz, points }: Grid, hz: number) =>
  hz <= stepHz * (points - 1) * (1 + 1e-9) && Math.abs(hz / stepHz - Math.round(hz / stepHz)) < 1e-9;

/** The loss at each frequency that the limit names, computed at just that one where it lies between the grid's points or beyond them. */
function atNamed(mask: Mask, s: TwoPort, networks: Networks, between?: readonly [number, number]): readonly Judged[] {
  const { grid } = networks;
  const others = mask.filter(({ atHz }) => !onGrid(grid, atHz)).map(({ atHz }) => atHz);
  const exact = others.length > 0 ? networkAt(networks, Float64Array.from(others), between).differential : undefined;
  return mask.map(({ atHz }) => {
    const index = others.indexOf(atHz);
    return { atHz, lossDb: exact && index >= 0 ? insertionLossOf(exact, index) : insertionLossAt(s, grid, atHz) };
  });
}

/** Every point at which a limit is judged: those that it names and, of a mask, those of the grid between its ends. */
function judgedPoints(
  mask: Mask,
  s: TwoPort,
  networks: Networks,
  between?: readonly [number, number],
): readonly Judged[] {
  const { grid } = networks;
  const inside =
    mask.length > 1 ? [...frequenciesWithin(grid, mask[0].atHz, mask[mask.length - 1].atHz)].slice(1, -1) : [];
  return [
    ...atNamed(mask, s, networks, between),
    ...inside.map((atHz) => ({ atHz, lossDb: insertionLossAt(s, grid, atHz) })),
  ];
}

/** Insertion loss against a value at one frequency, or against a mask between its ends: the point with the least in hand. */
export function insertionLossOutcome(limit: Limit<'insertion-loss'>, computed: Computed): LimitOutcome | undefined {
  const { model, networks } = computed;
  const s = networks && networkWithin(limit, computed);
  const mask = maskOf(limit, model.nyquistFrequency);
  if (!s || mask.length === 0) return undefined;
  let worst: (Judged & { allowedDb: number }) | undefined;
  for (const { atHz, lossDb } of judgedPoints(mask, s, networks, limit.between)) {
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
