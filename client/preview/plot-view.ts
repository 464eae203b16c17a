import { csvOf } from '../../src-core/plots/kit/csv';
import { layoutOf, type PlotLayout } from '../../src-core/plots/kit/layout';
import { nearestValues, neighbour } from '../../src-core/plots/kit/read';
import { renderSvg } from '../../src-core/plots/kit/render';
import type { PreviewPlot } from '../../src-core/plots/preview-data';
import type { PlotDescription } from '../../src-core/plots/types';
import type { Actions } from './app';
import { element, setText, withCode } from './dom';
import { plotKeys } from './plot-keys';
import { plotPointer } from './plot-pointer';
import { plotTable } from './plot-table';
import { fitted, type Zoom, zoomed } from './zoom';

export interface PlotView {
  readonly node: HTMLElement;
  update(plot: PreviewPlot): void;
  /** Draws again if size, theme or description ask for it. */
  draw(): void;
  setCurrent(name: string | undefined): void;
}

/** What pointer and keys do to a plot. */
export interface PlotControls {
  description(): PlotDescription | undefined;
  layout(): PlotLayout | undefined;
  zoom(): Zoom;
  setZoom(zoom: Zoom): void;
  /** Moves the reading line to a value of x; `speak`: also to the screen reader. */
  read(x: number, y: number | undefined, speak: boolean): void;
  reading(): number | undefined;
  step(direction: 1 | -1, share: number): void;
  selectMark(index: number): void;
}

