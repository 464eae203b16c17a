import { analyse } from '../analyse';
import type { AnalyseOptions, Analysis } from '../analysis';
import type { Figure } from '../figures/types';
import { beyondParts, figureChanges } from './figures';
import type { Grouped } from './groups';
import type { Comparison } from './hybrid';
import type { Cause, Change, FigureChange } from './types';

/** Each costs two analyses. */
export const MOST_GROUPS = 8;

/** What each group of changes does: added to base, taken from head; and what all have only together. */
export function causesOf(
  comparison: Comparison,
  { groupOf, count }: Grouped,
  changes: readonly Change[],
  [base, head]: readonly [Analysis, Analysis],
  outOfTime: () => AnalyseOptions['outOfTime'],
): { readonly causes: readonly Cause[]; readonly together?: readonly FigureChange[] } {
  if (count < 2 || count > MOST_GROUPS) return { causes: [] };
  let late = false;
  const figuresWith = (decide: (group: number) => boolean, previous: Analysis): readonly Figure[] => {
    const { figures, timedOut } = analyse(
      // what computes nothing else stays head's
      comparison.inputs(({ id }) => decide(groupOf.get(id) ?? 0)),
      previous,
      { until: 'link', outOfTime: outOfTime() },
    );
    late ||= timedOut ?? false;
    return figures;
  };
  const alone: (readonly Figure[])[] = [];
  const causes = Array.from({ length: count }, (_, i): Cause => {
    const added = figuresWith((group) => group === i + 1, base);
    const taken = figuresWith((group) => group !== i + 1, head);
    alone.push(added);
    return {
      group: i + 1,
      words: changes
        .filter(({ group }) => group === i + 1)
        .map(({ words }) => words)
        .join('; '),
      alone: figureChanges(base.figures, added),
      without: figureChanges(head.figures, taken),
    };
  });
  // what met its time limit is compared with nothing
  return late ? { causes: [] } : { causes, together: beyondParts(base, head, alone) };
}
