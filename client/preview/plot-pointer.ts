import type { PlotControls } from './plot-view';
import { between, zoomed } from './zoom';

/** A drag shorter than this is a click, pixels; a flat one zooms x alone. */
const leastDrag = 6;
const flat = 24;

/** Pointing reads values, dragging zooms to the box, the wheel zooms while Control (or Command) is held, a double click shows all. */
export function plotPointer(surface: HTMLElement, box: HTMLElement, controls: PlotControls): void {
  let start: { x: number; y: number } | undefined;
  const at = (event: MouseEvent) => {
    const { left, top } = surface.getBoundingClientRect();
    return { x: event.clientX - left - surface.clientLeft, y: event.clientY - top - surface.clientTop };
  };

  surface.addEventListener('pointerdown', (event) => {
    if (event.button !== 0 || (event.target as Element).closest('[data-element]')) return;
    start = at(event);
    surface.setPointerCapture(event.pointerId);
  });
  surface.addEventListener('pointermove', (event) => {
    const layout = controls.layout();
    if (!layout) return;
    const point = at(event);
    if (start) showBox(box, start, point, layout.area);
    const { left, width, top, height } = layout.area;
    const inside = point.x >= left && point.x <= left + width && point.y >= top && point.y <= top + height;
    if (inside) controls.read(layout.x.fromPixel(point.x), layout.y.fromPixel(point.y), false);
  });
  surface.addEventListener('pointerup', (event) => {
    box.hidden = true;
    if (start) zoomToBox(start, at(event), controls);
    start = undefined;
  });
  surface.addEventListener('pointercancel', () => {
    box.hidden = true;
    start = undefined;
  });
  surface.addEventListener('dblclick', (event) => {
    if (!(event.target as Element).closest('[data-element]')) controls.setZoom({});
  });
  surface.addEventListener('click', (event) => {
    const mark = (event.target as Element).closest('[data-element]');
    if (mark) controls.selectMark(Number(mark.getAttribute('data-mark')));
  });
  surface.addEventListener(
    'wheel',
    (event) => {
      const layout = controls.layout();
      const description = controls.description();
      if (!layout || !description || !(event.ctrlKey || event.metaKey)) return;
      event.preventDefault();
      const zoom = controls.zoom();
      const factor = 2 ** (Math.max(-100, Math.min(100, event.deltaY)) / 150);
      controls.setZoom({ ...zoom, x: zoomed(description.x.domain, zoom.x, factor, layout.x.fromPixel(at(event).x)) });
    },
    { passive: false },
  );
}

interface Point {
  readonly x: number;
  readonly y: number;
}

function zoomToBox(a: Point, b: Point, controls: PlotControls): void {
  const layout = controls.layout();
  const description = controls.description();
  if (!layout || !description || Math.abs(a.x - b.x) < leastDrag) return;
  const shown = controls.zoom();
  const x = between(shown.x ?? description.x.domain, layout.x.fromPixel(a.x), layout.x.fromPixel(b.x));
  const tall = Math.abs(a.y - b.y) >= flat;
  const y = tall ? between(shown.y ?? description.y.domain, layout.y.fromPixel(a.y), layout.y.fromPixel(b.y)) : shown.y;
  controls.setZoom({ x: x ?? shown.x, y });
}

function showBox(
  box: HTMLElement,
  a: Point,
  b: Point,
  area: { left: number; top: number; width: number; height: number },
): void {
  const tall = Math.abs(a.y - b.y) >= flat;
  const left = Math.max(area.left, Math.min(a.x, b.x));
  const right = Math.min(area.left + area.width, Math.max(a.x, b.x));
  const top = tall ? Math.max(area.top, Math.min(a.y, b.y)) : area.top;
  const bottom = tall ? Math.min(area.top + area.height, Math.max(a.y, b.y)) : area.top + area.height;
  box.hidden = right - left < leastDrag;
  box.style.left = `${left}px`;
  box.style.top = `${top}px`;
  box.style.width = `${Math.max(0, right - left)}px`;
  box.style.height = `${Math.max(0, bottom - top)}px`;
}
