import type { Analysis } from '../analysis';
import type { Figure } from '../figures/types';
import { show } from '../quantity/show';
import type { FigureChange } from './types';

/** By how much a figure moved, with its sign: `+2.1 dB`. */
function delta(value: number, unit: string): string {
  const size = Math.abs(value);
  const dimension = {
    dB: 'loss',
    s: 'time',
    Hz: 'frequency',
    V: 'voltage',
    UI: 'unitInterval',
    ohm: 'impedance',
  } as const;
  const known = Object.hasOwn(dimension, unit) ? dimension[unit as keyof typeof dimension] : undefined;
  const text = known && show.dimension(size, known);
  // a step below what the unit is shown with still has a size
  const small = text === undefined || (/^0 /.test(text) && size > 0);
  return `${value < 0 ? '-' : '+'}${small ? `${show.ratio(size)} ${unit}` : text}`;
}

const better = (change: number, worse: Figure['worse']) =>
  worse === 'neither' ? {} : { better: worse === 'higher' ? change < 0 : change > 0 };

/** The figures of the one list that read differently on the two sides. */
export function figureChanges(from: readonly Figure[], to: readonly Figure[]): readonly FigureChange[] {
  const names = [...new Set([...to, ...from].map(({ name }) => name))];
  return names.flatMap((name): FigureChange[] => {
    const [before, after] = [from, to].map((figures) => figures.find((figure) => figure.name === name));
    const { title } = (after ?? before)!;
    if (!before || !after) {
      if (before) return [{ name, title, from: before, deltaText: 'no longer known' }];
      return [{ name, title, to: after, deltaText: 'now known' }];
    }
    if (before.text === after.text && before.note === after.note) return [];
    const change = after.value - before.value;
    if (before.text === after.text && Math.abs(change) <= 1e-6 * Math.abs(before.value)) return [];
    return [
      { name, title, from: before, to: after, deltaText: delta(change, after.unit), ...better(change, after.worse) },
    ];
  });
}

/** What a whole change of a figure has beyond the sum of what its parts do alone. */
export function beyondParts(
  base: Analysis,
  head: Analysis,
  alone: readonly (readonly Figure[])[],
): readonly FigureChange[] {
  return figureChanges(base.figures, head.figures).flatMap((whole): FigureChange[] => {
    const { name, title, from, to } = whole;
    if (!from || !to) return [];
    const parts = alone.map((figures) => figures.find((figure) => figure.name === name)?.value);
    if (parts.some((value) => value === undefined)) return [];
    const sum = parts.reduce<number>((total, value) => total + (value! - from.value), 0);
    const rest = to.value - from.value - sum;
    return [{ name, title, deltaText: delta(rest, to.unit), ...better(rest, to.worse) }];
  });
}
