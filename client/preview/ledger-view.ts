import { LOSS_SO_FAR, ledgerLines } from '../../src-core/plots/ledger-lines';
import type { LedgerTable, PreviewData } from '../../src-core/plots/preview-data';
import type { Actions } from './app';
import { element, setAttribute, setText } from './dom';

export interface LedgerView {
  readonly node: HTMLElement;
  update(data: PreviewData): void;
  setCurrent(name: string | undefined): void;
}

/** What each element spends and of which budget. One row takes the focus; arrows move it, Enter selects the row's lines. */
export function ledgerView(actions: Actions): LedgerView {
  const head = element('thead');
  const body = element('tbody');
  const table = element(
    'table',
    { role: 'grid', 'aria-labelledby': 'ledger-heading', 'aria-readonly': 'true' },
    head,
    body,
  );
  const owners = element('p', { class: 'owners' });
  const missing = element('p', { class: 'quiet nothing' });
  const node = element(
    'section',
    { class: 'ledger', 'aria-labelledby': 'ledger-heading' },
    element('h2', { id: 'ledger-heading' }, 'What each element spends'),
    element('div', { class: 'scroll' }, table),
    owners,
    missing,
  );
  let shown: LedgerTable | undefined;
  let focused = 0;
  let current: string | undefined;

  const rows = () => [...body.rows];
  const select = (index: number) => {
    const row = shown?.rows[index];
    if (row?.at) actions.select(row.at, row.element);
  };
  const moveTo = (index: number) => {
    focused = Math.min(rows().length - 1, Math.max(0, index));
    rove();
    rows()[focused]?.focus();
  };
  const rove = () => {
    for (const [i, row] of rows().entries()) setAttribute(row, 'tabindex', i === focused ? '0' : '-1');
  };
  const markCurrent = () => {
    for (const [i, row] of rows().entries()) {
      const own = shown?.rows[i];
      setAttribute(row, 'aria-selected', own && own.element === current ? 'true' : own ? 'false' : undefined);
    }
  };

  body.addEventListener('click', (event) => {
    const index = rows().findIndex((row) => row.contains(event.target as Node));
    if (index < 0) return;
    moveTo(index);
    select(index);
  });
  body.addEventListener('keydown', (event) => {
    const target = (
      { ArrowDown: focused + 1, ArrowUp: focused - 1, Home: 0, End: Number.MAX_SAFE_INTEGER } as Record<string, number>
    )[event.key];
    if (target !== undefined) moveTo(target);
    else if (event.key === 'Enter' || event.key === ' ') select(focused);
    else return;
    event.preventDefault();
  });

  return {
    node,
    update({ ledger, plots }) {
      shown = ledger;
      node.classList.toggle('is-empty', !ledger);
      setText(missing, ledger ? '' : (plots[0]?.missing ?? ''));
      const lines = ledger && ledgerLines(ledger);
      fill(head, lines ? [lines.head] : [], 'th');
      fill(body, lines?.rows ?? [], 'td');
      setText(owners, ledger ? ledger.owners.map(({ owner, text }) => `${owner}: ${text}`).join(' · ') : '');
      if (ledger) for (const [i, row] of rows().entries()) showShare(row, ledger.rows[i]?.share);
      focused = Math.min(focused, Math.max(0, rows().length - 1));
      rove();
      markCurrent();
    },
    setCurrent(name) {
      current = name;
      markCurrent();
    },
  };
}

/** Rows and cells are kept and rewritten where they differ: no flash, and the focus stays. */
function fill(section: HTMLTableSectionElement, texts: readonly (readonly string[])[], cell: 'th' | 'td'): void {
  while (section.rows.length > texts.length) section.rows[section.rows.length - 1].remove();
  for (const [i, cells] of texts.entries()) {
    const row = section.rows[i] ?? section.appendChild(element('tr'));
    while (row.cells.length > cells.length) row.cells[row.cells.length - 1].remove();
    for (const [j, text] of cells.entries()) {
      const made = row.cells[j] ?? row.appendChild(element(cell, cell === 'th' ? { scope: 'col' } : {}));
      setText(made, text);
    }
  }
}

const svgNamespace = 'http://www.w3.org/2000/svg';

/** A thin bar under the loss so far: how much of what the path may lose is spent. The text says it too. */
function showShare(row: HTMLTableRowElement, share: number | undefined): void {
  const cell = row.cells[LOSS_SO_FAR];
  const known = cell?.querySelector('svg');
  if (!cell || share === undefined) {
    known?.remove();
    return;
  }
  const svg = known ?? cell.appendChild(shareBar());
  svg.setAttribute('class', share > 1 ? 'share over' : 'share');
  svg.lastElementChild?.setAttribute('width', String(Math.round(100 * Math.min(1, Math.max(0, share)))));
}

function shareBar(): SVGElement {
  const svg = document.createElementNS(svgNamespace, 'svg');
  for (const [key, value] of Object.entries({
    viewBox: '0 0 100 3',
    preserveAspectRatio: 'none',
    'aria-hidden': 'true',
  })) {
    svg.setAttribute(key, value);
  }
  for (const name of ['share-all', 'share-spent']) {
    const rect = svg.appendChild(document.createElementNS(svgNamespace, 'rect'));
    for (const [key, value] of Object.entries({ class: name, width: '100', height: '3' }))
      rect.setAttribute(key, value);
  }
  return svg;
}
