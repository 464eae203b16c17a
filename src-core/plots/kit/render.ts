import type { PlotDescription } from '../types';
import { drawSeries } from './curves';
import { drawContours, drawHeat, drawHeatBar } from './heat';
import { layoutOf, type PlotLayout, type PlotSize } from './layout';
import { drawLegend } from './legend';
import { drawLimit, limitPatterns } from './limits';
import { drawMarks } from './marks';
import { type Palette, type PaletteName, palettes } from './palette';
import { escapeMarkup, px, shortened, tag } from './svg';

export interface RenderOptions extends PlotSize {
  /** `vars`: custom properties `--plot-…` with print colours behind them; `print`: fixed colours on white. */
  readonly theme: PaletteName;
  /** Makes the ids inside unique where several drawings share a page; letters, digits and `-`. */
  readonly idPrefix: string;
  /** Marks take the focus and have a role. Off in files and reports. */
  readonly interactive?: boolean;
  /** How a density is drawn; `contours` for themes in which a colour map cannot be told apart. */
  readonly heat?: 'levels' | 'contours';
}

/** A plot as SVG text: pure, the same bytes for the same arguments, no number that is not finite, all text escaped. */
export function renderSvg(description: PlotDescription, options: RenderOptions): string {
  const { theme, idPrefix, interactive = false, heat = 'levels' } = options;
  const palette = palettes[theme];
  const layout = layoutOf(description, options);
  const { area, width, height } = layout;
  const title = description.stale ? `~ ${description.title}` : description.title;
  const clip = `${idPrefix}-clip`;
  const defs = tag(
    'defs',
    {},
    tag('clipPath', { id: clip }, tag('rect', { x: area.left, y: area.top, width: area.width, height: area.height })) +
      limitPatterns(idPrefix, palette),
  );
  const content = [
    tag('title', { id: `${idPrefix}-title` }, escapeMarkup(title)),
    tag('desc', { id: `${idPrefix}-desc` }, escapeMarkup(description.summary)),
    defs,
    theme === 'print' ? tag('rect', { x: 0, y: 0, width, height, fill: palette.background }) : '',
    drawGrid(layout, palette),
    drawGuides(description, layout, palette),
    tag(
      'g',
      { 'clip-path': `url(#${clip})`, opacity: description.stale ? '0.55' : undefined },
      drawInside(description, layout, palette, idPrefix, heat),
    ),
    drawFrame(layout, palette),
    description.heat ? drawHeatBar(description.heat, layout, palette, heat) : '',
    drawMarks(description.marks, layout, palette, interactive),
    drawLegend(layout.legend, palette),
  ];
  return tag(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      class: description.stale ? 'plot plot-stale' : 'plot',
      width,
      height,
      viewBox: `0 0 ${px(width)} ${px(height)}`,
      role: interactive ? 'group' : 'img',
      'aria-labelledby': `${idPrefix}-title ${idPrefix}-desc`,
      'font-size': layout.fontSize,
      'font-family': theme === 'print' ? 'system-ui, sans-serif' : undefined,
    },
    content.join(''),
  );
}

function drawInside(
  { series, limits, heat }: PlotDescription,
  layout: PlotLayout,
  palette: Palette,
  idPrefix: string,
  heatAs: 'levels' | 'contours',
): string {
  const density = heat ? (heatAs === 'levels' ? drawHeat(heat, layout) : drawContours(heat, layout, palette)) : '';
  const drawn = (limit: PlotDescription['limits'][number]) => drawLimit(limit, layout, palette, idPrefix);
  const masks = limits.filter(({ forbidden }) => forbidden === 'inside');
  return [
    density,
    ...limits.filter((limit) => !masks.includes(limit)).map(drawn),
    ...series.map((one, index) => drawSeries(one, index, layout, palette)),
    // a mask lies inside the contour that it is held against, whose halo must not hide it
    ...masks.map(drawn),
  ].join('');
}

function drawGrid({ area, x, y }: PlotLayout, palette: Palette): string {
  const line = { stroke: palette.grid, 'stroke-width': 1 };
  const columns = x.ticks.map(({ pixel }) =>
    tag('line', { x1: pixel, x2: pixel, y1: area.top, y2: area.top + area.height, ...line }),
  );
  const rows = y.ticks.map(({ pixel }) =>
    tag('line', { x1: area.left, x2: area.left + area.width, y1: pixel, y2: pixel, ...line }),
  );
  return tag('g', { class: 'plot-grid' }, columns.join('') + rows.join(''));
}

/** Thin dotted lines with their word at the foot, for values that one looks for. */
function drawGuides({ guides = [] }: PlotDescription, { area, x, fontSize }: PlotLayout, palette: Palette): string {
  return guides
    .map(({ x: value, label }) => {
      const pixel = x.toPixel(value);
      if (!(pixel > area.left && pixel < area.left + area.width)) return '';
      const bottom = area.top + area.height;
      const line = tag('line', {
        x1: pixel,
        x2: pixel,
        y1: area.top,
        y2: bottom,
        stroke: palette.frame,
        'stroke-dasharray': '1 3',
      });
      return (
        line +
        tag('text', { x: pixel + 4, y: bottom - 5, fill: palette.text, 'font-size': fontSize - 1 }, escapeMarkup(label))
      );
    })
    .join('');
}

function drawFrame(layout: PlotLayout, palette: Palette): string {
  const { area, x, y, height } = layout;
  const bottom = area.top + area.height;
  const label = (text: string, at: Record<string, string | number>) =>
    tag('text', { ...at, fill: palette.text }, escapeMarkup(text));
  return tag(
    'g',
    { class: 'plot-axes' },
    tag('path', {
      d: `M${px(area.left)},${px(area.top)}V${px(bottom)}H${px(area.left + area.width)}`,
      fill: 'none',
      stroke: palette.frame,
    }) +
      x.ticks.map(({ pixel, text }) => label(text, { x: pixel, y: bottom + 15, 'text-anchor': 'middle' })).join('') +
      y.ticks.map(({ pixel, text }) => label(text, { x: area.left - 5, y: pixel + 4, 'text-anchor': 'end' })).join('') +
      label(x.title, { x: area.left + area.width / 2, y: height - 6, 'text-anchor': 'middle' }) +
      label(shortened(y.title, Math.floor((area.height + 40) / (0.6 * layout.fontSize))), {
        transform: `translate(13,${px(area.top + area.height / 2)}) rotate(-90)`,
        'text-anchor': 'middle',
      }),
  );
}
