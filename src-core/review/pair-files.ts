import type { FilePath } from '../text/types';

export interface PairedFile {
  readonly base?: FilePath;
  readonly head?: FilePath;
}

/** Two texts are one file renamed where at least this share of their lines is the same. */
const ALIKE = 0.5;

/**
 * Which file of base each file of head was: that of the same path, then that of the same text, then the most alike one.
 * @param base and head texts by path; only those that are not in both are compared
 */
export function pairFiles(
  base: ReadonlyMap<FilePath, string>,
  head: ReadonlyMap<FilePath, string>,
): readonly PairedFile[] {
  const gone = [...base.keys()].filter((file) => !head.has(file)).sort();
  const fresh = [...head.keys()].filter((file) => !base.has(file)).sort();
  const both = [...head.keys()].filter((file) => base.has(file)).map((file) => ({ base: file, head: file }));
  const lines = new Map(
    [...gone.map((file) => base.get(file)!), ...fresh.map((file) => head.get(file)!)].map((text) => [
      text,
      linesOf(text),
    ]),
  );
  const candidates = gone
    .flatMap((from) =>
      fresh.map((to) => ({ from, to, alike: likeness(lines.get(base.get(from)!)!, lines.get(head.get(to)!)!) })),
    )
    .filter(({ alike }) => alike >= ALIKE)
    .sort((a, b) => b.alike - a.alike || (a.from + a.to < b.from + b.to ? -1 : 1));
  const renamed: PairedFile[] = [];
  const taken = new Set<FilePath>();
  for (const { from, to } of candidates) {
    if (taken.has(`base ${from}`) || taken.has(`head ${to}`)) continue;
    taken.add(`base ${from}`).add(`head ${to}`);
    renamed.push({ base: from, head: to });
  }
  return [
    ...both,
    ...renamed,
    ...gone.filter((file) => !taken.has(`base ${file}`)).map((file) => ({ base: file })),
    ...fresh.filter((file) => !taken.has(`head ${file}`)).map((file) => ({ head: file })),
  ];
}

/** How often each line stands in a text, whatever its line ends. */
function linesOf(text: string): ReadonlyMap<string, number> {
  const lines = new Map<string, number>();
  for (const line of text.split(/\r?\n/)) if (line.trim()) lines.set(line, (lines.get(line) ?? 0) + 1);
  return lines;
}

/** The share of lines that both have, of the longer text. */
function likeness(a: ReadonlyMap<string, number>, b: ReadonlyMap<string, number>): number {
  const size = (lines: ReadonlyMap<string, number>) => [...lines.values()].reduce((sum, n) => sum + n, 0);
  let shared = 0;
  for (const [line, n] of a) shared += Math.min(n, b.get(line) ?? 0);
  return shared / Math.max(1, size(a), size(b));
}
