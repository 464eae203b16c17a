import type { Axis, PlotDescription, Series } from '../types';

/**
 * The numbers behind a plot as CSV (RFC 4180, lines end with CR LF). Curves that share their x stand side by side; else
 * one row a point with the curve's name. Text that a spreadsheet would take for a formula gets an apostrophe in front.
 */
export function csvOf(description: PlotDescription): string {
  const { x, y, series, heat } = description;
  const blocks: string[][][] = [];
  if (heat) blocks.push(heatRows(description));
  const shared = series.length > 0 && series.every((one) => sameX(one, series[0]));
  if (shared) blocks.push(sideBySide(series, x, y));
  else if (series.length > 0) blocks.push(oneRowAPoint(series, x, y));
  const limits = description.limits.flatMap((limit) =>
    Array.from({ length: limit.x.length }, (_, i) => [cell(limit.name), number(limit.x[i]), number(limit.y[i])]),
  );
  if (limits.length > 0) blocks.push([['limit', head(x), head(y)].map(cell), ...limits]);
  const marks = description.marks.map((mark) => [cell(mark.label), number(mark.x), number(mark.y)]);
  if (marks.length > 0) blocks.push([['mark', head(x), head(y)].map(cell), ...marks]);
  return `${blocks.map((rows) => rows.map((row) => row.join(',')).join('\r\n')).join('\r\n\r\n')}\r\n`;
}

const head = ({ label, unit }: Axis): string => (unit === '' ? label : `${label} (${unit})`);

/** Nine digits, and an empty cell for what is not finite. */
const number = (value: number): string => (Number.isFinite(value) ? String(Number(value.toPrecision(9))) : '');

/** A text cell: quoted where needed, harmless where a spreadsheet would compute it. */
export function cell(text: string): string {
  const harmless = /^[=+\-@\t\r\n]/.test(text.trimStart()) || /^[\t\r\n]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(harmless) ? `"${harmless.replace(/"/g, '""')}"` : harmless;
}

function sameX(a: Series, b: Series): boolean {
  if (a.x === b.x) return true;
  if (a.x.length !== b.x.length) return false;
  for (let i = 0; i < a.x.length; i++) if (a.x[i] !== b.x[i]) return false;
  return true;
}

function sideBySide(series: readonly Series[], x: Axis, y: Axis): string[][] {
  const rows = [[head(x), ...series.map(({ name }) => (y.unit === '' ? name : `${name} (${y.unit})`))].map(cell)];
  for (let i = 0; i < series[0].x.length; i++)
    rows.push([number(series[0].x[i]), ...series.map((one) => number(one.y[i]))]);
  return rows;
}

function oneRowAPoint(series: readonly Series[], x: Axis, y: Axis): string[][] {
  const rows = [['curve', head(x), head(y)].map(cell)];
  for (const one of series) {
    for (let i = 0; i < one.x.length; i++) rows.push([cell(one.name), number(one.x[i]), number(one.y[i])]);
  }
  return rows;
}

function heatRows({ heat, x, y }: PlotDescription): string[][] {
  const { columns, rows: count, x: xs, y: ys, values, unit } = heat!;
  const rows = [[head(x), head(y), `log10 of ${unit}`].map(cell)];
  for (let row = 0; row < count; row++) {
    for (let column = 0; column < columns; column++) {
      const at = (range: readonly [number, number], index: number, of: number) =>
        range[0] + ((range[1] - range[0]) * (index + 0.5)) / of;
      rows.push([number(at(xs, column, columns)), number(at(ys, row, count)), number(values[row * columns + column])]);
    }
  }
  return rows;
}
