import { expect, test } from 'vitest';
import type { ParsedFile } from '../text/parsed';
import { readConfig } from './config';
import { rules } from './list';

const rule = (name: string) => rules.find((one) => one.name === name)!;
const read = (value: unknown) =>
  readConfig(rules, {
    file: 'lanewright.config.yaml',
    kind: 'config',
    text: '',
    value,
    reports: [],
    syntax: undefined,
  } as ParsedFile);

test('without a configuration each rule has its defaults', () => {
  const config = readConfig(rules, undefined);
  expect(config.severityOf(rule('stub-resonance'))).toBe('warning');
  expect(config.optionsOf(rule('stub-resonance'))).toEqual({ multiple: 3 });
});
test('severity alone, and severity with options', () => {
  const config = read({ rules: { 'unused-part': 'off', 'stub-resonance': { severity: 'error', multiple: 4 } } });
  expect(config.severityOf(rule('unused-part'))).toBe('off');
  expect(config.severityOf(rule('stub-resonance'))).toBe('error');
  expect(config.optionsOf(rule('stub-resonance'))).toEqual({ multiple: 4 });
  expect(config.reports).toEqual([]);
});
test.each([
  [{ 'stub-resonanse': 'off' }, '`stub-resonanse` is not a rule; did you mean `stub-resonance`?'],
  [{ 'stub-resonance': { multipel: 4 } }, '`multipel` is not an option of `stub-resonance`; did you mean `multiple`?'],
  [{ 'stub-resonance': 'eror' }, 'did you mean `error`?'],
  [{ 'stub-resonance': { severity: 'loud' } }, 'A severity is one of `error`'],
  [{ 'stub-resonance': { multiple: 'four' } }, '`multiple` of `stub-resonance` is a number above 0; 3 is the default'],
  [{ 'stub-resonance': { multiple: -1 } }, 'a number above 0'],
])('%j is told, and the default holds', (written, message) => {
  const config = read({ rules: written });
  expect(config.reports).toHaveLength(1);
  expect(config.reports[0].message).toContain(message);
  expect(config.severityOf(rule('stub-resonance'))).toBe('warning');
  expect(config.optionsOf(rule('stub-resonance'))).toEqual({ multiple: 3 });
});
test.each([undefined, null, 3, [], { rules: 'off' }, { rules: { 'x-own': 1 } }])(
  '%j sets nothing and breaks nothing',
  (value) => {
    expect(read(value).reports).toEqual([]);
  },
);
test('names that objects inherit are names like any other', () => {
  const config = read({ rules: JSON.parse('{"__proto__": "off", "stub-resonance": {"constructor": 1}}') });
  expect(config.reports.map(({ message }) => message)).toEqual([
    expect.stringContaining('`__proto__` is not a rule'),
    expect.stringContaining('`constructor` is not an option'),
  ]);
});

test('of a newer version nothing is read', () => {
  const config = read({ lanewright: 2, rules: { 'stub-resonance': 'off', 'stub-resonanse': 'off' } });
  expect(config.severityOf(rule('stub-resonance'))).toBe('warning');
  expect(config.reports).toEqual([]);
});
