import type { Heat, PlotDescription, Series } from './types';

/** Points of a curve that a preview gets at most; beyond them each pair of buckets keeps its lowest and highest point. */
export const mostPoints = 4000;

/** The same picture with plain, rounded arrays: what travels to a page as JSON. Not finite becomes null in JSON, so it is left out. */
export function plainDescription(description: PlotDescription): PlotDescription {
  return {
    ...description,
    series: description.series.map(plainSeries),
    limits: description.limits.map((limit) => ({ ...limit, x: digits(limit.x, 8), y: digits(limit.y, 6) })),
    marks: description.marks.map((mark) => ({
      ...mark,
      x: digits([mark.x], 8)[0] ?? 0,
      y: digits([mark.y], 6)[0] ?? 0,
    })),
    ...(description.heat && { heat: plainHeat(description.heat) }),
  };
}

function plainSeries({ x, y, ...rest }: Series): Series {
  const kept = thinned(x, y, mostPoints);
  return {
    ...rest,
    x: digits(
      kept.map((i) => x[i]),
      8,
    ),
    y: digits(
      kept.map((i) => y[i]),
      6,
    ),
  };
}

/** Indices to keep: all finite ones, or of each bucket the lowest and the highest. */
export function thinned(x: ArrayLike<number>, y: ArrayLike<number>, most: number): number[] {
  const finite: number[] = [];
  for (let i = 0; i < x.length; i++) if (Number.isFinite(x[i]) && Number.isFinite(y[i])) finite.push(i);
  if (finite.length <= most) return finite;
  const kept = new Set([finite[0], finite[finite.length - 1]]);
  const buckets = Math.floor(most / 2) - 1;
  for (let bucket = 0; bucket < buckets; bucket++) {
    const from = Math.floor((bucket * finite.length) / buckets);
    const to = Math.floor(((bucket + 1) * finite.length) / buckets);
    let lowest = finite[from];
    let highest = finite[from];
    for (let i = from; i < to; i++) {
      if (y[finite[i]] < y[lowest]) lowest = finite[i];
      if (y[finite[i]] > y[highest]) highest = finite[i];
    }
    kept.add(lowest).add(highest);
  }
  return [...kept].sort((a, b) => a - b);
}

/** A tenth of a decade is finer than a band of colour. */
function plainHeat({ values, floor, ...rest }: Heat): Heat {
  const plain = new Array<number>(values.length);
  for (let i = 0; i < values.length; i++) plain[i] = values[i] > floor ? Math.round(values[i] * 20) / 20 : floor;
  return { ...rest, floor, values: plain };
}

/** All with the same place of rounding, so that the largest keeps `count` digits. */
function digits(values: ArrayLike<number>, count: number): number[] {
  let largest = 0;
  for (let i = 0; i < values.length; i++)
    if (Number.isFinite(values[i])) largest = Math.max(largest, Math.abs(values[i]));
  const places = largest > 0 ? count - 1 - Math.floor(Math.log10(largest)) : 0;
  const plain: number[] = [];
  for (let i = 0; i < values.length; i++) if (Number.isFinite(values[i])) plain.push(roundedTo(values[i], places));
  return plain;
}

/** Rounded to decimal places (negative: tens, hundreds, …); a power of ten divides exactly enough to print short. */
function roundedTo(value: number, places: number): number {
  const scale = 10 ** Math.abs(places);
  if (!Number.isFinite(scale)) return value;
  return (places >= 0 ? Math.round(value * scale) / scale : Math.round(value / scale) * scale) + 0;
}
