/**
 * Text of a file as Markdown that shows just this text: no markup, no HTML, no link, no mention of a person, no reference to
 * an issue. A zero-width space after `@` and before what would become a link breaks what a host adds of itself.
 */
export function escapeMarkdown(text: string): string {
  return text
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '')
    .replace(/\s*[\r\n]+\s*/g, ' ')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/[\\`*_{}[\]()#+!|~$^=]/g, '\\$&')
    .replace(/^(\s*)([-.\d])/, (_, space: string, first: string) =>
      /\d/.test(first) ? `${space}${first}` : `${space}\\${first}`,
    )
    .replace(/^(\s*\d+)([.)])(?=\s|$)/, '$1\\$2')
    .replace(/@(?=\w)/g, '@\u200b')
    .replace(/#(?=\d)/g, '#\u200b')
    .replace(/\b(https?|ftp|mailto|www)(?=[:.])/gi, '$1\u200b');
}

/** Our own sentences, in which `code` may stand between backticks: that stays code, the rest is escaped. */
export function markdownOf(message: string): string {
  const parts = message.split('`');
  if (parts.length % 2 === 0) return escapeMarkdown(message);
  return parts.map((part, i) => (i % 2 === 0 ? escapeInside(part) : codeSpan(part))).join('');
}

/** A part of a sentence: what only counts at the start of a line needs no escape. */
const escapeInside = (part: string): string => (part === '' ? '' : escapeMarkdown(`x${part}`).slice(1));

/** A code span that may stand in a table's cell. */
function codeSpan(text: string): string {
  const plain = text.replace(/\s+/g, ' ').trim();
  if (plain === '') return '';
  // a bar ends a cell even inside code
  return /[|<&@]/.test(plain) ? escapeMarkdown(plain) : `\`${plain}\``;
}

/** A table; cells are Markdown already. Empty where there are no rows. */
export function markdownTable(head: readonly string[], rows: readonly (readonly string[])[]): string {
  if (rows.length === 0) return '';
  const line = (cells: readonly string[]) => `| ${cells.map((cell) => cell || ' ').join(' | ')} |`;
  return [line(head), line(head.map(() => '---')), ...rows.map(line)].join('\n');
}
