import type { Analysis } from '../../src-core/analysis';
import { ledgerLines, type PreviewData, previewData } from '../../src-core/plots';
import { caution, methods } from './cautions';
import type { ReportOptions } from './index';
import { escapeMarkdown, markdownOf, markdownTable } from './markdown-text';

/** The report for a pull request or a wiki: tables and sentences, since such places show no inline pictures. */
export function reportMarkdown(analysis: Analysis, options: ReportOptions = {}): string {
  return markdownOfData(previewData(analysis), options);
}

export function markdownOfData(data: PreviewData, { version }: ReportOptions = {}): string {
  const sections = [
    `# ${escapeMarkdown(data.title)}`,
    data.about && escapeMarkdown(data.about),
    `**${stateInWords(data)}** ${markdownOf(data.verdict.text)}`,
    section(
      'Limits',
      markdownTable(
        ['limit', 'state', 'figure'],
        data.limits.map(({ name, met, text }) => [escapeMarkdown(name), met ? 'met' : '**not met**', markdownOf(text)]),
      ),
    ),
    section(
      'Figures',
      markdownTable(
        ['figure', 'value', ''],
        data.figures.map(({ title, text, note = '' }) => [
          escapeMarkdown(title),
          escapeMarkdown(text),
          markdownOf(note),
        ]),
      ),
    ),
    section('What each element spends', ledger(data)),
    section('Findings', findings(data)),
    section(
      'Plots',
      data.plots
        .map(
          ({ title, description, missing = '' }) =>
            `- **${escapeMarkdown(title)}**${description?.stale ? ' (of an older text)' : ''}: ${markdownOf(description?.summary ?? missing)}`,
        )
        .join('\n'),
    ),
    section(
      'How far to trust this',
      `${caution}\n\n${markdownTable(
        ['what', 'model', 'holds'],
        methods.map(({ what, model, holds }) => [what, model, holds].map(escapeMarkdown)),
      )}`,
    ),
    `${escapeMarkdown(data.file)}${version ? `, computed by lanewright ${escapeMarkdown(version)}` : ''}`,
  ];
  return `${sections.filter(Boolean).join('\n\n')}\n`;
}

const section = (title: string, content: string): string => (content === '' ? '' : `## ${title}\n\n${content}`);

const words = { good: 'Good:', warnings: 'Warnings:', errors: 'Errors:', 'not-computed': 'Not computed:' } as const;
const stateInWords = ({ verdict }: PreviewData): string => words[verdict.state];

function ledger({ ledger: table }: PreviewData): string {
  if (!table) return '';
  const { head, rows } = ledgerLines(table);
  const owners = table.owners
    .map(({ owner, text }) => `- ${escapeMarkdown(owner)}: ${escapeMarkdown(text)}`)
    .join('\n');
  return (
    markdownTable(
      head.map(escapeMarkdown),
      rows.map((row) => row.map(escapeMarkdown)),
    ) + (owners && `\n\n${owners}`)
  );
}

function findings({ findings: list, moreFindings }: PreviewData): string {
  if (list.length === 0) return 'None.';
  const lines = list.map(
    ({ severity, rule, message, accepted }) =>
      `- **${accepted ? 'accepted' : severity}** ${markdownOf(message)} (${rule})`,
  );
  return [...lines, ...(moreFindings > 0 ? [`- … and ${moreFindings} more`] : [])].join('\n');
}