export function plotView(name: string, actions: Actions): PlotView {
  const heading = element('h2', { id: `${name}-heading` });
  const summary = element('p', { class: 'summary', id: `${name}-summary` });
  const drawing = element('div', { class: 'drawing' });
  const line = element('div', { class: 'reading-line', hidden: '', 'aria-hidden': 'true' });
  const box = element('div', { class: 'zoom-box', hidden: '', 'aria-hidden': 'true' });
  const surface = element(
    'div',
    {
      class: 'surface',
      tabindex: '0',
      role: 'application',
      'aria-labelledby': `${name}-heading`,
      'aria-describedby': `${name}-summary ${name}-keys`,
    },
    drawing,
    line,
    box,
  );
  const keys = element(
    'p',
    { class: 'hidden', id: `${name}-keys` },
    'Left and right arrow read values, plus and minus zoom, 0 shows all, Tab goes to the marks.',
  );
  const reading = element('p', { class: 'reading', 'aria-hidden': 'true' });
  const spoken = element('p', { class: 'hidden', 'aria-live': 'polite' });
  const table = plotTable(name, actions);
  const tools = element('div', { class: 'tools', role: 'group', 'aria-labelledby': `${name}-heading` });
  const content = element('div', { class: 'plot-content' }, summary, surface, keys, reading, spoken, table.node);
  const missing = element('p', { class: 'nothing' });
  const node = element(
    'section',
    { class: 'plot-card', 'aria-labelledby': `${name}-heading` },
    element('div', { class: 'plot-head' }, heading, tools),
    content,
    missing,
  );

  let description: PlotDescription | undefined;
  let layout: PlotLayout | undefined;
  let drawn = '';
  let current: string | undefined;
  let readingAt: { x: number; y?: number } | undefined;

  const zoom = (): Zoom => {
    const kept = actions.zoomOf(name);
    return description ? { x: fitted(description.x.domain, kept.x), y: fitted(description.y.domain, kept.y) } : {};
  };
  const idle = () => (zoom().x || zoom().y ? 'Zoomed in.' : '');

  const controls: PlotControls = {
    description: () => description,
    layout: () => layout,
    zoom,
    setZoom(wanted) {
      actions.setZoom(name, wanted);
      draw();
    },
    read(x, y, speak) {
      readingAt = { x, y };
      showReading(speak);
    },
    reading: () => readingAt?.x,
    step(direction, share) {
      if (!description) return;
      const [from, to] = zoom().x ?? description.x.domain;
      const start = readingAt?.x ?? (from + to) / 2;
      const next = neighbour(description, start, direction, share * (to - from));
      controls.read(Math.min(to, Math.max(from, next)), undefined, true);
    },
    selectMark(index) {
      const mark = description?.marks[index];
      if (mark?.element !== undefined) actions.selectElement(mark.element);
    },
  };

  function showReading(speak: boolean): void {
    const found = description && readingAt && nearestValues(description, readingAt.x, readingAt.y);
    setText(reading, found ? found.text : idle());
    if (speak) setText(spoken, found ? found.text : '');
    const pixel = found && layout ? layout.x.toPixel(found.x) : undefined;
    const visible =
      pixel !== undefined &&
      layout &&
      pixel >= layout.area.left - 1 &&
      pixel <= layout.area.left + layout.area.width + 1;
    line.hidden = !visible;
    if (!visible || !layout) return;
    line.style.left = `${pixel}px`;
    line.style.top = `${layout.area.top}px`;
    line.style.height = `${layout.area.height}px`;
  }

  function draw(): void {
    if (!description) return;
    const width = Math.max(240, Math.floor(surface.clientWidth));
    const height = Math.round(Math.min(380, Math.max(230, width * 0.58)));
    const options = {
      width,
      height,
      zoom: zoom(),
      theme: 'vars',
      idPrefix: `plot-${name}`,
      interactive: true,
      heat: actions.heat(),
    } as const;
    const key = JSON.stringify([description, options]);
    if (key === drawn) return;
    drawn = key;
    const focusedMark = document.activeElement?.closest('[data-mark]')?.getAttribute('data-mark');
    const restore = focusedMark && drawing.contains(document.activeElement) ? focusedMark : undefined;
    drawing.innerHTML = renderSvg(description, options);
    layout = layoutOf(description, options);
    if (restore) (drawing.querySelector(`[data-mark="${restore}"]`) as SVGElement | null)?.focus();
    markCurrent();
    showReading(false);
    for (const button of zoomButtons)
      button.disabled = button.dataset.needsZoom === 'yes' && !options.zoom.x && !options.zoom.y;
  }

  function markCurrent(): void {
    for (const mark of drawing.querySelectorAll('[data-element]')) {
      mark.classList.toggle('is-current', mark.getAttribute('data-element') === current);
    }
  }

  const button = (text: string, label: string, act: () => void) => {
    const made = element('button', { type: 'button', 'aria-label': label, title: label }, text);
    made.addEventListener('click', act);
    tools.append(made);
    return made;
  };
  const zoomBy = (factor: number) => {
    if (!description) return;
    const shown = zoom();
    const { domain } = description.x;
    const [from, to] = shown.x ?? domain;
    controls.setZoom({ ...shown, x: zoomed(domain, shown.x, factor, readingAt?.x ?? (from + to) / 2) });
  };
  const zoomButtons = [
    button('+', 'Zoom in', () => zoomBy(0.5)),
    button('−', 'Zoom out', () => zoomBy(2)),
    button('All', 'Show all', () => controls.setZoom({})),
  ];
  for (const made of zoomButtons.slice(1)) made.dataset.needsZoom = 'yes';
  button('SVG', 'Save as SVG', () => {
    if (!description) return;
    const svg = renderSvg(description, { width: 960, height: 520, zoom: zoom(), theme: 'print', idPrefix: name });
    actions.save('svg', name, `<?xml version="1.0" encoding="UTF-8"?>\n${svg}\n`);
  });
  button('CSV', 'Save as CSV', () => description && actions.save('csv', name, csvOf(description)));
  tools.append(table.button);

  plotPointer(surface, box, controls);
  plotKeys(surface, controls, zoomBy);

  return {
    node,
    update(plot) {
      description = plot.description;
      setText(heading, plot.description?.stale ? `~ ${plot.title}` : plot.title);
      setText(summary, plot.description?.summary ?? '');
      missing.replaceChildren(...withCode(plot.missing ?? ''));
      node.classList.toggle('is-empty', !description);
      node.classList.toggle('is-stale', description?.stale === true);
      table.update(description);
      if (!description) drawn = '';
      draw();
    },
    draw,
    setCurrent(element_) {
      current = element_;
      markCurrent();
    },
  };
}
