import type { Analysis } from '../../src-core/analysis';
import { ledgerLines, type PreviewData, plots, previewData, renderSvg } from '../../src-core/plots';
import { escapeMarkup } from '../../src-core/plots/kit/svg';
import { caution, methods } from './cautions';
import type { ReportOptions } from './index';
import { reportStyle } from './style';

/** A page of its own: no script, nothing fetched, everything escaped; readable on paper, and light or dark as the reader has it. */
export function reportHtml(analysis: Analysis, options: ReportOptions = {}): string {
  const pictures = new Map(
    plots.flatMap((plot) => {
      const description = plot.describe(analysis);
      if (!description) return [];
      return [
        [plot.name, renderSvg(description, { width: 720, height: 380, theme: 'vars', idPrefix: plot.name })] as const,
      ];
    }),
  );
  return htmlOfData(previewData(analysis), pictures, options);
}

/** @param pictures SVG text by the name of the plot */
export function htmlOfData(
  data: PreviewData,
  pictures: ReadonlyMap<string, string>,
  { version }: ReportOptions = {},
): string {
  const title = escapeMarkup(data.title);
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${title}</title>
<style>${reportStyle}</style>
</head>
<body>
<header>
<h1>${title}</h1>
<p class="quiet">${escapeMarkup(data.about)}</p>
<p class="verdict ${data.verdict.state}">${withCode(data.verdict.text)}</p>
</header>
<main>
${section(
  'Limits',
  table(
    ['Limit', 'State', 'Figure'],
    data.limits.map(({ name, met, text }) => [
      escapeMarkup(name),
      met ? 'met' : '<strong>not met</strong>',
      withCode(text),
    ]),
  ),
)}
${section(
  'Figures',
  table(
    ['Figure', 'Value', 'Remark'],
    data.figures.map(({ title: name, text, note = '' }) => [name, text, note].map(escapeMarkup)),
  ),
)}
${section('Findings', findings(data))}
${section('What each element spends', ledger(data))}
${data.plots.map((plot) => figure(plot, pictures.get(plot.name))).join('\n')}
${section(
  'How far to trust this',
  `<p>${escapeMarkup(caution)}</p>${table(
    ['What', 'Model', 'Where it holds'],
    methods.map(({ what, model, holds }) => [what, model, holds].map(escapeMarkup)),
  )}`,
)}
</main>
<footer class="quiet">${escapeMarkup(data.file)}${version ? `, computed by lanewright ${escapeMarkup(version)}` : ''}</footer>
</body>
</html>
`;
}

const section = (title: string, content: string): string =>
  content === '' ? '' : `<section>\n<h2>${escapeMarkup(title)}</h2>\n${content}\n</section>`;

/** Cells are markup already. */
function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  if (rows.length === 0) return '';
  const cells = rows.map(
    ([first, ...rest]) => `<tr><th scope="row">${first}</th>${rest.map((cell) => `<td>${cell}</td>`).join('')}</tr>`,
  );
  return `<div class="scroll"><table>\n<thead><tr>${head.map((text) => `<th scope="col">${escapeMarkup(text)}</th>`).join('')}</tr></thead>\n<tbody>\n${cells.join('\n')}\n</tbody></table></div>`;
}

/** Our own sentences: what stands between backticks is code. */
function withCode(text: string): string {
  const parts = text.split('`');
  if (parts.length % 2 === 0) return escapeMarkup(text);
  return parts.map((part, i) => (i % 2 === 1 ? `<code>${escapeMarkup(part)}</code>` : escapeMarkup(part))).join('');
}

function findings({ findings: list, moreFindings }: PreviewData): string {
  if (list.length === 0) return '<p>None.</p>';
  const rows = list.map(({ severity, rule, message, accepted, subject = '' }) => [
    accepted ? 'accepted' : severity,
    withCode(message),
    escapeMarkup(subject),
    escapeMarkup(rule),
  ]);
  return (
    table(['Severity', 'Finding', 'At', 'Rule'], rows) + (moreFindings > 0 ? `<p>… and ${moreFindings} more.</p>` : '')
  );
}

function ledger({ ledger: found }: PreviewData): string {
  if (!found) return '';
  const { head, rows } = ledgerLines(found);
  const owners = found.owners
    .map(({ owner, text }) => `<li>${escapeMarkup(owner)}: ${escapeMarkup(text)}</li>`)
    .join('');
  return (
    table(
      head,
      rows.map((row) => row.map(escapeMarkup)),
    ) + (owners && `<ul>${owners}</ul>`)
  );
}

function figure(
  { title, description, missing = '' }: PreviewData['plots'][number],
  picture: string | undefined,
): string {
  const name = `${description?.stale ? '~ ' : ''}${title}`;
  const content = picture
    ? `<figure>${picture}<figcaption>${withCode(description?.summary ?? '')}</figcaption></figure>`
    : `<p class="quiet">${withCode(missing)}</p>`;
  return section(name, content);
}
