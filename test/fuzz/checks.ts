import { analyse } from '../../src-core/analyse';
import type { Analysis, Inputs } from '../../src-core/analysis';
import { rangeOf } from '../../src-core/text/range';

/** More than this for one analysis without the eye is a hang. */
export const CEILING_MILLISECONDS = 5000;

/** What is wrong with an analysis of any text whatsoever; empty where nothing is. */
export function faultsOf(analysis: Analysis, milliseconds: number): string[] {
  const faults: string[] = [];
  if (milliseconds > CEILING_MILLISECONDS) faults.push(`took ${Math.round(milliseconds)} ms`);
  if (analysis.findings.length > 201) faults.push(`${analysis.findings.length} findings`);
  for (const finding of analysis.findings) {
    if (finding.rule === 'internal') faults.push(`internal: ${finding.message}`);
    for (const { at, range } of [
      finding,
      ...(finding.related ?? []).map((related) => ({ at: related.at, range: undefined })),
    ]) {
      const parsed = analysis.parsed.get(at.file);
      if (!parsed) continue;
      const { start, end } = range ?? rangeOf(parsed, at);
      if (!(start >= 0 && start <= end && end <= parsed.text.length))
        faults.push(`${finding.rule}: range ${start} to ${end} outside a text of ${parsed.text.length}`);
    }
    if (/NaN|Infinity|undefined|\[object/.test(withoutQuotes(finding.message, analysis)))
      faults.push(`${finding.rule}: ${finding.message}`);
  }
  for (const { name, value, text } of analysis.figures)
    if (!Number.isFinite(value) || /NaN|Infinity/.test(text)) faults.push(`figure ${name} is ${value}, ${text}`);
  return faults;
}

/** The message without the pieces of the files that it repeats: a key that someone typed may well be called NaN. */
function withoutQuotes(message: string, { parsed }: Analysis): string {
  const texts = [...parsed.values()].map(({ text }) => text);
  return message.replace(/`([^`]*)`/g, (quote, piece: string) =>
    // `prefix.name` stands in two places: the prefix under `use`, the name in the parts file
    [piece, ...piece.split('.').slice(0, 1)].some((part) => texts.some((text) => text.includes(part.replace(/…$/, ''))))
      ? ''
      : quote,
  );
}

export function timed(inputs: Inputs, previous?: Analysis): { analysis: Analysis; milliseconds: number } {
  const start = performance.now();
  const analysis = analyse(inputs, previous, { until: 'time' });
  return { analysis, milliseconds: performance.now() - start };
}

/** What a person sees of an analysis: equal for two analyses of the same text, whatever came before. */
export function visible(analysis: Analysis): string {
  return JSON.stringify({
    findings: analysis.findings.map(({ fixes = [], ...finding }) => ({
      ...finding,
      fixes: fixes.map(({ title, edits }) => ({ title, edits })),
    })),
    figures: analysis.figures,
    limits: analysis.limits,
    verdict: analysis.verdict,
    ledger: analysis.ledger,
    pulse: analysis.time && [...analysis.time.pulse],
  });
}

/** The lines of the path's entry that holds an offset, by the analysis of the good text. */
export function entryAt(analysis: Analysis, offset: number): { name: string; start: number; end: number } | undefined {
  const parsed = analysis.parsed.get(analysis.inputs.file);
  if (!parsed) return undefined;
  for (const { name, place } of analysis.model.elements) {
    const { start, end } = rangeOf(parsed, { ...place, on: 'entry' });
    if (offset >= start && offset < end) return { name, start, end };
  }
  return undefined;
}
