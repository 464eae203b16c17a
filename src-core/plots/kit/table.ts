import { scaleLinear } from 'd3-scale';
import type { PlotDescription } from '../types';
import { nearestValues } from './read';
import { showValue } from './values';

export interface DataTable {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly string[])[];
  /** Limits and marks in words. */
  readonly notes: readonly string[];
}

/** The plot as a table that a person can read through: a row every twentieth of the axis, or one for each stem. */
export function tableOf(description: PlotDescription): DataTable {
  const { x, series, limits, marks, y } = description;
  const stems = series.find(({ draw }) => draw === 'stems');
  const places = stems ? Array.from(stems.x) : scaleLinear().domain(x.domain).ticks(20);
  const rows: string[][] = [];
  for (const place of places) {
    const reading = nearestValues(description, place);
    if (!reading || rows.at(-1)?.[0] === reading.xText) continue;
    rows.push([
      reading.xText,
      ...series.map(({ name }) => reading.values.find((value) => value.name === name)?.text ?? ''),
    ]);
  }
  return {
    columns: [x.label, ...series.map(({ name }) => name)],
    rows,
    notes: [
      ...limits.map(({ name, met }) => `Limit ${name}: ${met ? 'met' : 'not met'}.`),
      ...marks.map((mark) => `${mark.label}: ${showValue(mark.x, x.unit)}, ${showValue(mark.y, y.unit)}.`),
    ],
  };
}
