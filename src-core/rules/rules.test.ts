import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { Finding } from '../report';
import { rulesReference } from './build';
import { rules } from './list';
import { analyseExample, analyseFiles, applyFix } from './testing';

const told = (findings: readonly Finding[]) =>
  findings.filter(({ waivedBy }) => !waivedBy).map(({ rule, message }) => `${rule}: ${message}`);
const errors = (findings: readonly Finding[]) => told(findings.filter(({ severity }) => severity === 'error'));

describe.each(rules.filter(({ bad }) => bad).map((rule) => ({ name: rule.name, rule })))('$name', ({ name, rule }) => {
  test('the bad example has just this finding, under its default severity', () => {
    const findings = analyseExample(rule.bad).findings.filter(({ rule: of }) => !(rule.alsoGives ?? []).includes(of));
    expect(findings.length, told(findings).join('\n')).toBeGreaterThan(0);
    expect(
      findings.map((finding) => `${finding.severity} ${finding.rule}`),
      told(findings).join('\n'),
    ).toEqual(findings.map(() => `${rule.severity} ${name}`));
  });
  test('the good example has none', () => {
    expect(told(analyseExample(rule.good).findings)).toEqual([]);
  });
  test('each fix ends it and brings no new error', () => {
    const analysis = analyseExample(rule.bad);
    for (const finding of analysis.findings.filter((one) => one.rule === name)) {
      for (const fix of finding.fixes ?? []) {
        const after = analyseFiles(applyFix(fix, analysis), {
          file: analysis.inputs.file,
          until: rule.reads === 'link' ? 'link' : 'time',
        });
        const same = after.findings.filter((one) => one.rule === name && one.message === finding.message);
        expect(told(same), fix.title).toEqual([]);
        expect(
          errors(after.findings).filter((message) => !errors(analysis.findings).includes(message)),
          fix.title,
        ).toEqual([]);
      }
    }
  });
});

test('the base of all examples has no finding', () => {
  expect(told(analyseExample('').findings)).toEqual([]);
});
test('names are words of the format, each once, and each rule has its paragraph', () => {
  expect(new Set(rules.map(({ name }) => name)).size).toBe(rules.length);
  for (const { name, doc } of rules) {
    expect(name).toMatch(/^[a-z]+(-[a-z]+)*$/);
    expect(doc.length).toBeGreaterThan(80);
  }
});
test('the reference is that of the list', () => {
  expect(readFileSync(new URL('README.md', import.meta.url), 'utf8')).toBe(rulesReference());
});
