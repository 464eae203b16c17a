import type { LedgerTable } from './preview-data';

/** Behind the own loss, the first of the columns. */
const spentFirst = ([own, ...others]: readonly string[], sofar: string, budget: string) => [
  own,
  sofar,
  budget,
  ...others,
];

/** Where `Loss so far` stands among the cells of a line. */
export const LOSS_SO_FAR = 3;

/**
 * The ledger as a plain table: what is spent, and of what, first, as a narrow preview shows the first columns. Its last row is what is
 * missing from the sum. Heads and cells as every surface shows them.
 */
export function ledgerLines({ columns, rows, reflections }: LedgerTable): { head: string[]; rows: string[][] } {
  const blank = columns.map((_, i) => (i === 0 ? reflections : ''));
  return {
    head: [
      'Element',
      'Kind',
      ...spentFirst(
        columns.map(({ title }) => title),
        'Loss so far',
        'Budget',
      ),
      'Owner',
    ],
    rows: [
      ...rows.map(({ element, kind, cells, sofar, budget, owner }) => [
        element,
        kind,
        ...spentFirst(cells, sofar, budget),
        owner,
      ]),
      ['reflections between elements', '', ...spentFirst(blank, '', ''), ''],
    ],
  };
}
