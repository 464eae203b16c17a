import type { Analysis } from '../analysis';
import type { Finding } from '../report';
import type { PlaceEdit } from '../text/types';
import { rules } from './list';
import { reportedByStages } from './reported';
import { acceptedText } from './waivers';

/** Who accepts, until when and why: asked for by each surface. */
export interface Acceptance {
  readonly by: string;
  /** `YYYY-MM-DD`, the last day. */
  readonly until: string;
  readonly reason: string;
}

/** Text that YAML may read as something else is quoted; JSON's quoting is YAML's. */
const scalar = (text: string) =>
  /^[A-Za-z][A-Za-z0-9 _.,/()-]*[A-Za-z0-9).]$/.test(text) && !/^(true|false|null|yes|no|on|off)$/i.test(text)
    ? text
    : JSON.stringify(text);

/** What cannot be read has to be mended: without it there is no figure that one could accept. */
const mustBeMended: ReadonlySet<string> = new Set(
  rules.filter(({ severity, check }) => severity === 'error' && check === reportedByStages).map(({ name }) => name),
);

/** A finding can be accepted if it says what it is about, and is not about waivers themselves. */
export const isAcceptable = (finding: Finding, file: string) =>
  finding.subject !== undefined &&
  !finding.waivedBy &&
  finding.at.file === file &&
  !finding.rule.startsWith('waiver-') &&
  !mustBeMended.has(finding.rule);

const keyOf = ({ rule, subject }: Finding) => JSON.stringify([rule, subject]);

/** Findings of one rule at one subject are accepted together, by the worst value. */
const worseOf = (a: Finding, b: Finding): Finding => {
  if (a.value === undefined || b.value === undefined) return a;
  return (b.worse === 'lower' ? b.value < a.value : b.value > a.value) ? b : a;
};

/** The edits that accept one finding: a new waiver, or the value and date of the one that has been outgrown or is out of date. */
export function acceptanceOf(
  { model }: Pick<Analysis, 'model'>,
  finding: Finding,
  { by, until, reason }: Acceptance,
): readonly PlaceEdit[] {
  const upTo = acceptedText(finding);
  const existing = model.waivers.find(({ rule, at }) => rule === finding.rule && at === finding.subject);
  if (existing) {
    const set = (key: string, text: string): PlaceEdit => ({ op: 'set', at: existing.place, key, text });
    return [
      ...(upTo ? [set('up-to', upTo)] : []),
      set('until', until),
      set('by', scalar(by)),
      set('reason', scalar(reason)),
    ];
  }
  const lines = [
    `rule: ${finding.rule}`,
    `at: ${finding.subject}`,
    ...(upTo ? [`up-to: ${upTo}`] : []),
    `until: ${until}`,
    `by: ${scalar(by)}`,
    `reason: ${scalar(reason)}`,
  ];
  return [{ op: 'append', at: { file: model.file, path: ['waivers'] }, lines }];
}

/** Edits that accept all that an old channel has: one waiver for each rule and subject, at today's worst value. */
export function addWaivers(
  analysis: Pick<Analysis, 'model' | 'findings'>,
  acceptance: Acceptance,
): readonly PlaceEdit[] {
  const worst = new Map<string, Finding>();
  for (const finding of analysis.findings) {
    if (!isAcceptable(finding, analysis.model.file) || finding.severity === 'hint') continue;
    const before = worst.get(keyOf(finding));
    worst.set(keyOf(finding), before ? worseOf(before, finding) : finding);
  }
  return [...worst.values()].flatMap((finding) => acceptanceOf(analysis, finding, acceptance));
}
