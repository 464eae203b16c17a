import type { Analysis } from '../analysis';
import type { Finding } from '../report';
import { isAcceptable } from '../rules/add-waivers';
import { rules } from '../rules/list';
import { reportedByStages } from '../rules/reported';
import { resolveEdits } from '../text/edits';
import { rangeOf } from '../text/index';
import type { FilePath, PlaceEdit, TextEdit, TextRange } from '../text/types';

/** Something that answers a finding. The edits are places until they are asked for. */
export type Action =
  | {
      readonly kind: 'fix';
      readonly title: string;
      readonly finding: Finding;
      readonly preferred: boolean;
      readonly edits: readonly PlaceEdit[];
    }
  | {
      readonly kind: 'accept';
      readonly title: string;
      readonly finding: Finding;
      /** Why it cannot be accepted. */
      readonly refused?: string;
    };

/** What can be done about the findings that touch a range; in the order of the findings, fixes before acceptance. */
export function actionsAt(analysis: Analysis, file: FilePath, range: TextRange): readonly Action[] {
  const parsed = analysis.parsed.get(file);
  if (!parsed) return [];
  const touched = analysis.findings.filter((finding) => {
    if (finding.at.file !== file || finding.waivedBy) return false;
    const place = finding.range ?? rangeOf(parsed, finding.at);
    return place.start <= range.end && range.start <= place.end;
  });
  return touched.flatMap((finding): Action[] => {
    const fixes = finding.fixes ?? [];
    const onlyOne = fixes.length === 1;
    const accept = acceptance(analysis, finding);
    return [
      ...fixes.map(
        ({ title, edits, preferred }): Action => ({
          kind: 'fix',
          title,
          finding,
          preferred: preferred ?? onlyOne,
          edits,
        }),
      ),
      ...(accept ? [accept] : []),
    ];
  });
}

/** Listed even where it is refused, with the reason, so that nobody looks for it in vain. */
function acceptance(analysis: Analysis, finding: Finding): Action | undefined {
  const title = `Accept this finding… (${finding.rule})`;
  if (finding.rule.startsWith('waiver-')) return undefined;
  const refused = cannotBeRead.has(finding.rule)
    ? 'What cannot be read is mended, not accepted.'
    : isAcceptable(finding, analysis.model.file)
      ? undefined
      : 'Only a finding about an element or a limit of this channel can be accepted.';
  return { kind: 'accept', title, finding, ...(refused && { refused }) };
}

/** Errors of what is written: they are mended, not accepted. */
const cannotBeRead: ReadonlySet<string> = new Set(
  rules
    .filter(({ severity, check }) => severity === 'error' && (check as unknown) === reportedByStages)
    .map(({ name }) => name),
);

/** One safe fix for each finding that has one, as long as they do not touch each other: what may be done unasked. */
export function fixAllOf(analysis: Analysis, file: FilePath): readonly TextEdit[] {
  const taken: TextEdit[] = [];
  for (const finding of analysis.findings) {
    if (finding.at.file !== file || finding.waivedBy) continue;
    const safe = (finding.fixes ?? []).filter((fix) => fix.safe);
    const fix = safe.find(({ preferred }) => preferred) ?? (safe.length === 1 ? safe[0] : undefined);
    if (!fix) continue;
    const edits = resolveEdits(fix.edits, analysis.parsed);
    const isFree = edits.every(
      (edit) =>
        edit.file === file && taken.every(({ range }) => edit.range.end < range.start || edit.range.start > range.end),
    );
    if (isFree) taken.push(...edits);
  }
  return taken;
}

/** The edits of a fix in the newest text; found again by what it is about, since the finding may have been made anew. */
export function editsOfFix(analysis: Analysis, rule: string, title: string, at: string): readonly TextEdit[] {
  for (const finding of analysis.findings) {
    if (finding.rule !== rule || placeKey(finding) !== at) continue;
    const fix = finding.fixes?.find((one) => one.title === title);
    if (fix) return resolveEdits(fix.edits, analysis.parsed);
  }
  return [];
}

/** A finding's place as text, for `editsOfFix`. */
export const placeKey = ({ at }: Pick<Finding, 'at'>): string => JSON.stringify([at.file, at.path, at.on ?? 'value']);
