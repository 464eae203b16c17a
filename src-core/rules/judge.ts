import type { SeveritySetting } from '../../schemas/format/types';
import type { Finding, Report } from '../report';
import { rangeOf } from '../text/range';
import { type Config, readConfig } from './config';
import { keptReports } from './kept';
import { rules } from './list';
import { type NamedReport, reportsOf } from './reported';
import type { AnyRule, Judged, StageName } from './types';
import { applyWaivers } from './waivers';

/** More findings than this help nobody: the rest is counted. */
export const MOST_FINDINGS = 200;

const STAGES: Readonly<Record<StageName, (judged: Judged) => unknown>> = {
  model: ({ model }) => model,
  networks: ({ networks }) => networks,
  cascade: ({ cascade }) => cascade,
  time: ({ time }) => time,
  link: ({ link }) => link,
};

const canRun = (rule: AnyRule, judged: Judged) => STAGES[rule.reads](judged) !== undefined;

/** A rule that breaks is a fault of ours: it is told, and the others are heard. */
function safely(rule: AnyRule, judged: Judged, options: Record<string, unknown>): readonly NamedReport[] {
  try {
    return keptReports(rule, judged, options).map((report) => ({ ...report, rule: rule.name }));
  } catch (error) {
    const message = `The rule \`${rule.name}\` broke: ${error instanceof Error ? error.message : String(error)}. This is a fault of Lanewright; the other rules were heard.`;
    return [{ rule: 'internal', at: { file: judged.inputs.file, path: [] }, message }];
  }
}

const reserved = new Map<string, AnyRule>(rules.map((rule) => [rule.name, rule]));

/** Severities where a stage names a rule that the list does not hold (a test says that there is none). */
const severityFor = (name: string, config: Config): SeveritySetting => {
  const rule = reserved.get(name);
  return rule ? config.severityOf(rule) : 'error';
};

const withSeverity = (reports: readonly NamedReport[], config: Config): readonly Finding[] =>
  reports.flatMap((report) => {
    const severity = severityFor(report.rule, config);
    return severity === 'off' ? [] : [{ ...report, severity }];
  });

const under = (rule: string, reports: readonly Report[]): readonly NamedReport[] =>
  reports.map((report) => ({ ...report, rule }));

const ORDER = { error: 0, warning: 1, info: 2, hint: 3 } as const;

/** By file, this one first, then by where they start, then the worse one, then by rule and words: the same in every run. */
function sorted(findings: readonly Finding[], { inputs, parsed }: Judged): readonly Finding[] {
  const keyed = findings.map((finding) => {
    const file = parsed.get(finding.at.file);
    const start = finding.range?.start ?? (file ? rangeOf(file, finding.at).start : 0);
    return { finding, start, file: finding.at.file === inputs.file ? '' : finding.at.file };
  });
  keyed.sort(
    (a, b) =>
      compare(a.file, b.file) ||
      a.start - b.start ||
      ORDER[a.finding.severity] - ORDER[b.finding.severity] ||
      compare(a.finding.rule, b.finding.rule) ||
      compare(a.finding.message, b.finding.message),
  );
  return keyed.map(({ finding }) => finding);
}

const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0);

/** The worst two hundred in the order of the text, and one finding that counts the rest under the severity of its worst. */
function shortened(findings: readonly Finding[], { inputs }: Judged): readonly Finding[] {
  if (findings.length <= MOST_FINDINGS) return findings;
  const bySeverity = [...findings].sort((a, b) => ORDER[a.severity] - ORDER[b.severity]);
  const shown = new Set(bySeverity.slice(0, MOST_FINDINGS));
  const rest = bySeverity.length - MOST_FINDINGS;
  const more: Finding = {
    rule: 'limit',
    severity: bySeverity[MOST_FINDINGS].severity,
    at: { file: inputs.file, path: [] },
    // readers of texts stop counting at a thousand
    message: `${findings.length < 1000 ? '' : 'At least '}${rest} more finding${rest === 1 ? ' is' : 's are'} not shown; ${MOST_FINDINGS} are.`,
  };
  return [...findings.filter((finding) => shown.has(finding)), more];
}

/** The configuration that counts for an analysis. */
export const configOf = ({ inputs, parsed }: Judged): Config =>
  readConfig(
    rules,
    inputs.configFile === undefined ? parsedConfig(inputs.file, parsed) : parsed.get(inputs.configFile),
  );

const parsedConfig = (file: string, parsed: Judged['parsed']) =>
  parsed.get(file)?.kind === 'config' ? parsed.get(file) : undefined;

/**
 * What is wrong or worth knowing, as the rules and the stages see it: severities and options of the configuration applied, waivers
 * applied as of `inputs.today`, in the order of the text, at most 200. A rule whose stages are the same objects as before does not
 * run again; ranges are no part of that, since findings name places.
 */
export function judge(judged: Judged, config: Config = configOf(judged)): readonly Finding[] {
  const active = rules.filter((rule) => config.severityOf(rule) !== 'off' && canRun(rule, judged));
  const reports = [...reportsOf(judged), ...active.flatMap((rule) => safely(rule, judged, config.optionsOf(rule)))];
  const ownConfig =
    judged.parsed.get(judged.inputs.file)?.kind === 'config' ? under('configuration', config.reports) : [];
  const findings = withSeverity([...reports, ...ownConfig], config);
  const names = new Set(active.map(({ name }) => name));
  const waived = applyWaivers(findings, judged, {
    rules: rules.map(({ name }) => name),
    ran: (rule) => names.has(rule),
  });
  const aboutWaivers = [
    ...under('waiver-dead', waived.dead),
    ...under('waiver-outgrown', waived.outgrown),
    ...under('waiver-outdated', waived.outdated),
  ];
  return shortened(sorted([...waived.findings, ...withSeverity(aboutWaivers, config)], judged), judged);
}
