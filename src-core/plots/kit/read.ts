import type { Heat, PlotDescription, Series } from '../types';
import { lowerBound } from './curves';
import { powerOfTen } from './heat';
import { showValue } from './values';

export interface Reading {
  /** Where the values stand: the nearest sample of the first curve. */
  readonly x: number;
  readonly xText: string;
  readonly values: readonly { readonly name: string; readonly text: string; readonly y: number }[];
  /** All of it as one sentence, for the line below the plot and for a screen reader. */
  readonly text: string;
}

/** What stands at `x` (and, for a density, at `y`); undefined where the plot has no values. */
export function nearestValues(description: PlotDescription, x: number, y?: number): Reading | undefined {
  const { series, heat } = description;
  const guide = series.find(({ draw, x: xs }) => draw !== 'loop' && xs.length > 0);
  const at = guide ? guide.x[nearestIndex(guide.x, x)] : x;
  const values = series.flatMap((one) => {
    const read = one.draw === 'loop' ? loopAt(one, at, description) : curveAt(one, at, description);
    return read ? [{ name: one.name, ...read }] : [];
  });
  if (heat && y !== undefined) values.push({ name: 'Density', ...densityAt(heat, at, y) });
  if (values.length === 0) return undefined;
  const xText = showValue(at, description.x.unit);
  return { x: at, xText, values, text: `${xText}: ${values.map(({ name, text }) => `${name} ${text}`).join(', ')}` };
}

/** The next sample of the first curve in a direction, for the arrow keys; `share` of the domain is the least step. */
export function neighbour(description: PlotDescription, x: number, direction: 1 | -1, least = 0): number {
  const guide = description.series.find(({ draw, x: xs }) => draw !== 'loop' && xs.length > 0);
  if (!guide) {
    const [from, to] = description.x.domain;
    return x + direction * Math.max(least, (to - from) / 64);
  }
  const index = nearestIndex(guide.x, x);
  const stepped = nearestIndex(guide.x, x + direction * least);
  const next = direction > 0 ? Math.max(index + 1, stepped) : Math.min(index - 1, stepped);
  return guide.x[Math.min(guide.x.length - 1, Math.max(0, next))];
}

function nearestIndex(values: ArrayLike<number>, wanted: number): number {
  const above = Math.min(values.length - 1, lowerBound(values, wanted));
  return above > 0 && wanted - values[above - 1] <= values[above] - wanted ? above - 1 : above;
}

function curveAt({ x, y, draw }: Series, at: number, { y: axis }: PlotDescription) {
  if (x.length === 0) return undefined;
  const index = nearestIndex(x, at);
  const spacing = x.length > 1 ? Math.abs(x[1] - x[0]) : Number.POSITIVE_INFINITY;
  const outside = Math.abs(x[index] - at) > (draw === 'stems' ? spacing / 2 : spacing);
  if (outside || !Number.isFinite(y[index])) return undefined;
  return { y: y[index], text: showValue(y[index], axis.unit) };
}

/** Lowest and highest crossing of a closed line with the vertical at `at`. */
function loopAt({ x, y }: Series, at: number, { y: axis }: PlotDescription) {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < x.length; i++) {
    const next = (i + 1) % x.length;
    if (Math.min(x[i], x[next]) > at || Math.max(x[i], x[next]) < at) continue;
    const t = x[next] === x[i] ? 0 : (at - x[i]) / (x[next] - x[i]);
    const crossing = y[i] + t * (y[next] - y[i]);
    low = Math.min(low, crossing);
    high = Math.max(high, crossing);
  }
  if (!(high > low)) return undefined;
  return { y: high - low, text: `open from ${showValue(low, axis.unit)} to ${showValue(high, axis.unit)}` };
}

function densityAt({ columns, rows, x: xs, y: ys, values, floor }: Heat, x: number, y: number) {
  const cell = (value: number, [from, to]: readonly [number, number], count: number) =>
    Math.min(count - 1, Math.max(0, Math.floor(((value - from) / (to - from)) * count)));
  const value = values[cell(y, ys, rows) * columns + cell(x, xs, columns)];
  return {
    y: value,
    text: value > floor ? `about ${powerOfTen(Math.round(value))}` : `below ${powerOfTen(Math.round(floor))}`,
  };
}
