import type { Analysis } from '../analysis';
import type { Finding } from '../report';

/** Who a finding is, whatever its figures say: rule, severity, subject under head's name, and the key that it stands at. */
function identity({ rule, severity, subject, at }: Finding, nameInHead: ReadonlyMap<string, string>): string {
  // positions in a list change with every entry above
  const keys = at.path.filter((step) => typeof step === 'string');
  const place = subject === undefined ? keys : [nameInHead.get(subject) ?? subject, keys.at(-1)];
  return JSON.stringify([rule, severity, ...place]);
}

const open = (analysis: Analysis | undefined) => analysis?.findings.filter(({ waivedBy }) => !waivedBy) ?? [];

/** Findings that count on one side only. One that a waiver accepts now has gone; the waiver is a row of its own. */
export function findingChanges(
  base: Analysis | undefined,
  head: Analysis | undefined,
  nameInHead: ReadonlyMap<string, string>,
): { readonly appeared: readonly Finding[]; readonly gone: readonly Finding[] } {
  const before = new Map<string, Finding[]>();
  for (const finding of open(base)) {
    const key = identity(finding, nameInHead);
    before.set(key, [...(before.get(key) ?? []), finding]);
  }
  const appeared = open(head).filter((finding) => before.get(identity(finding, new Map()))?.shift() === undefined);
  return { appeared, gone: [...before.values()].flat() };
}
