import { xml } from './escape';
import { type ToldFile, type ToldFinding, toldFile, wanted } from './told';
import type { MakePrinter } from './types';

type State = 'failed' | 'skipped' | 'passed';

interface Case {
  /** `eye: main` whether the limit is met or not, so that a chart over time follows it. */
  readonly name: string;
  readonly file: string;
  readonly line?: number;
  readonly state: State;
  readonly rule: string;
  readonly message: string;
  readonly details: readonly string[];
}

const attributes = (values: Readonly<Record<string, string | number | undefined>>) =>
  Object.entries(values)
    .map(([name, value]) => (value === undefined ? '' : ` ${name}="${xml(String(value))}"`))
    .join('');

function findingCase(finding: ToldFinding, failing: ReadonlySet<string>): Case {
  const { rule, about, severity, message, location, related, fixes, waiver, waived } = finding;
  const { line, column } = location.range.start;
  const accepted = waiver ? ` (accepted by ${waiver.by} until ${waiver.until}: ${waiver.reason})` : ' (accepted)';
  return {
    name: about === '' ? rule : `${rule}: ${about}`,
    file: location.file,
    line,
    state: waived ? 'skipped' : failing.has(severity) ? 'failed' : 'passed',
    rule,
    message: `${message}${waived ? accepted : ''}`,
    details: [
      `${location.file}:${line}:${column} ${severity}: ${message}`,
      ...related.map((one) => `${one.location.file}:${one.location.range.start.line} ${one.message}`),
      ...fixes.map(({ title }) => `fix: ${title}`),
    ],
  };
}

/** Limits that no finding speaks of: met, or missed under a rule that is switched off. */
function limitCases({ file, limits }: ToldFile, told: ReadonlySet<string>): Case[] {
  return limits.flatMap(({ kind, name, met, text, line }) => {
    const caseName = `${kind}: ${name}`;
    if (told.has(caseName)) return [];
    const message = met ? text : `${text} (the rule is off)`;
    return [{ name: caseName, file, line, state: met ? 'passed' : 'skipped', rule: kind, message, details: [message] }];
  });
}

/** Two cases of a suite never share a name: a reader would keep one of them. */
function namedApart(cases: readonly Case[]): Case[] {
  const seen = new Map<string, number>();
  return cases.map((one) => {
    const count = (seen.get(one.name) ?? 0) + 1;
    seen.set(one.name, count);
    return count === 1 ? one : { ...one, name: `${one.name} (${count})` };
  });
}

function caseXml({ name, file, line, state, rule, message, details }: Case): string {
  const text = details.map(xml).join('\n');
  const inner: Record<State, string> = {
    failed: `<failure${attributes({ message, type: rule })}>${text}</failure>`,
    skipped: `<skipped${attributes({ message })}/>`,
    passed: `<system-out>${text}</system-out>`,
  };
  return `<testcase${attributes({ name, classname: file, file, line })}>${inner[state]}</testcase>\n`;
}

/** One file as a suite: a case for each limit and each finding. */
export function suite(file: ToldFile, failing: ReadonlySet<string>, quiet = false) {
  const findings = wanted(file.findings, quiet).map((finding) => findingCase(finding, failing));
  const all = new Set(file.findings.map(({ rule, about }) => `${rule}: ${about}`));
  const found = [...limitCases(file, all), ...findings];
  const none: Case = { name: 'findings', file: file.file, state: 'passed', rule: '', message: '', details: ['none'] };
  const cases = namedApart(found.length > 0 ? found : [none]);
  const count = (state: State) => cases.filter((one) => one.state === state).length;
  const counts = { tests: cases.length, failures: count('failed'), errors: 0, skipped: count('skipped') };
  const known = { title: file.title, verdict: file.verdict?.text };
  const properties = Object.entries(known).flatMap(([name, value]) =>
    value === undefined ? [] : [`<property${attributes({ name, value })}/>`],
  );
  const head = properties.length > 0 ? `<properties>${properties.join('')}</properties>\n` : '';
  return {
    counts,
    text: `<testsuite${attributes({ name: file.file, ...counts })}>\n${head}${cases.map(caseXml).join('')}</testsuite>\n`,
  };
}

const ERRORS: ReadonlySet<string> = new Set(['error']);

/** JUnit XML: a suite for each file, a case for each limit and finding; failed is what makes the status 1. No times, so that same inputs give same bytes. */
export const junit: MakePrinter = ({ write, quiet, failing = ERRORS }) => {
  const suites: ReturnType<typeof suite>[] = [];
  return {
    file(analysis) {
      suites.push(suite(toldFile(analysis), failing, quiet));
    },
    end() {
      const total = { tests: 0, failures: 0, errors: 0, skipped: 0 };
      for (const { counts } of suites)
        for (const name of ['tests', 'failures', 'errors', 'skipped'] as const) total[name] += counts[name];
      write(
        `<?xml version="1.0" encoding="UTF-8"?>\n<testsuites${attributes({ name: 'lanewright check', ...total })}>\n`,
      );
      for (const { text } of suites) write(text);
      write('</testsuites>\n');
    },
  };
};
