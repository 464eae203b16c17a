/**
 * A text in even form: no spaces at the ends of lines, one line ending throughout, no more than one empty line in a row, none at
 * the start, one line ending at the end. Nothing else moves: order, comments, columns and quotes are the author's.
 * Lines of block scalars (`|`, `>`) and of quoted text over several lines are left as they are. Idempotent.
 */
export function formatText(text: string): string {
  const lineEnd = text.includes('\r\n') ? '\r\n' : '\n';
  const kept: string[] = [];
  let blockIndent = -1;
  let quote = '';
  for (const line of text.split(/\r\n|\n|\r/)) {
    const indent = line.length - line.trimStart().length;
    const isBlank = line.trim() === '';
    if (blockIndent >= 0 && (isBlank || indent > blockIndent)) {
      kept.push(line);
      continue;
    }
    blockIndent = -1;
    const before = quote;
    quote = openQuote(line, quote);
    if (before !== '' || quote !== '') {
      kept.push(line);
      continue;
    }
    const trimmed = line.trimEnd();
    if (isBlank && (kept.length === 0 || kept[kept.length - 1] === '')) continue;
    kept.push(trimmed);
    if (/(^|[\s:-])[|>][+-]?[0-9]?[+-]?(\s+#.*)?$/.test(trimmed)) blockIndent = indent;
  }
  if (blockIndent < 0 && quote === '') while (kept.length > 0 && kept[kept.length - 1] === '') kept.pop();
  if (kept.length === 0) return '';
  const result = kept.join(lineEnd);
  return result.endsWith(lineEnd) ? result : result + lineEnd;
}

/** The quote that is open at the end of a line. A quote opens where a value or key begins. */
function openQuote(line: string, before: string): string {
  let quote = before;
  for (let i = 0; i < line.length; i++) {
    const sign = line[i];
    if (quote === '"' && sign === '\\') i++;
    else if (quote !== '') {
      if (sign === quote) {
        if (quote === "'" && line[i + 1] === "'") i++;
        else quote = '';
      }
    } else if (sign === '#' && (i === 0 || line[i - 1] === ' ')) return '';
    else if ((sign === '"' || sign === "'") && (i === 0 || /[\s[{,:]/.test(line[i - 1]))) quote = sign;
  }
  return quote;
}
