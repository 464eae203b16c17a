/** Splits a text at `‸`, which marks the cursor in tests. */
export function atCursor(marked: string): { text: string; offset: number } {
  const offset = marked.indexOf('‸');
  if (offset === -1) throw new Error('no ‸ in the text');
  return { text: marked.slice(0, offset) + marked.slice(offset + 1), offset };
}
