import type { FindingText, PreviewData } from '../../src-core/plots/preview-data';
import type { Actions } from './app';
import { element, setAttribute, setText, whenChanged, withCode } from './dom';

export interface OverviewView {
  readonly node: HTMLElement;
  update(data: PreviewData): void;
}

/** Title, verdict, limits and findings. */
export function overviewView(actions: Actions): OverviewView {
  const title = element('h1');
  const about = element('p', { class: 'quiet' });
  const verdict = element('p', { class: 'verdict' });
  const limits = element('section', { 'aria-labelledby': 'limits-heading' });
  const findings = element('section', { 'aria-labelledby': 'findings-heading' });
  const node = element(
    'header',
    { class: 'overview' },
    title,
    about,
    verdict,
    element('div', { class: 'side-by-side' }, limits, findings),
  );
  return {
    node,
    update(data) {
      setText(title, data.title);
      setText(about, data.about);
      setAttribute(verdict, 'data-state', data.verdict.state);
      whenChanged(verdict, data.verdict.text, () => withCode(data.verdict.text));
      whenChanged(limits, [data.limits, data.figures], () => limitsAndFigures(data, actions));
      whenChanged(findings, [data.findings, data.moreFindings], () => findingList(data, actions));
    },
  };
}

function limitsAndFigures({ limits, figures }: PreviewData, actions: Actions): Node[] {
  const rows = limits.map(({ name, met, text, at }) =>
    element(
      'li',
      {},
      element('span', { class: met ? 'state' : 'state missed' }, met ? 'met' : 'not met'),
      element('span', {}, at ? linkButton(name, () => actions.select(at)) : name, ' ', ...withCode(text)),
    ),
  );
  const list = figures.map(({ title, text, note }) =>
    element(
      'div',
      {},
      element('dt', {}, title),
      element('dd', {}, text, note ? element('span', { class: 'quiet' }, ` ${note}`) : undefined),
    ),
  );
  return [
    element('h2', { id: 'limits-heading' }, limits.length > 0 ? 'Limits and figures' : 'Figures'),
    ...(rows.length > 0 ? [element('ul', { class: 'plain' }, ...rows)] : []),
    ...(list.length > 0 ? [element('dl', { class: 'figures' }, ...list)] : []),
  ];
}

function findingList({ findings, moreFindings }: PreviewData, actions: Actions): Node[] {
  const heading = element('h2', { id: 'findings-heading' }, 'Findings');
  if (findings.length === 0) return [heading, element('p', { class: 'quiet' }, 'None.')];
  const more = moreFindings > 0 ? [element('p', { class: 'quiet' }, `… and ${moreFindings} more.`)] : [];
  return [
    heading,
    element('ul', { class: 'plain' }, ...findings.map((finding) => findingRow(finding, actions))),
    ...more,
  ];
}

function findingRow({ severity, rule, subject, message, accepted, at }: FindingText, actions: Actions): HTMLElement {
  const button = element('button', { type: 'button', class: 'link' }, ...withCode(message));
  button.addEventListener('click', () => actions.select(at));
  const state = element(
    'span',
    { class: `state ${accepted ? 'accepted' : severity}` },
    accepted ? 'accepted' : severity,
  );
  const where = element('span', { class: 'quiet' }, subject === undefined ? rule : `${rule}, at ${subject}`);
  return element('li', {}, state, element('span', {}, button, ' ', where));
}

function linkButton(text: string, act: () => void): HTMLButtonElement {
  const button = element('button', { type: 'button', class: 'link' }, text);
  button.addEventListener('click', act);
  return button;
}
