import type { Analysis } from '../analysis';
import { rowFigureKinds } from '../figures/ledger';
import type { Figure, LedgerRow } from '../figures/types';
import { show } from '../quantity/show';
import type { Finding, Severity } from '../report';
import type { Place } from '../text/types';
import { plots } from './list';
import { plainDescription } from './plain';
import type { PlotDescription } from './types';

/**
 * All that the preview and the report show of a channel, as plain JSON: every figure is already the one text that every
 * surface shows. Places are looked up in the newest text by whoever selects them.
 */
export interface PreviewData {
  readonly file: string;
  readonly title: string;
  /** `25.78 Gb/s NRZ, 100 Ω` and the like. */
  readonly about: string;
  readonly verdict: { readonly state: Analysis['verdict']['state']; readonly text: string };
  /** The eye belongs to an older text. */
  readonly stale: boolean;
  readonly figures: readonly FigureText[];
  readonly limits: readonly {
    readonly name: string;
    readonly kind: string;
    readonly met: boolean;
    readonly text: string;
    readonly at?: Place;
  }[];
  readonly ledger?: LedgerTable;
  readonly plots: readonly PreviewPlot[];
  readonly findings: readonly FindingText[];
  /** Findings beyond those in `findings`. */
  readonly moreFindings: number;
}

export interface FigureText {
  readonly name: string;
  readonly title: string;
  readonly text: string;
  readonly note?: string;
}

export interface LedgerTable {
  readonly columns: readonly { readonly name: string; readonly title: string }[];
  readonly rows: readonly {
    readonly element: string;
    readonly kind: string;
    readonly at?: Place;
    /** One text a column; empty where there is none. */
    readonly cells: readonly string[];
    /** Loss so far, and its share of what the path may lose. */
    readonly sofar: string;
    readonly share?: number;
    readonly budget: string;
    readonly budgetShare?: number;
    readonly owner: string;
  }[];
  readonly reflections: string;
  readonly owners: readonly { readonly owner: string; readonly text: string; readonly share?: number }[];
}

export interface PreviewPlot {
  readonly name: string;
  readonly title: string;
  readonly description?: PlotDescription;
  /** Why there is nothing to draw. */
  readonly missing?: string;
}

export interface FindingText {
  readonly severity: Severity;
  readonly rule: string;
  readonly message: string;
  readonly subject?: string;
  readonly accepted: boolean;
  readonly at: Place;
}

const mostFindings = 50;

/** Pure; kept stages give equal data, so a surface may leave alone what did not change. */
export function previewData(analysis: Analysis): PreviewData {
  const { model, verdict, linkIsStale, figures, limits, findings } = analysis;
  return {
    file: model.file,
    title: model.title,
    about: aboutOf(analysis),
    verdict: { state: verdict.state, text: verdict.text },
    stale: linkIsStale,
    figures: figures.map(figureText),
    limits: limits.map(({ name, kind, met, text }) => {
      const at = model.limits.find((limit) => limit.name === name)?.place;
      return { name, kind, met, text, ...(at && { at }) };
    }),
    ...(analysis.ledger && { ledger: ledgerTable(analysis) }),
    plots: plots.map((plot) => {
      const description = plot.describe(analysis);
      const { name, title } = plot;
      return description
        ? { name, title, description: plainDescription(description) }
        : { name, title, missing: whyMissing(name, analysis) };
    }),
    findings: worstFirst(findings).slice(0, mostFindings).map(findingText),
    moreFindings: Math.max(0, findings.length - mostFindings),
  };
}

function aboutOf({ model }: Analysis): string {
  if (!model.computable) return '';
  const rate = `${show.bitRate(model.lineRate)} ${model.modulation}`;
  return `${rate}, ${model.signalling}, ${show.impedance(model.referenceOhms)}, Nyquist ${show.frequency(model.nyquistFrequency)}`;
}

const figureText = ({ name, title, text, note }: Figure): FigureText => ({ name, title, text, ...(note && { note }) });

const order: readonly Severity[] = ['error', 'warning', 'info', 'hint'];

function worstFirst(findings: readonly Finding[]): readonly Finding[] {
  const rank = (finding: Finding) => (finding.waivedBy ? order.length : order.indexOf(finding.severity));
  return [...findings].sort((a, b) => rank(a) - rank(b));
}

const findingText = ({ severity, rule, message, subject, waivedBy, at }: Finding): FindingText => ({
  severity,
  rule,
  message,
  ...(subject !== undefined && { subject }),
  accepted: waivedBy !== undefined,
  at,
});

function ledgerTable({ ledger, model }: Analysis): LedgerTable {
  const { rows, reflectionsDb, owners } = ledger!;
  const used = rowFigureKinds.filter(({ name }) =>
    rows.some((row) => row.figures.some((figure) => figure.name === name)),
  );
  return {
    columns: used.map(({ name, title }) => ({ name, title })),
    rows: rows.map((row) => ({
      ...ledgerRow(row, used),
      ...(model.elements[row.index] && { at: model.elements[row.index].place }),
    })),
    reflections: show.loss(reflectionsDb),
    owners: owners.map(({ owner, text, allowedDb, spentDb }) => ({
      owner,
      text,
      ...(allowedDb && { share: rounded(spentDb / allowedDb) }),
    })),
  };
}

function ledgerRow(row: LedgerRow, columns: readonly { readonly name: string }[]) {
  const { element, kind, figures, budget, owner = '', cumulativeDb, cumulativeShare } = row;
  const share = cumulativeShare === undefined ? '' : ` (${show.percent(cumulativeShare)})`;
  return {
    element,
    kind,
    cells: columns.map(({ name }) => figures.find((figure) => figure.name === name)?.text ?? ''),
    sofar: `${show.loss(cumulativeDb)}${share}`,
    ...(cumulativeShare !== undefined && { share: rounded(cumulativeShare) }),
    budget: budget?.text ?? '',
    ...(budget && { budgetShare: rounded(budget.share) }),
    owner,
  };
}

const rounded = (value: number): number => (Number.isFinite(value) ? Math.round(value * 1000) / 1000 : 0);

function whyMissing(name: string, { model, cascade, time, link, timedOut }: Analysis): string {
  if (timedOut) return 'The time for one file was over before this was computed.';
  if (!model.computable) return 'Nothing can be computed before `line-rate` and `path` are read.';
  if (!cascade) return 'Nothing can be computed before the elements of `path` are complete.';
  if (name === 'eye' && !link) {
    const wanted = [model.transmitter ? '' : '`transmitter`', model.receiver ? '' : '`receiver`']
      .filter(Boolean)
      .join(' and ');
    return wanted ? `The eye needs ${wanted}.` : 'The eye is not computed yet.';
  }
  return time ? 'There is nothing to draw.' : 'This is not computed yet.';
}
