import { interpolateViridis } from 'd3-scale-chromatic';
import type { Heat } from '../types';
import { contourPath } from './contours';
import type { PlotLayout } from './layout';
import type { Palette } from './palette';
import { escapeMarkup, px, tag } from './svg';

/** Bands of equal width in log10 from the floor to the highest value; at most 24. */
export interface HeatLevels {
  readonly lowest: number;
  readonly step: number;
  readonly count: number;
}

const mostLevels = 24;

/** Whole or half decades, so that the bar reads well. */
export function levelsOf({ values, floor }: Heat): HeatLevels {
  let highest = floor;
  for (let i = 0; i < values.length; i++) if (values[i] > highest) highest = values[i];
  const span = Math.max(0.5, highest - floor);
  const step = [0.25, 0.5, 1, 2, 5].find((size) => span / size <= mostLevels - 1) ?? 10;
  return { lowest: floor, step, count: Math.max(1, Math.ceil(span / step - 1e-9)) };
}

const colourOfLevel = (level: number, count: number): string =>
  interpolateViridis(count === 1 ? 1 : level / (count - 1));

/** The density as one path a level, each row's runs of one level merged; what lies at the floor is left out. */
export function drawHeat(heat: Heat, layout: PlotLayout): string {
  const levels = levelsOf(heat);
  const { columns, rows, values } = heat;
  const paths: string[] = new Array(levels.count).fill('');
  const edge = (axis: 'x' | 'y', count: number) =>
    Array.from({ length: count + 1 }, (_, i) =>
      px(layout[axis].toPixel(heat[axis][0] + ((heat[axis][1] - heat[axis][0]) * i) / count)),
    );
  const xs = edge('x', columns);
  const ys = edge('y', rows);
  for (let row = 0; row < rows; row++) {
    let start = 0;
    while (start < columns) {
      const level = levelOf(values[row * columns + start], levels);
      let end = start + 1;
      while (end < columns && levelOf(values[row * columns + end], levels) === level) end++;
      if (level >= 0) paths[level] += `M${xs[start]},${ys[row]}H${xs[end]}V${ys[row + 1]}H${xs[start]}Z`;
      start = end;
    }
  }
  const drawn = paths.map((d, level) => (d === '' ? '' : tag('path', { d, fill: colourOfLevel(level, levels.count) })));
  return tag('g', { 'shape-rendering': 'crispEdges', class: 'plot-heat' }, drawn.join(''));
}

function levelOf(value: number, { lowest, step, count }: HeatLevels): number {
  if (!(value > lowest)) return -1;
  return Math.min(count - 1, Math.floor((value - lowest) / step));
}

/** Lines of equal density every few decades, for themes in which a colour map cannot be told apart. */
export function drawContours(heat: Heat, layout: PlotLayout, palette: Palette): string {
  const drawn = contourLevels(heat).map((level, i) => {
    const d = contourPath(heat, level, layout);
    if (d === '') return '';
    return tag('path', {
      d,
      fill: 'none',
      stroke: palette.text,
      'stroke-width': 1,
      'stroke-dasharray': contourDash(i),
    });
  });
  return tag('g', { class: 'plot-contours' }, drawn.join(''));
}

function contourLevels(heat: Heat): number[] {
  const { lowest, step, count } = levelsOf(heat);
  const highest = Math.floor(lowest + step * count);
  const apart = Math.max(1, Math.ceil((highest - lowest) / 6));
  const levels: number[] = [];
  for (let level = highest - 1; level > lowest && levels.length < 6; level -= apart) levels.push(level);
  return levels;
}

const contourDash = (index: number): string | undefined => [undefined, '6 2', '3 2', '1 2', '6 2 1 2', '2 4'][index];

/** The labelled bar at the right of the area. */
export function drawHeatBar(heat: Heat, layout: PlotLayout, palette: Palette, as: 'levels' | 'contours'): string {
  const { area, fontSize } = layout;
  const left = area.left + area.width + 10;
  const caption = tag(
    'text',
    {
      transform: `translate(${px(left + 58)},${px(area.top + area.height / 2)}) rotate(-90)`,
      'text-anchor': 'middle',
      fill: palette.text,
    },
    escapeMarkup(heat.unit),
  );
  return (
    caption +
    (as === 'levels' ? levelBar(heat, left, layout, palette) : contourKey(heat, left, area.top, fontSize, palette))
  );
}

function levelBar(heat: Heat, left: number, { area, fontSize }: PlotLayout, palette: Palette): string {
  const { lowest, step, count } = levelsOf(heat);
  const height = area.height / count;
  let text = '';
  for (let level = 0; level < count; level++) {
    const y = area.top + area.height - (level + 1) * height;
    text += tag('rect', { x: left, y, width: 10, height: height + 0.3, fill: colourOfLevel(level, count) });
  }
  const perLabel = Math.max(1, Math.ceil((fontSize * 1.6) / height), Math.ceil(1 / step));
  for (let level = 0; level <= count; level += perLabel) {
    const y = area.top + area.height - level * height;
    const label = powerOfTen(lowest + level * step);
    if (label) text += tag('text', { x: left + 14, y: y + 4, fill: palette.text }, label);
  }
  return text;
}

function contourKey(heat: Heat, left: number, top: number, fontSize: number, palette: Palette): string {
  return contourLevels(heat)
    .map((level, i) => {
      const y = top + 8 + i * fontSize * 1.5;
      return (
        tag('line', {
          x1: left,
          x2: left + 14,
          y1: y,
          y2: y,
          stroke: palette.text,
          'stroke-dasharray': contourDash(i),
        }) + tag('text', { x: left + 17, y: y + 4, fill: palette.text }, powerOfTen(level))
      );
    })
    .join('');
}

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** `10⁻¹²`; empty where the exponent is no whole number. */
export function powerOfTen(exponent: number): string {
  const whole = Math.round(exponent);
  if (Math.abs(whole - exponent) > 1e-9) return '';
  const digits = [...String(Math.abs(whole))].map((digit) => superscripts[Number(digit)]).join('');
  return `10${whole < 0 ? '⁻' : ''}${digits}`;
}
