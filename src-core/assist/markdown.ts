/** Most lines of a hover: more hides the text that one reads. */
const MOST_LINES = 12;

/** Text from a file, for Markdown: no sign of it means anything, no address becomes a link, and it stays on one line. */
export const plainText = (text: string): string =>
  text
    .replace(/[\p{Cc}\p{Cf}\u2028\u2029]+/gu, ' ')
    .replace(/[\\`*_{}[\]()#|~]|:(?=\/\/)/g, '\\$&')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;');

/** A name or value from a file, as code. */
export const code = (text: string): string =>
  `\`${text.replace(/[`|\p{Cc}\p{Cf}\u2028\u2029]+/gu, ' ').slice(0, 120)}\``;

export type Row = readonly [name: string, value: string];

/** A heading line, a table of what fits, and remarks. */
export function page(heading: string, rows: readonly Row[], remarks: readonly string[] = []): string {
  const notes = remarks.filter((remark) => remark !== '');
  const lines = [heading];
  const left = MOST_LINES - 1 - notes.length * 2;
  if (rows.length > 0 && left >= 4) {
    const shown = rows.slice(0, left - 3);
    lines.push(
      '',
      `| ${shown[0][0]} | ${shown[0][1]} |`,
      '| :-- | :-- |',
      ...shown.slice(1).map(([name, value]) => `| ${name} | ${value} |`),
    );
  }
  for (const note of notes) if (lines.length + 2 <= MOST_LINES) lines.push('', note);
  return lines.join('\n');
}
