import type { CheckedFile } from '../../../schemas/outputs/check';
import type { Analysis } from '../../../src-core/analysis';
import { resonanceText } from '../../../src-core/figures/index';
import type { Figure } from '../../../src-core/figures/types';
import { fileKind } from '../../../src-core/inputs';
import type { Finding, Fix } from '../../../src-core/report';
import { resolveEdits } from '../../../src-core/text/edits';
import { locate, positionsIn } from './positions';

/** One file's part of the JSON output. Fixes come with all that they gain. */
export function checkedFile(analysis: Analysis): CheckedFile {
  const { inputs, model, ledger, cascade } = analysis;
  const kind = fileKind(inputs.file);
  return {
    file: inputs.file,
    kind: kind === 'parts' || kind === 'config' ? kind : 'channel',
    ...(kind === 'channel' && {
      title: model.title,
      verdict: { state: analysis.verdict.state, text: analysis.verdict.text },
    }),
    figures: analysis.figures.map(figureJson),
    limits: analysis.limits.map(({ name, kind: limitKind, met, limit, actual, marginShare, text }) => ({
      name,
      kind: limitKind,
      met,
      limit: figureJson(limit),
      actual: figureJson(actual),
      marginShare,
      text,
    })),
    ledger: (ledger?.rows ?? []).map(
      ({ element, kind: elementKind, figures, owner, budget, cumulativeDb, cumulativeShare }) => ({
        element,
        kind: elementKind,
        figures: figures.map(figureJson),
        ...(owner !== undefined && { owner }),
        ...(budget && {
          budget: { allowedDb: budget.allowedDb, spentDb: budget.spentDb, share: budget.share, text: budget.text },
        }),
        cumulativeDb,
        ...(cumulativeShare !== undefined && { cumulativeShare }),
      }),
    ),
    ...(ledger && { reflectionsDb: ledger.reflectionsDb }),
    resonances: (cascade?.resonances ?? []).map((resonance) => ({
      frequencyHz: resonance.frequencyHz,
      depthDb: resonance.depthDb,
      lossDb: resonance.lossDb,
      quality: resonance.quality,
      elements: [...resonance.elements],
      text: resonanceText(resonance),
    })),
    findings: analysis.findings.map((finding) => findingJson(finding, analysis)),
    timedOut: analysis.timedOut ?? false,
  };
}

const figureJson = ({ name, title, value, unit, text, note }: Figure) => ({
  name,
  title,
  value,
  unit,
  text,
  ...(note !== undefined && { note }),
});

function findingJson(finding: Finding, analysis: Analysis): CheckedFile['findings'][number] {
  const { rule, severity, message, subject, value, valueText, related = [], fixes = [], waivedBy } = finding;
  return {
    rule,
    severity,
    message,
    ...(subject !== undefined && { subject }),
    location: locate(finding, analysis),
    ...(value !== undefined && { value }),
    ...(valueText !== undefined && { valueText }),
    related: related.map((place) => ({ message: place.message, location: locate(place, analysis) })),
    fixes: fixes.map((fix) => fixJson(fix.resolve?.() ?? fix, analysis)),
    waived: waivedBy !== undefined,
  };
}

function fixJson(fix: Fix, { parsed }: Analysis) {
  return {
    title: fix.title,
    safe: fix.safe ?? false,
    edits: resolveEdits(fix.edits, parsed).map(({ file, range, text }) => ({
      file,
      range: positionsIn(parsed.get(file)?.text ?? '', range),
      text,
    })),
  };
}
