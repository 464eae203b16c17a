import { type Diagnostic, DiagnosticSeverity, DiagnosticTag } from 'vscode-languageserver';
import type { Analysis } from '../src-core/analysis';
import { show } from '../src-core/quantity/show';
import type { Finding, Severity } from '../src-core/report';
import { MOST_FINDINGS } from '../src-core/rules/judge';
import { rangeOf } from '../src-core/text/index';
import type { FilePath, TextRange } from '../src-core/text/types';
import { toRange } from './convert';
import { idOf, type Located } from './roots';
import type { Services } from './services';

const SEVERITIES: Readonly<Record<Severity, DiagnosticSeverity>> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  info: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};
const TAGS = { unnecessary: DiagnosticTag.Unnecessary, deprecated: DiagnosticTag.Deprecated } as const;

/** Where a finding stands in the text that its analysis read. */
export function rangeOfFinding(analysis: Analysis, { at, range }: Pick<Finding, 'at' | 'range'>): TextRange {
  const parsed = analysis.parsed.get(at.file);
  if (range) return range;
  return parsed ? rangeOf(parsed, at) : { start: 0, end: 0 };
}

/** Every finding that the open files' analyses place in this file, once each. Waived ones are not shown. */
export function diagnosticsOf(services: Services, located: Located): Diagnostic[] {
  const { analyses, skipped, documents } = services;
  if (skipped.has(idOf(located)))
    return [
      fileDiagnostic(
        'Opened without analysis: the server ended twice while it worked on this file. Choose “Analyse this file again” to try.',
        'not-analysed',
      ),
    ];
  const failure = analyses.failure(located);
  if (failure !== undefined)
    return [fileDiagnostic(`This text broke the analysis, which is a fault of ours: ${failure}`, 'internal-error')];
  const found = new Map<string, Diagnostic>();
  const open = documents.at(located)?.text;
  for (const { located: source, analysis } of analyses.all()) {
    if (source.root.key !== located.root.key) continue;
    // Only what was read from the text that is open now has ranges that hold; of a text too large to be read there are none.
    const text = analysis.parsed.get(located.file)?.text ?? (source.file === located.file ? '' : undefined);
    if (text === undefined || (text !== '' && open !== undefined && text !== open)) continue;
    for (const finding of analysis.findings) {
      if (finding.at.file !== located.file || finding.waivedBy) continue;
      const diagnostic = toDiagnostic(services, source, analysis, finding, text);
      const key = `${finding.rule}\n${finding.message}\n${JSON.stringify(diagnostic.range)}`;
      if (!found.has(key)) found.set(key, diagnostic);
    }
  }
  return countingTheRest([...found.values()]);
}

/** The judge's two hundred of a channel and the one that counts its rest; many channels may place theirs in one parts file. */
export function countingTheRest(found: Diagnostic[]): Diagnostic[] {
  if (found.length <= MOST_FINDINGS + 1) return found;
  const rest = show.count(found.length - MOST_FINDINGS, 'more finding');
  const message = `${rest} of other channels that use this file are not shown; ${MOST_FINDINGS} are.`;
  return [...found.slice(0, MOST_FINDINGS), fileDiagnostic(message, 'limit')];
}

export function toDiagnostic(
  services: Services,
  source: Located,
  analysis: Analysis,
  finding: Finding,
  text: string,
): Diagnostic {
  const reference = services.rulesReference();
  const related = (finding.related ?? []).flatMap(({ at, message }) => {
    const parsed = analysis.parsed.get(at.file);
    if (!parsed) return [];
    const uri = services.documents.uriOf({ root: source.root, file: at.file });
    return [{ location: { uri, range: toRange(parsed.text, rangeOf(parsed, at)) }, message }];
  });
  return {
    range: toRange(text, rangeOfFinding(analysis, finding)),
    severity: SEVERITIES[finding.severity],
    code: finding.rule,
    source: 'lanewright',
    message: finding.message,
    ...(reference && { codeDescription: { href: `${reference}#${finding.rule}` } }),
    ...(related.length > 0 && { relatedInformation: related }),
    ...(finding.tags && { tags: finding.tags.map((tag) => TAGS[tag]) }),
  };
}

const fileDiagnostic = (message: string, code: string): Diagnostic => ({
  range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
  severity: DiagnosticSeverity.Warning,
  code,
  source: 'lanewright',
  message,
});

/** Files other than the analysed one that its findings stand in. */
export function otherFilesOf(analysis: Analysis): readonly FilePath[] {
  return [...new Set(analysis.findings.map(({ at }) => at.file))].filter((file) => file !== analysis.inputs.file);
}

/** Names for reports: the same name as long as the report says the same. */
export function keepResultIds() {
  const stamp = Math.random().toString(36).slice(2, 8);
  const kept = new Map<string, { id: string; content: string }>();
  const given = new Map<string, string>();
  let count = 0;
  return {
    idFor(key: string, items: readonly Diagnostic[]): string {
      const content = JSON.stringify(items);
      const before = kept.get(key);
      if (before?.content === content) return before.id;
      const id = `${stamp}-${++count}`;
      kept.set(key, { id, content });
      return id;
    },
    /** The client has this report now. */
    served: (key: string, id: string) => void given.set(key, id),
    lastServed: (key: string) => given.get(key),
    forget(key: string): void {
      kept.delete(key);
      given.delete(key);
    },
  };
}
export type ResultIds = ReturnType<typeof keepResultIds>;
