import type { PlotDescription } from '../types';
import { colourOf, dashOf, type Palette } from './palette';
import { escapeMarkup, shortened, tag, textWidth } from './svg';

export interface LegendEntry {
  readonly kind: 'line' | 'stems' | 'limit' | 'missed-limit';
  /** Of the series, for its dash and colour. */
  readonly index: number;
  readonly text: string;
  readonly left: number;
  readonly row: number;
  readonly baseline: number;
}

const sample = 24;

/** Entries in reading order, wrapped into rows no wider than `width`. */
export function layLegend(
  description: PlotDescription,
  width: number,
  fontSize: number,
  lineHeight: number,
): LegendEntry[] {
  const wanted = [
    ...description.series.map(({ name, draw }, index) => ({
      kind: draw === 'stems' ? ('stems' as const) : ('line' as const),
      index,
      text: name,
    })),
    ...description.limits.map(({ name, met }, index) => ({
      kind: met ? ('limit' as const) : ('missed-limit' as const),
      index,
      text: `limit ${shortened(name, 40)}${met ? '' : ' (not met)'}`,
    })),
  ];
  const most = Math.max(6, Math.floor((width - sample - 20) / (0.62 * fontSize)));
  let left = 8;
  let row = 0;
  return wanted.map((entry) => {
    const text = shortened(entry.text, most);
    const needed = sample + 6 + textWidth(text, fontSize) + 16;
    if (left > 8 && left + needed > width) {
      left = 8;
      row++;
    }
    const placed = { ...entry, text, left, row, baseline: 13 + row * lineHeight };
    left += needed;
    return placed;
  });
}

export function drawLegend(entries: readonly LegendEntry[], palette: Palette): string {
  return entries
    .map((entry) => {
      const y = entry.baseline - 4;
      return (
        legendSample(entry, y, palette) +
        tag('text', { x: entry.left + sample + 6, y: entry.baseline, fill: palette.text }, escapeMarkup(entry.text))
      );
    })
    .join('');
}

function legendSample({ kind, index, left }: LegendEntry, y: number, palette: Palette): string {
  const line = { x1: left, x2: left + sample, y1: y, y2: y, fill: 'none' };
  if (kind === 'limit') return tag('line', { ...line, stroke: palette.limit, 'stroke-width': 2.5 });
  if (kind === 'missed-limit') return tag('line', { ...line, stroke: palette.missed, 'stroke-width': 2.5 });
  const stroke = colourOf(palette, index);
  if (kind === 'line') return tag('line', { ...line, stroke, 'stroke-width': 2, 'stroke-dasharray': dashOf(index) });
  const middle = left + sample / 2;
  return (
    tag('line', { x1: middle, x2: middle, y1: y + 5, y2: y - 3, stroke, 'stroke-width': 1.5 }) +
    stemHead(middle, y - 3, index, stroke, palette)
  );
}

/** A filled dot for every even series, a ring for every odd one, so that two sets of stems differ without colour. */
export function stemHead(cx: number, cy: number, index: number, stroke: string, palette: Palette): string {
  const filled = index % 2 === 0;
  return tag('circle', {
    cx,
    cy,
    r: filled ? 3 : 4,
    fill: filled ? stroke : palette.background,
    stroke,
    'stroke-width': 1.5,
  });
}
