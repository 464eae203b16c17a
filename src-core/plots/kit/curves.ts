import { line } from 'd3-shape';
import type { Series } from '../types';
import type { PlotLayout } from './layout';
import { stemHead } from './legend';
import { colourOf, dashOf, type Palette } from './palette';
import { tag } from './svg';

const path = line<readonly [number, number]>()
  .defined(([x, y]) => Number.isFinite(x) && Number.isFinite(y))
  .digits(2);

/** One series, in the style of its index. Values that are not finite leave a gap. */
export function drawSeries(series: Series, index: number, layout: PlotLayout, palette: Palette): string {
  const stroke = colourOf(palette, index);
  if (series.draw === 'stems') return drawStems(series, index, layout, palette, stroke);
  const loop = series.draw === 'loop';
  const points = loop ? allPoints(series, layout) : visiblePoints(series, layout);
  const d = path(points);
  if (!d) return '';
  const shape = { d: loop ? `${d}Z` : d, fill: 'none', 'stroke-linejoin': 'round' };
  // a loop lies on a density, whose colours it must stand out from
  const halo = loop ? tag('path', { ...shape, stroke: palette.background, 'stroke-width': 4.5 }) : '';
  return halo + tag('path', { ...shape, stroke, 'stroke-width': 1.75, 'stroke-dasharray': dashOf(index) });
}

function drawStems({ x, y }: Series, index: number, layout: PlotLayout, palette: Palette, stroke: string): string {
  const zero = clamp(layout.y.toPixel(0), layout.area.top, layout.area.top + layout.area.height);
  let text = '';
  for (let i = 0; i < x.length; i++) {
    if (!Number.isFinite(x[i]) || !Number.isFinite(y[i])) continue;
    const cx = layout.x.toPixel(x[i]);
    if (cx < layout.area.left - 5 || cx > layout.area.left + layout.area.width + 5) continue;
    const cy = layout.y.toPixel(y[i]);
    text += tag('line', { x1: cx, x2: cx, y1: zero, y2: cy, stroke, 'stroke-width': 1.5 });
    text += stemHead(cx, cy, index, stroke, palette);
  }
  return text;
}

function allPoints({ x, y }: Series, layout: PlotLayout): [number, number][] {
  return Array.from({ length: x.length }, (_, i) => [layout.x.toPixel(x[i]), layout.y.toPixel(y[i])]);
}

/** Points in view, with one neighbour at each end; of each half pixel only first, lowest, highest and last. x ascends. */
function visiblePoints({ x, y }: Series, layout: PlotLayout): [number, number][] {
  const [from, to] = layout.x.domain;
  let first = lowerBound(x, from);
  let last = lowerBound(x, to);
  first = Math.max(0, first - 1);
  last = Math.min(x.length - 1, last + 1);
  const points: [number, number][] = [];
  const thin = last - first > 4 * layout.area.width;
  let bucket: [number, number][] = [];
  let column = Number.NaN;
  for (let i = first; i <= last; i++) {
    const point: [number, number] = [layout.x.toPixel(x[i]), layout.y.toPixel(y[i])];
    if (!thin) {
      points.push(point);
      continue;
    }
    const own = Math.floor(point[0]);
    if (own !== column) {
      points.push(...extremes(bucket));
      bucket = [];
      column = own;
    }
    bucket.push(point);
  }
  points.push(...extremes(bucket));
  return points;
}

function extremes(bucket: readonly [number, number][]): readonly [number, number][] {
  if (bucket.length <= 4) return bucket;
  let lowest = 0;
  let highest = 0;
  for (let i = 1; i < bucket.length; i++) {
    if (bucket[i][1] < bucket[lowest][1]) lowest = i;
    if (bucket[i][1] > bucket[highest][1]) highest = i;
  }
  const kept = [...new Set([0, lowest, highest, bucket.length - 1])].sort((a, b) => a - b);
  return kept.map((i) => bucket[i]);
}

/** First index whose value is at least `wanted`; the length where there is none. `values` ascend. */
export function lowerBound(values: ArrayLike<number>, wanted: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (values[middle] < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}

export const clamp = (value: number, low: number, high: number): number => Math.min(high, Math.max(low, value));
