import type { LedgerTable } from './preview-data';

/** The ledger as a plain table, its last row what is missing from the sum: heads and cells as every surface shows them. */
export function ledgerLines({ columns, rows, reflections }: LedgerTable): { head: string[]; rows: string[][] } {
  const blank = columns.map((_, i) => (i === 0 ? reflections : ''));
  return {
    head: ['Element', 'Kind', ...columns.map(({ title }) => title), 'Loss so far', 'Budget', 'Owner'],
    rows: [
      ...rows.map(({ element, kind, cells, sofar, budget, owner }) => [element, kind, ...cells, sofar, budget, owner]),
      ['reflections between elements', '', ...blank, '', '', ''],
    ],
  };
}
