/** Lines that fold into the first, counted from 0. */
export interface Fold {
  readonly startLine: number;
  readonly endLine: number;
  readonly kind?: 'comment' | 'region';
}

/**
 * What folds: each line with the deeper ones below it, runs of comments, and `# region` to `# endregion`.
 * Read from the indentation alone, so that it holds in a half-typed text.
 */
export function foldsOf(text: string): readonly Fold[] {
  const lines = text.split(/\r\n|\r|\n/);
  const folds: Fold[] = [];
  const open: { line: number; indent: number }[] = [];
  const regions: number[] = [];
  let lastContent = -1;
  let commentStart = -1;
  const endComment = (line: number) => {
    if (commentStart >= 0 && line - commentStart > 1)
      folds.push({ startLine: commentStart, endLine: line - 1, kind: 'comment' });
    commentStart = -1;
  };
  const close = (indent: number) => {
    while (open.length > 0 && open[open.length - 1].indent >= indent) {
      const { line } = open.pop()!;
      if (lastContent > line) folds.push({ startLine: line, endLine: lastContent });
    }
  };
  lines.forEach((line, number) => {
    const trimmed = line.trimStart();
    if (trimmed.startsWith('#')) {
      if (/^#\s*region\b/.test(trimmed)) regions.push(number);
      else if (/^#\s*endregion\b/.test(trimmed) && regions.length > 0)
        folds.push({ startLine: regions.pop()!, endLine: number, kind: 'region' });
      else if (commentStart < 0) commentStart = number;
      return;
    }
    endComment(number);
    if (trimmed === '') return;
    const spaces = line.length - trimmed.length;
    // A list may stand in its key's own column: its entries are deeper all the same.
    const indent = 2 * spaces + (trimmed.startsWith('- ') || trimmed === '-' ? 1 : 0);
    close(indent);
    open.push({ line: number, indent });
    lastContent = number;
  });
  endComment(lines.length);
  close(0);
  return folds.sort((a, b) => a.startLine - b.startLine || b.endLine - a.endLine);
}
