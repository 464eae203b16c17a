import type { Analysis } from '../analysis';
import { readConfig } from '../rules/config';
import { rules } from '../rules/list';
import type { FilePath } from '../text/types';
import type { Change } from './types';

const STRICT = ['off', 'hint', 'info', 'warning', 'error'];

type Row = Pick<Change, 'subject' | 'attribute' | 'from' | 'to' | 'at'>;

const rowOf = (row: Row): Change => ({
  ...row,
  electrical: false,
  words: `${row.subject}: ${row.attribute} ${row.from ?? 'none'} → ${row.to ?? 'none'}`,
  group: 0,
});

/**
 * Rules that a configuration judges less strictly than before, or by another option: which way an option is stricter is the rule's
 * own knowledge, so that each change of one is told.
 */
export function loosenedRules(base: Analysis | undefined, head: Analysis | undefined): readonly Change[] {
  const configOf = (analysis: Analysis | undefined) => {
    const file = analysis?.inputs.configFile;
    return readConfig(rules, file === undefined ? undefined : analysis?.parsed.get(file));
  };
  const [before, after] = [configOf(base), configOf(head)];
  const file: FilePath | undefined = head?.inputs.configFile ?? base?.inputs.configFile;
  if (file === undefined) return [];
  return rules.flatMap((rule) => {
    const subject = `rule ${rule.name}`;
    const at = { file, path: ['rules', rule.name] };
    const [from, to] = [before.severityOf(rule), after.severityOf(rule)];
    const severity =
      STRICT.indexOf(to) < STRICT.indexOf(from) ? [rowOf({ subject, attribute: 'severity', from, to, at })] : [];
    const [was, is] = [before.optionsOf(rule), after.optionsOf(rule)];
    const options = Object.keys(rule.options).flatMap((name) =>
      was[name] === is[name]
        ? []
        : [rowOf({ subject, attribute: name, from: String(was[name]), to: String(is[name]), at })],
    );
    return [...severity, ...options];
  });
}

/** Limits and budgets that allow more than before or are gone, and those of which it cannot be told, such as masks. */
export function loosenedLimits(changes: readonly Change[], base: Analysis, head: Analysis): readonly Change[] {
  const limit = (analysis: Analysis, name: string) => analysis.model.limits.find((one) => one.name === name);
  return changes.filter(({ at: { path }, attribute, subject, from, to }) => {
    if (path[0] !== 'limits' && path[0] !== 'owners' && attribute !== 'budget') return false;
    if (attribute === 'removed' || (from !== undefined && to === undefined)) return true;
    if (attribute === 'added') return false;
    const [was, is] = [limit(base, subject)?.values, limit(head, subject)?.values] as Record<string, unknown>[];
    const [before, after] = [number(was?.[attribute]) ?? number(from), number(is?.[attribute]) ?? number(to)];
    if (before === undefined || after === undefined) return !['note', 'name'].includes(attribute);
    const allowsMore = attribute === 'max' || path[0] !== 'limits' ? after > before : after < before;
    return allowsMore;
  });
}

/** The size of a limit of one value, whatever its unit. */
function number(value: unknown): number | undefined {
  if (Array.isArray(value)) return value.length === 1 ? number(value[0]) : undefined;
  if (typeof value === 'object' && value !== null && 'value' in value) return number(value.value);
  if (typeof value === 'string') return /^[\d.]+ dB\b/.test(value) ? Number.parseFloat(value) : undefined;
  return typeof value === 'number' ? value : undefined;
}
