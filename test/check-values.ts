import { appendFileSync } from 'node:fs';
import { afterAll, expect, test } from 'vitest';

/** A check value as it came out. */
export interface CheckedRow {
  readonly id: string;
  readonly what: string;
  readonly source: string;
  readonly expected: number;
  readonly got: number;
  /** Relative where the tolerance is, else absolute. */
  readonly error: number;
  readonly tolerance: number;
}

type Row = { readonly expected: number | readonly number[] };

interface CheckValues<R extends Row> {
  /** Row of the list of check values. */
  readonly id: string;
  readonly what: string;
  /** Author, year; where the expected value comes from. */
  readonly source: string;
  readonly relativeTolerance?: number;
  /** In the unit of the value; for values that are 0 or near it. */
  readonly absoluteTolerance?: number;
  /** Half a unit of the last digit that the list prints, where that is more than the tolerance: 0.2474 says no more than ±5e-5. */
  readonly printedWithin?: number;
  readonly compute: (row: R) => number | readonly number[];
  readonly rows: readonly R[];
}

/** All rows checked in this test file so far. */
export const checkedRows: CheckedRow[] = [];

/**
 * A published value as a test: one for each row, named by its id. Rows are kept too; with `CHECK_VALUES_FILE` set they are appended
 * to that file, a JSON object a line, when the test file ends.
 */
export function checkValues<R extends Row>(check: CheckValues<R>): void {
  const { id, what, source, relativeTolerance, absoluteTolerance, printedWithin = 0, compute, rows } = check;
  const tolerance = relativeTolerance ?? absoluteTolerance;
  if (tolerance === undefined) throw new Error(`Check value ${id} needs a tolerance`);
  rows.forEach((row, i) => {
    const { expected, ...inputs } = row;
    test(`${id} ${what}${rows.length > 1 ? ` [${i + 1}] ${JSON.stringify(inputs)}` : ''}`, () => {
      const wanted = [expected].flat();
      const got = [compute(row)].flat() as number[];
      expect(got.length, 'count of values').toBe(wanted.length);
      wanted.forEach((value, n) => {
        const scale = relativeTolerance === undefined ? 1 : Math.abs(value);
        const error = Math.abs(got[n] - value) / scale;
        checkedRows.push({ id, what, source, expected: value, got: got[n], error, tolerance });
        expect(error, `${id}: ${got[n]} against ${value}`).toBeLessThanOrEqual(
          Math.max(tolerance, printedWithin / scale),
        );
      });
    });
  });
}

afterAll(() => {
  const file = process.env.CHECK_VALUES_FILE;
  if (file) appendFileSync(file, checkedRows.map((row) => `${JSON.stringify(row)}\n`).join(''));
});
