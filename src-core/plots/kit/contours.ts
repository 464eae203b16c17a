import type { Heat } from '../types';
import type { PlotLayout } from './layout';
import { px } from './svg';

type Point = readonly [number, number];

/**
 * Line of equal value through a grid of cell centres, as unjoined segments of SVG path data.
 * Marching squares (Lorensen and Cleveland 1987, in two dimensions); a saddle is cut as its centre's mean says.
 */
export function contourPath(heat: Heat, level: number, layout: PlotLayout): string {
  const { columns, rows, values } = heat;
  const at = (column: number, row: number): Point => [
    layout.x.toPixel(heat.x[0] + ((heat.x[1] - heat.x[0]) * (column + 0.5)) / columns),
    layout.y.toPixel(heat.y[0] + ((heat.y[1] - heat.y[0]) * (row + 0.5)) / rows),
  ];
  let d = '';
  for (let row = 0; row + 1 < rows; row++) {
    for (let column = 0; column + 1 < columns; column++) {
      const i = row * columns + column;
      // corners in turn around the square
      const corners = [values[i], values[i + 1], values[i + columns + 1], values[i + columns]];
      const code = corners.reduce((sum, value, bit) => (value > level ? sum | (1 << bit) : sum), 0);
      if (code === 0 || code === 15) continue;
      const places = [at(column, row), at(column + 1, row), at(column + 1, row + 1), at(column, row + 1)];
      d += segments(corners, places, level);
    }
  }
  return d;
}

function segments(corners: readonly number[], places: readonly Point[], level: number): string {
  const crossings: Point[] = [];
  for (let side = 0; side < 4; side++) {
    const next = (side + 1) % 4;
    if (corners[side] > level === corners[next] > level) continue;
    const t = (level - corners[side]) / (corners[next] - corners[side]);
    crossings.push([
      places[side][0] + t * (places[next][0] - places[side][0]),
      places[side][1] + t * (places[next][1] - places[side][1]),
    ]);
  }
  if (crossings.length === 2) return segment(crossings[0], crossings[1]);
  const mean = corners.reduce((sum, value) => sum + value, 0) / 4;
  const [a, b, c, e] = crossings;
  // crossings stand on sides 0 to 3; where centre and corner 0 lie on one side, corners 1 and 3 are cut off
  return mean > level === corners[0] > level ? segment(a, b) + segment(c, e) : segment(a, e) + segment(b, c);
}

const segment = (from: Point, to: Point): string => `M${px(from[0])},${px(from[1])}L${px(to[0])},${px(to[1])}`;
