import type { Mark } from '../types';
import type { PlotLayout } from './layout';
import type { Palette } from './palette';
import { escapeMarkup, shortened, tag, textWidth } from './svg';

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/**
 * Marks in view, each with its label where there is room for it (a label that would cover another is left out; its text
 * stays in the mark's own name). `interactive`: focusable, and named for the screen reader.
 */
export function drawMarks(marks: readonly Mark[], layout: PlotLayout, palette: Palette, interactive: boolean): string {
  const taken: Box[] = [];
  return marks
    .map((mark, index) => {
      const cx = layout.x.toPixel(mark.x);
      const cy = layout.y.toPixel(mark.y);
      if (!inside(cx, cy, layout)) return '';
      taken.push({ left: cx - 5, right: cx + 5, top: cy - 5, bottom: cy + 5 });
      return { mark, index, cx, cy };
    })
    .map((placed) =>
      placed === '' ? '' : drawMark(placed, labelFor(placed, layout, taken), layout, palette, interactive),
    )
    .join('');
}

interface Placed {
  readonly mark: Mark;
  readonly index: number;
  readonly cx: number;
  readonly cy: number;
}

function drawMark(
  { mark, index, cx, cy }: Placed,
  label: { text: string; x: number; y: number } | undefined,
  layout: PlotLayout,
  palette: Palette,
  interactive: boolean,
): string {
  const selects = interactive && mark.element !== undefined;
  const own = {
    class: selects ? 'plot-mark plot-mark-element' : 'plot-mark',
    'data-mark': String(index),
    'data-element': mark.element,
    tabindex: selects ? '0' : undefined,
    role: selects ? 'button' : undefined,
    'aria-label': selects ? mark.label : undefined,
  };
  const halo = { stroke: palette.background, 'stroke-width': 3, 'paint-order': 'stroke', 'stroke-linejoin': 'round' };
  return tag(
    'g',
    own,
    tag('title', {}, escapeMarkup(mark.label)) +
      tag('circle', { cx, cy, r: 11, fill: 'transparent', class: 'plot-mark-reach' }) +
      tag('circle', {
        cx,
        cy,
        r: 4.5,
        fill: palette.background,
        stroke: palette.mark,
        'stroke-width': 1.75,
        class: 'plot-mark-dot',
      }) +
      (label
        ? tag(
            'text',
            { x: label.x, y: label.y, fill: palette.text, 'font-size': layout.fontSize, ...halo },
            escapeMarkup(label.text),
          )
        : ''),
  );
}

function labelFor({ mark, cx, cy }: Placed, layout: PlotLayout, taken: Box[]) {
  const { area, fontSize } = layout;
  const text = shortened(mark.label, 34);
  const width = textWidth(text, fontSize);
  const places = [
    { x: cx + 8, y: cy + 4 },
    { x: cx - 8 - width, y: cy + 4 },
    { x: cx - width / 2, y: cy + fontSize + 8 },
    { x: cx - width / 2, y: cy - 9 },
    { x: cx + 8, y: cy + 4 + fontSize },
    { x: cx - 8 - width, y: cy + 4 + fontSize },
  ];
  for (const { x, y } of places) {
    const box = { left: x - 2, right: x + width + 2, top: y - fontSize, bottom: y + 3 };
    if (box.left < area.left || box.right > area.left + area.width) continue;
    if (box.top < area.top || box.bottom > area.top + area.height) continue;
    if (taken.some((other) => overlap(box, other))) continue;
    taken.push(box);
    return { text, x, y };
  }
  return undefined;
}

const overlap = (a: Box, b: Box): boolean =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

function inside(x: number, y: number, { area }: PlotLayout): boolean {
  return (
    x >= area.left - 0.5 &&
    x <= area.left + area.width + 0.5 &&
    y >= area.top - 0.5 &&
    y <= area.top + area.height + 0.5
  );
}
