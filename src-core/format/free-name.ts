/** A name for a new thing of a kind that is not among `taken`: `trace-1`. */
export function freeName(kind: string, taken: ReadonlySet<string> = new Set()): string {
  for (let n = 1; ; n++) if (!taken.has(`${kind}-${n}`)) return `${kind}-${n}`;
}
