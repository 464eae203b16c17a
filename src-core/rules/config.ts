import type { SeveritySetting } from '../../schemas/format/types';
import { FORMAT_VERSION } from '../../schemas/format/version';
import { quoted } from '../model/reports';
import { nearest } from '../quantity/nearest';
import { isMapping } from '../raw';
import type { Fix, Report } from '../report';
import type { ParsedFile } from '../text/parsed';
import type { Place } from '../text/types';
import type { AnyRule } from './types';

/** Severities and options of rules as `lanewright.config.yaml` sets them; what it does not name is the default. */
export interface Config {
  severityOf(rule: AnyRule): SeveritySetting;
  optionsOf(rule: AnyRule): Record<string, unknown>;
  /** What is wrong with the configuration itself, under the rule `configuration`. */
  readonly reports: readonly Report[];
}

const SEVERITIES: readonly SeveritySetting[] = ['error', 'warning', 'info', 'hint', 'off'];
const isSeverity = (value: unknown): value is SeveritySetting => SEVERITIES.includes(value as SeveritySetting);

/** `; did you mean …?` and the fix that writes it, where one of the names is near. */
function suggestion(written: string, names: readonly string[], edit: (name: string) => Fix['edits'][number]) {
  const near = nearest(written, names);
  const fixes: Fix[] =
    near === undefined ? [] : [{ title: `Write \`${near}\``, edits: [edit(near)], preferred: true, safe: true }];
  return { words: near === undefined ? '.' : `; did you mean \`${near}\`?`, fixes };
}

function unknownKey(at: Place, written: string, what: string, names: readonly string[]): Report {
  const { words, fixes } = suggestion(written, names, (name) => ({ op: 'key', at, name }));
  return { at: { ...at, on: 'key' }, message: `${quoted(written)} is not ${what}${words}`, fixes };
}

function wrongSeverity(at: Place, written: unknown): Report {
  const { words, fixes } = suggestion(String(written), SEVERITIES, (name) => ({ op: 'value', at, text: name }));
  return { at, message: `A severity is one of ${SEVERITIES.map((one) => `\`${one}\``).join(', ')}${words}`, fixes };
}

/** A YAML 1.1 reader turns a bare `off` into false; ours keeps it, but a person may well write false. */
const severityFrom = (value: unknown) => (value === false ? 'off' : value);

/** Reads the settings of one rule. */
function readRule(rule: AnyRule, value: unknown, at: Place, reports: Report[]) {
  if (!isMapping(value)) {
    const severity = severityFrom(value);
    if (!isSeverity(severity)) reports.push(wrongSeverity(at, value));
    return { severity: isSeverity(severity) ? severity : undefined, options: {} };
  }
  const options: Record<string, unknown> = {};
  let severity: SeveritySetting | undefined;
  for (const [key, written] of Object.entries(value)) {
    const place = { ...at, path: [...at.path, key] };
    if (key === 'severity') {
      const setting = severityFrom(written);
      if (isSeverity(setting)) severity = setting;
      else reports.push(wrongSeverity(place, written));
    } else if (key.startsWith('x-')) {
    } else if (!Object.hasOwn(rule.options, key)) {
      reports.push(unknownKey(place, key, `an option of \`${rule.name}\``, ['severity', ...Object.keys(rule.options)]));
    } else if (typeof written !== typeof rule.options[key] || !isSensible(written)) {
      const wanted = typeof rule.options[key] === 'number' ? 'a number above 0' : `a ${typeof rule.options[key]}`;
      reports.push({
        at: place,
        message: `\`${key}\` of \`${rule.name}\` is ${wanted}; ${String(rule.options[key])} is the default.`,
      });
    } else options[key] = written;
  }
  return { severity, options };
}

const isNewer = (version: unknown) =>
  typeof version === 'number' && Number.isInteger(version) && version > FORMAT_VERSION;

const isSensible = (value: unknown) => typeof value !== 'number' || (Number.isFinite(value) && value > 0);

/** Reads a configuration; without a file every rule has its defaults. */
export function readConfig(rules: readonly AnyRule[], parsed: ParsedFile | undefined): Config {
  const reports: Report[] = [];
  const settings = new Map<string, ReturnType<typeof readRule>>();
  // of a newer version nothing is read; its own finding says so
  const written = isMapping(parsed?.value) && !isNewer(parsed.value.lanewright) ? parsed.value.rules : undefined;
  if (parsed && isMapping(written)) {
    for (const [name, value] of Object.entries(written)) {
      const at: Place = { file: parsed.file, path: ['rules', name] };
      const rule = rules.find((one) => one.name === name);
      if (rule) settings.set(name, readRule(rule, value, at, reports));
      else if (!name.startsWith('x-'))
        reports.push(
          unknownKey(
            at,
            name,
            'a rule',
            rules.map((one) => one.name),
          ),
        );
    }
  }
  return {
    severityOf: (rule) => settings.get(rule.name)?.severity ?? rule.severity,
    optionsOf: (rule) => ({ ...rule.options, ...settings.get(rule.name)?.options }),
    reports,
  };
}
