import type { PlotDescription } from '../types';
import { type LaidAxis, layAxis } from './axis';
import { type LegendEntry, layLegend } from './legend';
import { textWidth } from './svg';

export interface Zoom {
  readonly x?: readonly [number, number];
  readonly y?: readonly [number, number];
}

export interface PlotSize {
  readonly width: number;
  readonly height: number;
  readonly zoom?: Zoom;
}

/** Where things stand in a drawing, in pixels; the page turns pointers into values with it. */
export interface PlotLayout {
  readonly width: number;
  readonly height: number;
  readonly fontSize: number;
  readonly area: { readonly left: number; readonly top: number; readonly width: number; readonly height: number };
  readonly x: LaidAxis;
  readonly y: LaidAxis;
  readonly legend: readonly LegendEntry[];
}

const lineHeight = 17;
export const fontSize = 11.5;
const barWidth = 74;

/** Pure: the same description and size give the same layout. */
export function layoutOf(description: PlotDescription, { width, height, zoom }: PlotSize): PlotLayout {
  const legend = layLegend(description, width - 8, fontSize, lineHeight);
  const rows = legend.length === 0 ? 0 : legend[legend.length - 1].row + 1;
  const top = 8 + rows * lineHeight;
  const bottom = height - 40;
  const areaHeight = Math.max(20, bottom - top);
  const { downwards } = description.y;
  const vertical = { direction: 'vertical', fontSize } as const;
  const range: [number, number] = downwards ? [top, top + areaHeight] : [top + areaHeight, top];
  const y = layAxis(description.y, zoom?.y, range, vertical);
  const left = 30 + Math.ceil(Math.max(12, ...y.ticks.map(({ text }) => textWidth(text, fontSize))));
  const areaWidth = Math.max(40, width - left - (description.heat ? barWidth : 14));
  const x = layAxis(description.x, zoom?.x, [left, left + areaWidth], { direction: 'horizontal', fontSize });
  return { width, height, fontSize, area: { left, top, width: areaWidth, height: areaHeight }, x, y, legend };
}
