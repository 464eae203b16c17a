import type { ChannelReview, FigureChange, Review } from '../../../src-core/review/index';
import { escapeMarkdown, markdownOf, markdownTable } from '../../report/markdown-text';
import { plain } from '../printers/plain';
import type { ReviewPrinter } from './types';
import { chief, figureText, marginText, resultText, sideText, stateText, summaryText } from './words';

/** A build finds the comment that it wrote before by this. */
export const MARKER = '<!-- lanewright-review -->';

const MOST_REASONS = 10;
const MOST_ROWS = 20;
/** Kept for the sentence that says how many are not shown. */
const REST = 200;

/** For a pull request's comment or a step's summary: the worst first, as many as fit, then a count. */
export const markdown: ReviewPrinter = (review, { maxLength }) => {
  const head = headOf(review);
  const parts = review.channels.map(detailsOf);
  const overview = overviewOf(review, Math.floor((maxLength - bytes(head)) / 3));
  let left = maxLength - bytes(head) - bytes(overview.text) - REST;
  const shown: string[] = [];
  for (const part of parts) {
    const size = bytes(part) + 2;
    if (size > left) break;
    shown.push(part);
    left -= size;
  }
  const cut = parts.length - shown.length;
  const rest = cut > 0 ? [`… and ${cut} more, the better ones, without details here.`] : [];
  return `${[head, overview.text, ...shown, ...rest].filter(Boolean).join('\n\n')}\n`;
};

const bytes = (text: string) => Buffer.byteLength(text, 'utf8');
const words = (text: string) => markdownOf(plain(text));
/** Of a file alone, without our own sentences around it. */
const foreign = (text: string) => escapeMarkdown(plain(text));

/** A path or a name of a revision may be long; the head has to fit whatever it is. */
const short = (text: string, most = 120) => (text.length > most ? `${text.slice(0, most - 1)}…` : text);

function headOf(review: Review): string {
  const { failed, notes } = review;
  const shown = failed.reasons.slice(0, MOST_REASONS).map((reason) => `- ${words(short(reason, 300))}`);
  const more = failed.reasons.length - shown.length;
  return [
    MARKER,
    `## Channels: ${foreign(short(review.head))} against ${foreign(short(review.base))}`,
    `**${resultText(review)}** ${summaryText(review)}. Figures are planning estimates.`,
    ...(shown.length > 0 ? [[...shown, ...(more > 0 ? [`- … and ${more} more`] : [])].join('\n')] : []),
    ...notes.slice(0, MOST_REASONS).map((note) => words(short(note, 300))),
  ].join('\n\n');
}

function overviewOf(review: Review, most: number): { readonly text: string } {
  const rows: string[][] = [];
  const table = () => markdownTable(['Channel', 'Before', 'After', 'Margin'], rows);
  let size = 0;
  for (const channel of review.channels) {
    const row = [
      channel.file,
      channel.verdict.from?.text ?? '',
      channel.verdict.to?.text ?? '',
      marginText(channel),
    ].map((cell) => foreign(short(cell, 160)));
    size += bytes(row.join(' | ')) + 6;
    if (size > most) break;
    rows.push(row);
  }
  return { text: rows.length > 1 ? table() : '' };
}

/** Text of a file inside a line of HTML, which Markdown leaves as it is; no mention and no reference either. */
const inHtml = (text: string) =>
  plain(text)
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/@(?=\w)/g, '@\u200b')
    .replace(/#(?=\d)/g, '#\u200b')
    .replace(/\b(https?|ftp|mailto|www)(?=[:.])/gi, '$1\u200b');

function detailsOf(channel: ChannelReview, index: number): string {
  const { file, changes, loosened, waivers, figures, appeared, gone, causes, together, notes, verdict } = channel;
  const told = new Set([...loosened, ...waivers].map((change) => change.words));
  const rows = [
    ...loosened.map((change) => ['**loosened**', foreign(change.words)]),
    ...waivers.map((change) => ['**waiver**', foreign(change.words)]),
    ...changes
      .filter((change) => !told.has(change.words))
      .map((change) => [change.derived ? 'follows' : 'change', foreign(change.words)]),
  ];
  const list = (title: string, findings: ChannelReview['appeared']) =>
    findings.length === 0
      ? []
      : [
          [
            `**${title}**`,
            ...capped(findings.map(({ severity, rule, message }) => `- ${severity} \`${rule}\`: ${words(message)}`)),
          ].join('\n'),
        ];
  const body = [
    ...notes.map(words),
    ...(verdict.from && verdict.to
      ? [
          markdownTable(
            ['', 'Verdict'],
            [
              ['before', foreign(verdict.from.text)],
              ['after', foreign(verdict.to.text)],
            ],
          ),
        ]
      : []),
    markdownTable(['', 'What changed'], cappedRows(rows)),
    markdownTable(['Figure', 'Before', 'After', 'Change'], figures.map(figureRow)),
    ...list('Appeared', appeared),
    ...list('Gone', gone),
    causesTable(causes, together),
  ].filter(Boolean);
  const open = index < 3 && channel.state !== 'no-effect' ? ' open' : '';
  return [`<details${open}><summary>${inHtml(`${file}: ${stateText(channel)}`)}</summary>`, ...body, '</details>'].join(
    '\n\n',
  );
}

const capped = (lines: readonly string[]) =>
  lines.length > MOST_ROWS ? [...lines.slice(0, MOST_ROWS), `- … and ${lines.length - MOST_ROWS} more`] : lines;
const cappedRows = (rows: string[][]) =>
  rows.length > MOST_ROWS ? [...rows.slice(0, MOST_ROWS), ['…', `and ${rows.length - MOST_ROWS} more`]] : rows;

function figureRow(change: FigureChange): string[] {
  const { title, deltaText, better } = change;
  const way = better === undefined ? deltaText : `${deltaText} (${better ? 'better' : 'worse'})`;
  return [title, sideText(change, 'from'), sideText(change, 'to'), way].map(foreign);
}

function causesTable(causes: ChannelReview['causes'], together: ChannelReview['together']): string {
  const cell = (figures: readonly FigureChange[]) =>
    chief(figures)
      .map((figure) => foreign(`${figure.title}: ${figureText(figure)}`))
      .join('<br>');
  const rows = causes.map((cause) => [foreign(short(cause.words, 300)), cell(cause.alone), cell(cause.without)]);
  return markdownTable(
    ['What did it', 'Added to the base', 'Taken from the head'],
    rows.length > 0 && together ? [...rows, ['together', cell(together), '']] : rows,
  );
}
