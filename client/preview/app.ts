import type { PreviewData } from '../../src-core/plots/preview-data';
import type { Place } from '../../src-core/text/types';
import { element, setText } from './dom';
import { ledgerView } from './ledger-view';
import { type FromPage, type PageState, readToPage, type ThemeKind, type ToPage } from './messages';
import { overviewView } from './overview-view';
import { type PlotView, plotView } from './plot-view';
import { readState } from './state';
import type { Zoom } from './zoom';

/** What the page needs of its host: the editor's webview, or a test's double. */
export interface Host {
  postMessage(message: FromPage): void;
  getState(): unknown;
  setState(state: PageState): void;
}

/** What the views may do. */
export interface Actions {
  select(at: Place, element?: string): void;
  selectElement(name: string): void;
  save(format: 'svg' | 'csv', plot: string, content: string): void;
  zoomOf(plot: string): Zoom;
  setZoom(plot: string, zoom: Zoom): void;
  tableOpen(plot: string): boolean;
  setTableOpen(plot: string, open: boolean): void;
  heat(): 'levels' | 'contours';
}

/** Builds the page into `main`, follows messages, and keeps what a reload must not lose. */
export function startPage(host: Host, main: HTMLElement): void {
  let state = readState(host.getState());
  let data: PreviewData | undefined;
  let current = state.selected;
  const keep = (change: Partial<PageState>) => {
    state = { ...state, ...change };
    host.setState(state);
  };
  const setCurrent = (name: string | undefined) => {
    current = name;
    keep({ selected: name });
    ledger.setCurrent(name);
    for (const view of views.values()) view.setCurrent(name);
  };

  const actions: Actions = {
    select(at, name) {
      if (name !== undefined) setCurrent(name);
      host.postMessage({ type: 'select', at, ...(name !== undefined && { element: name }) });
    },
    selectElement(name) {
      const at = data?.ledger?.rows.find((row) => row.element === name)?.at;
      if (at) actions.select(at, name);
    },
    save: (format, plot, content) => host.postMessage({ type: 'save', format, name: plot, content }),
    zoomOf: (plot) => state.zooms?.[plot] ?? {},
    setZoom(plot, zoom) {
      const { [plot]: _, ...others } = state.zooms ?? {};
      keep({ zooms: zoom.x || zoom.y ? { ...others, [plot]: zoom } : others });
    },
    tableOpen: (plot) => state.tables?.includes(plot) ?? false,
    setTableOpen(plot, open) {
      const others = (state.tables ?? []).filter((name) => name !== plot);
      keep({ tables: open ? [...others, plot] : others });
    },
    heat: () => (isHighContrast() ? 'contours' : 'levels'),
  };

  const overview = overviewView(actions);
  const ledger = ledgerView(actions);
  const views = new Map<string, PlotView>();
  const pictures = element('div', { class: 'plots' });
  const status = element('p', { class: 'hidden', role: 'status' });
  const reason = element('p', { class: 'nothing' }, 'The channel is being computed.');
  const nameless = element('h1', { class: 'hidden' }, 'Channel preview');
  const nothing = element('div', {}, nameless, reason);
  const caution = element(
    'p',
    { class: 'quiet caution' },
    'Planning estimates, computed from nominal values. They do not replace a full-wave model, a measurement or the compliance test of the port.',
  );
  const content = element('div', { class: 'content is-empty' }, overview.node, pictures, ledger.node, caution);

  const drawAll = () => {
    for (const view of views.values()) view.draw();
  };
  const show = (next: PreviewData) => {
    const first = data === undefined;
    data = next;
    nothing.hidden = true;
    content.classList.remove('is-empty');
    setStale(undefined);
    overview.update(next);
    for (const plot of next.plots) {
      let view = views.get(plot.name);
      if (!view) {
        view = plotView(plot.name, actions);
        views.set(plot.name, view);
        pictures.append(view.node);
      }
      view.update(plot);
    }
    ledger.update(next);
    ledger.setCurrent(current);
    for (const view of views.values()) view.setCurrent(current);
    if (first && state.scrollTop) document.documentElement.scrollTop = state.scrollTop;
  };
  const setStale = (what: 'all' | 'eye' | undefined) => {
    content.classList.toggle('is-stale', what === 'all');
    content.classList.toggle('is-eye-stale', what === 'eye');
    setText(status, what === 'all' ? 'The figures belong to an older text.' : '');
  };

  const receive = (message: ToPage) => {
    if (message.type === 'data') {
      if (message.uri !== state.uri)
        keep(state.uri === undefined ? { uri: message.uri } : { uri: message.uri, zooms: {} });
      show(message.data);
    } else if (message.type === 'stale') setStale(message.what);
    else if (message.type === 'cursorElement') setCurrent(message.element ?? undefined);
    else if (message.type === 'theme') setTheme(message.kind);
    else {
      setText(reason, message.reason);
      nothing.hidden = false;
      nameless.hidden = data !== undefined;
      setStale(data ? 'all' : undefined);
    }
  };

  main.replaceChildren(status, nothing, content);
  window.addEventListener('message', ({ data: raw }: MessageEvent<unknown>) => {
    const message = readToPage(raw);
    if (message) receive(message);
  });
  let settled = 0;
  document.addEventListener('scroll', () => {
    window.clearTimeout(settled);
    settled = window.setTimeout(() => keep({ scrollTop: document.documentElement.scrollTop }), 150);
  });
  let width = 0;
  new ResizeObserver(() => {
    if (pictures.clientWidth !== width) drawAll();
    width = pictures.clientWidth;
  }).observe(pictures);
  new MutationObserver(drawAll).observe(document.body, { attributes: true, attributeFilter: ['class'] });
  forcedColours().addEventListener('change', drawAll);
  host.postMessage({ type: 'ready' });
}

const forcedColours = () => window.matchMedia('(forced-colors: active)');
const isHighContrast = () =>
  forcedColours().matches ||
  document.body.classList.contains('vscode-high-contrast') ||
  document.body.classList.contains('vscode-high-contrast-light');

function setTheme(kind: ThemeKind): void {
  for (const one of ['light', 'dark', 'high-contrast', 'high-contrast-light'])
    document.body.classList.toggle(`vscode-${one}`, one === kind);
}
