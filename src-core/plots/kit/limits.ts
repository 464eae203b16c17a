import type { PlotLimit } from '../types';
import type { PlotLayout } from './layout';
import type { Palette } from './palette';
import { px, tag } from './svg';

/** Thickness of the hatched strip on the forbidden side, pixels. */
const strip = 8;
/** Half the width of the bar that shows a limit at a single place, pixels. */
const halfBar = 16;

/** Two hatch patterns, to be put into `defs`: for limits that are met and for those that are not. */
export function limitPatterns(idPrefix: string, palette: Palette): string {
  const hatch = (id: string, stroke: string) =>
    tag(
      'pattern',
      { id, width: 6, height: 6, patternUnits: 'userSpaceOnUse', patternTransform: 'rotate(45)' },
      tag('line', { x1: 0, y1: 0, x2: 0, y2: 6, stroke, 'stroke-width': 2 }),
    );
  return hatch(`${idPrefix}-hatch`, palette.limit) + hatch(`${idPrefix}-hatch-missed`, palette.missed);
}

/** The limit as a line with a hatched strip on the side that is not allowed; a closed mask is hatched inside. */
export function drawLimit(limit: PlotLimit, layout: PlotLayout, palette: Palette, idPrefix: string): string {
  const points = pixelPoints(limit, layout);
  if (points.length === 0) return '';
  const stroke = limit.met ? palette.limit : palette.missed;
  const fill = `url(#${idPrefix}-${limit.met ? 'hatch' : 'hatch-missed'})`;
  const line = { fill: 'none', stroke, 'stroke-width': 2.5 };
  const d = `M${points.map(([x, y]) => `${px(x)},${px(y)}`).join('L')}`;
  if (limit.forbidden === 'inside') {
    return (
      tag('path', { d: `${d}Z`, fill, 'fill-opacity': '0.55', stroke: 'none' }) + tag('path', { ...line, d: `${d}Z` })
    );
  }
  const down = (limit.forbidden === 'above') === layout.y.toPixel(1) > layout.y.toPixel(0) ? strip : -strip;
  const back = [...points].reverse().map(([x, y]) => `${px(x)},${px(y + down)}`);
  const hatched = limit.forbidden ? tag('path', { d: `${d}L${back.join('L')}Z`, fill, stroke: 'none' }) : '';
  return hatched + tag('path', { ...line, d });
}

function pixelPoints({ x, y }: PlotLimit, layout: PlotLayout): [number, number][] {
  const points: [number, number][] = [];
  for (let i = 0; i < x.length; i++) {
    if (Number.isFinite(x[i]) && Number.isFinite(y[i])) points.push([layout.x.toPixel(x[i]), layout.y.toPixel(y[i])]);
  }
  if (points.length !== 1) return points;
  const [[cx, cy]] = points;
  return [
    [cx - halfBar, cy],
    [cx + halfBar, cy],
  ];
}
