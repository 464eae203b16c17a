import { compose } from './compose';
import { MAX_REPORTS, MAX_TEXT_BYTES, utf8Length } from './limits';
import type { ParsedFile } from './parsed';
import { recover } from './recover';
import { isWithoutNames, lineEndOf, reparse } from './reparse';
import type { TextReport } from './reports';
import { emptyScalar, type Syntax, type SyntaxNode } from './syntax';
import { expandTabs, mapOffsets, mapReport } from './tabs';
import { mendTraps } from './traps';
import type { FileKind, FilePath } from './types';
import { buildValue } from './values';

/**
 * Reads a YAML text into plain values and a tree of ranges. Never throws, whatever the text; each fault gives one report
 * with a range inside the text, and what does not stand in the same entry keeps its values.
 * @param before an earlier state of the same file: what it shares with this one is taken from it; the result is the same
 */
export function parseFile(
  file: FilePath,
  text: string,
  kind: FileKind = kindOf(file),
  before?: ParsedFile,
): ParsedFile {
  const lineEnd = lineEndOf(text);
  const bytes = text.length > MAX_TEXT_BYTES ? text.length : utf8Length(text);
  if (bytes > MAX_TEXT_BYTES) {
    const syntax: Syntax = { root: emptyScalar(0), lineEnd };
    const report: TextReport = {
      rule: 'limit',
      at: { file, path: [] },
      range: { start: 0, end: Math.min(text.length, 1) },
      message: 'This text is larger than 1 MiB and is not read. Divide it, or move what is shared to a parts file.',
    };
    return { file, kind, text, value: null, reports: [report], syntax };
  }
  const partly = before?.file === file && before.kind === kind ? reparse(before, text) : undefined;
  if (partly) return partly;
  const { root: read, reports: syntaxReports, whole } = readTree(text, file);
  const { root, reports: trapReports } = mendTraps(read, text, file);
  const { value, reports: valueReports } = buildValue(root, file, text);
  const reports = [...syntaxReports, ...trapReports, ...valueReports]
    .sort((a, b) => (a.range?.start ?? 0) - (b.range?.start ?? 0))
    .slice(0, MAX_REPORTS);
  const clean = whole === true && reports.length === 0 && isWithoutNames(root);
  const syntax: Syntax = { root, lineEnd, ...(clean && { clean }) };
  return { file, kind, text, value, reports, syntax };
}

interface Tree {
  readonly root: SyntaxNode;
  readonly reports: readonly TextReport[];
  /** By one parse, not in pieces. */
  readonly whole?: boolean;
}

function readTree(text: string, file: FilePath): Tree {
  const whole = compose(text, 0);
  if (whole.errors.length === 0 && whole.tooDeep === undefined) return { root: whole.node, reports: [], whole: true };
  const expanded = expandTabs(text, file);
  if (!expanded) return recover(text, file);
  const again = compose(expanded.text, 0);
  const good = again.errors.length === 0 && again.tooDeep === undefined;
  const { root, reports } = good ? { root: again.node, reports: [] } : recover(expanded.text, file);
  return {
    root: mapOffsets(root, expanded.original),
    reports: [expanded.report, ...reports.map((report) => mapReport(report, expanded.original))],
  };
}

/** By its name; the same words as `fileKind`, which knows paths. */
function kindOf(file: FilePath): FileKind {
  if (file.endsWith('.channel.yaml')) return 'channel';
  if (file.endsWith('.parts.yaml')) return 'parts';
  return file.endsWith('lanewright.config.yaml') ? 'config' : 'other';
}
