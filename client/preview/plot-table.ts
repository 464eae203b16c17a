import { tableOf } from '../../src-core/plots/kit/table';
import type { PlotDescription } from '../../src-core/plots/types';
import type { Actions } from './app';
import { element, setAttribute, setText, whenChanged } from './dom';

/** The plot's numbers as a table behind a button. Built only while it is open. */
export function plotTable(name: string, actions: Actions) {
  const id = `${name}-table`;
  const holder = element('div', {
    class: 'scroll data-table',
    id,
    hidden: '',
    tabindex: '0',
    role: 'region',
    'aria-label': 'Values',
  });
  const button = element(
    'button',
    { type: 'button', 'aria-expanded': 'false', 'aria-controls': id, title: 'The values as a table' },
    'Table',
  );
  let description: PlotDescription | undefined;
  const show = () => {
    const open = actions.tableOpen(name);
    holder.hidden = !open;
    button.setAttribute('aria-expanded', String(open));
    if (open) whenChanged(holder, description ?? null, () => (description ? build(description) : []));
  };
  button.addEventListener('click', () => {
    actions.setTableOpen(name, !actions.tableOpen(name));
    show();
  });
  return {
    node: holder,
    button,
    update(next: PlotDescription | undefined) {
      description = next;
      if (next) setAttribute(holder, 'aria-label', `${next.title}: values`);
      show();
    },
  };
}

function build(description: PlotDescription): Node[] {
  const { columns, rows, notes } = tableOf(description);
  const caption = element('caption');
  setText(caption, description.summary);
  const table = element(
    'table',
    {},
    caption,
    element('thead', {}, element('tr', {}, ...columns.map((text) => element('th', { scope: 'col' }, text)))),
    element(
      'tbody',
      {},
      ...rows.map(([first, ...rest]) =>
        element('tr', {}, element('th', { scope: 'row' }, first), ...rest.map((text) => element('td', {}, text))),
      ),
    ),
  );
  if (notes.length === 0) return [table];
  return [table, element('ul', { class: 'plain' }, ...notes.map((note) => element('li', {}, note)))];
}
