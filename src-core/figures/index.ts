import type { Resonance } from '../cascade/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import { figureKinds } from './list';
import type { Figure } from './types';

export type { Computed } from './computed';
export { ledgerOf } from './ledger';
export { limitOutcomes } from './limits';
export { verdictOf } from './verdict';

/** Mark of a figure that belongs to an older text. */
export const staleMark = (stale: boolean) => (stale ? '~' : '');

/** Every figure of the whole channel that can be told now, in the order in which they are shown. Nominal values. */
export function figuresOf(computed: Computed): readonly Figure[] {
  const single = computed.model.signalling === 'single-ended';
  return figureKinds.flatMap((kind) => {
    const value = kind.value(computed);
    if (value === undefined || !Number.isFinite(value)) return [];
    const { name, unit, worse } = kind;
    const text = staleMark(Boolean(kind.ofLink) && computed.linkIsStale) + kind.text(value);
    const note = kind.note?.(computed);
    return [{ name, title: kind.title(single), value, unit, text, worse, ...(note && { note }) }];
  });
}

/** A figure by its name. */
export const figureNamed = (figures: readonly Figure[], name: string) => figures.find((figure) => figure.name === name);

/** `27.6 GHz, 12 dB deep, by dive`: as every surface writes a resonance. */
export const resonanceText = ({ frequencyHz, depthDb, elements }: Resonance) =>
  [
    show.frequency(frequencyHz),
    `${show.loss(depthDb)} deep`,
    ...(elements.length > 0 ? [`by ${elements.join(' or ')}`] : []),
  ].join(', ');
