import { createHash } from 'node:crypto';
import type { CheckedFile } from '../../../schemas/outputs/check';
import type { Analysis } from '../../../src-core/analysis';
import { isMapping } from '../../../src-core/raw';
import type { Finding } from '../../../src-core/report';
import { limitName } from '../../../src-core/rules/places';
import type { Place } from '../../../src-core/text/types';
import { checkedFile } from './checked-file';
import { locate } from './positions';

type Checked = CheckedFile['findings'][number];

/** A finding as plain data, for the reports that build servers read. */
export interface ToldFinding extends Checked {
  /** What it is about, however often lines move: the element or limit, else the way to it by names. */
  readonly about: string;
  /** Rule, file, what it is about, key: the same while the finding is the same. Two findings may share it. */
  readonly identity: readonly string[];
  readonly waiver?: {
    readonly reason: string;
    readonly by: string;
    readonly until: string;
    readonly location: Checked['location'];
  };
}

export interface ToldFile extends Omit<CheckedFile, 'findings' | 'limits'> {
  readonly findings: readonly ToldFinding[];
  readonly limits: readonly (CheckedFile['limits'][number] & { readonly line?: number })[];
}

/** One file's report with what tells findings of two runs apart and what waivers say. */
export function toldFile(analysis: Analysis): ToldFile {
  const checked = checkedFile(analysis);
  const { limits } = analysis.model;
  const lineOf = (name: string) => {
    const limit = limits.find((one) => one.name === name);
    return limit && locate({ at: limitName(limit) }, analysis).range.start.line;
  };
  return {
    ...checked,
    limits: checked.limits.map((limit) => ({ ...limit, line: lineOf(limit.name) })),
    findings: checked.findings.map((finding, index) => told(finding, analysis.findings[index], analysis)),
  };
}

function told(checked: Checked, { at, rule, subject, waivedBy }: Finding, analysis: Analysis): ToldFinding {
  const about = subject ?? namedPath(at, analysis);
  const key = at.path.filter((step) => typeof step === 'string').at(-1) ?? '';
  const waiver = waivedBy && waiverAt(waivedBy, analysis);
  return { ...checked, about, identity: [rule, at.file, about, key], ...(waiver && { waiver }) };
}

function waiverAt(place: Place, analysis: Analysis): ToldFinding['waiver'] {
  const waiver = analysis.model.waivers.find(
    (one) =>
      one.place.file === place.file && one.place.path.join() === place.path.slice(0, one.place.path.length).join(),
  );
  return (
    waiver && { reason: waiver.reason, by: waiver.by, until: waiver.until, location: locate({ at: place }, analysis) }
  );
}

/** `path/via dive/drill`: entries of a list by their kind and name, so that a moved one keeps its way. */
function namedPath({ file, path }: Place, { parsed }: Analysis): string {
  let value: unknown = parsed.get(file)?.value;
  return path
    .map((step) => {
      value = isMapping(value) || Array.isArray(value) ? (value as Record<string | number, unknown>)[step] : undefined;
      return typeof step === 'string' ? step : entryName(value);
    })
    .join('/');
}

/** An entry's first key and its value name it; one without a name is like every other of its kind. */
function entryName(entry: unknown): string {
  if (!isMapping(entry)) return 'entry';
  const [[kind, name] = ['entry', '']] = Object.entries(entry);
  return typeof name === 'string' ? `${kind} ${name}` : kind;
}

/**
 * Gives each finding of a run its fingerprint: of its identity, and where several share one, of their order too.
 * @returns 32 hexadecimal digits, unique in the run
 */
export function fingerprints(): (finding: ToldFinding) => string {
  const seen = new Map<string, number>();
  return ({ identity }) => {
    const key = JSON.stringify(identity);
    const before = seen.get(key) ?? 0;
    seen.set(key, before + 1);
    return createHash('sha256')
      .update(before === 0 ? key : `${key}\n${before}`)
      .digest('hex')
      .slice(0, 32);
  };
}

const ORDER = { error: 0, warning: 1, info: 2, hint: 3 } as const;

/** The worse first; among equals as they came. */
export const worstFirst = <T extends { readonly severity: Finding['severity'] }>(findings: readonly T[]): T[] =>
  [...findings].sort((a, b) => ORDER[a.severity] - ORDER[b.severity]);

/** What a report tells: with `--quiet` errors alone. */
export const wanted = (findings: readonly ToldFinding[], quiet: boolean) =>
  quiet ? findings.filter(({ severity }) => severity === 'error') : findings;
