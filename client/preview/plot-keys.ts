import type { PlotControls } from './plot-view';
import { panned } from './zoom';

/** Arrows read, with Shift in larger steps, with Control they move a zoomed part; + and − zoom, 0 and Escape show all. */
export function plotKeys(surface: HTMLElement, controls: PlotControls, zoomBy: (factor: number) => void): void {
  surface.addEventListener('keydown', (event) => {
    const mark = (event.target as Element).closest('[data-mark]');
    if (mark && (event.key === 'Enter' || event.key === ' '))
      controls.selectMark(Number(mark.getAttribute('data-mark')));
    else if (!act(event, controls, zoomBy)) return;
    event.preventDefault();
    event.stopPropagation();
  });
  surface.addEventListener('focus', () => {
    if (controls.reading() === undefined) controls.step(1, 0);
  });
}

function act(event: KeyboardEvent, controls: PlotControls, zoomBy: (factor: number) => void): boolean {
  const { key } = event;
  const description = controls.description();
  if (!description || event.altKey || event.metaKey) return false;
  if (key === 'ArrowLeft' || key === 'ArrowRight') {
    const direction = key === 'ArrowRight' ? 1 : -1;
    if (event.ctrlKey) {
      const zoom = controls.zoom();
      controls.setZoom({ ...zoom, x: panned(description.x.domain, zoom.x, direction * 0.25) });
    } else controls.step(direction, event.shiftKey ? 0.05 : 0.004);
    return true;
  }
  if (event.ctrlKey) return false;
  const [from, to] = controls.zoom().x ?? description.x.domain;
  if (key === 'Home') controls.read(from, undefined, true);
  else if (key === 'End') controls.read(to, undefined, true);
  else if (key === '+' || key === '=') zoomBy(0.5);
  else if (key === '-') zoomBy(2);
  else if (key === '0' || (key === 'Escape' && (controls.zoom().x || controls.zoom().y))) controls.setZoom({});
  else return false;
  return true;
}
