import { inertJson, visible } from './escape';
import { fingerprints, type ToldFinding, toldFile, wanted } from './told';
import type { MakePrinter } from './types';

const severityOf: Readonly<Record<ToldFinding['severity'], string>> = {
  error: 'critical',
  warning: 'major',
  info: 'minor',
  hint: 'info',
};

/** One entry of a code-quality report. Of two with one fingerprint the forge shows the first alone. */
export const codeQualityEntry = (finding: ToldFinding, fingerprint: string) => ({
  description: visible(finding.message),
  check_name: finding.rule,
  fingerprint,
  severity: severityOf[finding.severity],
  location: { path: visible(finding.location.file), lines: { begin: finding.location.range.start.line } },
});

/** The code-quality JSON that a forge compares between two branches. Accepted findings are left out: it knows no such state. */
export const gitlab: MakePrinter = ({ write, quiet }) => {
  const fingerprintOf = fingerprints();
  const entries: unknown[] = [];
  return {
    file(analysis) {
      for (const finding of wanted(toldFile(analysis).findings, quiet)) {
        // counted before it is left out, so that a waiver renames no other finding
        const fingerprint = fingerprintOf(finding);
        if (!finding.waived) entries.push(codeQualityEntry(finding, fingerprint));
      }
    },
    end: () => write(`${inertJson(entries)}\n`),
  };
};
