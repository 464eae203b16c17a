import type { Report } from '../report';
import type { AnyRule, Judged, StageName } from './types';

type Reports = readonly (Report & { readonly subject?: string })[];
interface Kept {
  readonly stages: readonly unknown[];
  readonly optionsText: string;
  readonly reports: Reports;
}

const ORDER: readonly StageName[] = ['model', 'networks', 'cascade', 'time', 'link'];

/** Each stage up to the one that a rule reads; a stage is the same object while its own input is the same. */
function stagesOf(rule: AnyRule, judged: Judged): readonly unknown[] {
  const names = ORDER.slice(0, ORDER.indexOf(rule.reads) + 1);
  const stages: unknown[] = names.map((name) => judged[name]);
  const { dependents = [] } = judged.inputs;
  if (rule.reads === 'model') for (const file of dependents) stages.push(judged.parsed.get(file));
  return rule.reads === 'link' ? [...stages, judged.linkIsStale] : stages;
}

/** By the model, which goes when its analysis does: nothing here outlives it. */
const kept = new WeakMap<object, Map<string, Kept>>();

const latest = new WeakMap<object, Judged>();

/** The newest analysis of a model: what a kept fix computes its gain from, since the link comes after the rules that offer it. */
export const latestOf = (judged: Judged): Judged => latest.get(judged.model) ?? judged;

/** A rule's reports, from before where none of what it reads has changed. */
export function keptReports(rule: AnyRule, judged: Judged, options: Record<string, unknown>): Reports {
  latest.set(judged.model, judged);
  const stages = stagesOf(rule, judged);
  const optionsText = JSON.stringify(options);
  const byRule = kept.get(judged.model) ?? new Map<string, Kept>();
  kept.set(judged.model, byRule);
  const before = byRule.get(rule.name);
  if (
    before &&
    before.optionsText === optionsText &&
    before.stages.length === stages.length &&
    before.stages.every((stage, i) => stage === stages[i])
  )
    return before.reports;
  const reports = [...rule.check(judged, options)];
  byRule.set(rule.name, { stages, optionsText, reports });
  return reports;
}
