import { describe, expect, test } from 'vitest';
import { analyse } from '../analyse';
import type { Analysis } from '../analysis';
import { applyEdits, resolveEdits } from '../text/edits';
import type { FileContent, FilePath } from '../text/types';
import { addWaivers } from './add-waivers';
import { judge } from './judge';
import { rules } from './list';
import { analyseFiles, filesWith, TODAY } from './testing';
import { BOARD, CHANNEL, CONFIG, files } from './testing-base';
import type { Judged } from './types';

const text = (value: string): FileContent => ({ kind: 'text', text: value });
const withFile = (all: ReadonlyMap<FilePath, FileContent>, file: FilePath, value: string) =>
  new Map([...all, [file, text(value)]]);
const textOf = (all: ReadonlyMap<FilePath, FileContent>, file: FilePath) => (all.get(file) as { text: string }).text;
const deep = filesWith('path: [{ via: dive, part: board.long-hole }]').files;
const time = { until: 'time' } as const;

describe('severities and options', () => {
  test.each([
    ['stub-resonance: error', 'error'],
    ['stub-resonance: { severity: info }', 'info'],
    ['stub-resonance: { multiple: 2.9 }', 'warning'],
  ])('`%s` makes the finding: %s', (setting, severity) => {
    const all = withFile(deep, CONFIG, `lanewright: 1\nrules: { ${setting} }\n`);
    expect(analyseFiles(all, time).findings.map((finding) => finding.severity)).toEqual([severity]);
  });
  test.each(['stub-resonance: off', 'stub-resonance: { multiple: 1 }'])('`%s` ends it', (setting) => {
    expect(analyseFiles(withFile(deep, CONFIG, `lanewright: 1\nrules: { ${setting} }\n`), time).findings).toEqual([]);
  });
  test('what is wrong with the configuration is told there, not in each channel', () => {
    const all = withFile(files, CONFIG, 'lanewright: 1\nrules: { stub-resonance: { multipel: 4 } }\n');
    expect(analyseFiles(all, time).findings).toEqual([]);
    expect(analyseFiles(all, { file: CONFIG }).findings).toMatchObject([
      { rule: 'configuration', at: { path: ['rules', 'stub-resonance', 'multipel'] } },
    ]);
  });
});

describe('waivers in the text', () => {
  const failing = 'limits: [{ return-loss: match, band: 50 MHz to 5 GHz, min: 30 dB }]';
  const accept = (all: ReadonlyMap<FilePath, FileContent>): ReadonlyMap<FilePath, FileContent> => {
    const analysis = analyseFiles(all, time);
    const edits = resolveEdits(
      addWaivers(analysis, { by: 'us', until: TODAY, reason: 'an old board' }),
      analysis.parsed,
    );
    return withFile(all, CHANNEL, applyEdits(textOf(all, CHANNEL), edits));
  };
  const open = ({ findings }: Analysis) => findings.filter(({ waivedBy }) => !waivedBy).map(({ rule }) => rule);

  test('`--add-waivers` accepts all that there is, at its value, and nothing more', () => {
    const accepted = accept(filesWith(failing).files);
    const analysis = analyseFiles(accepted, time);
    expect(open(analysis)).toEqual([]);
    expect(analysis.findings).toHaveLength(1);
    expect(analysis.verdict).toMatchObject({ state: 'good' });
    expect(analysis.verdict.text).toContain('1 finding accepted');
  });
  test('beyond the accepted value the finding returns, and the waiver is outgrown', () => {
    const accepted = accept(filesWith(failing).files);
    const worse = textOf(accepted, CHANNEL).replace(
      'package: chip, length: 10 mm, impedance: 100 ohm',
      'package: chip, length: 10 mm, impedance: 85 ohm',
    );
    expect(open(analyseFiles(withFile(accepted, CHANNEL, worse), time))).toEqual(['return-loss', 'waiver-outgrown']);
  });
  test('mended, the waiver is dead, and its fix removes it', () => {
    const accepted = accept(filesWith(failing).files);
    const mended = withFile(accepted, CHANNEL, textOf(accepted, CHANNEL).replace('min: 30 dB', 'min: 5 dB'));
    const analysis = analyseFiles(mended, time);
    expect(open(analysis)).toEqual(['waiver-dead']);
    const edits = resolveEdits(analysis.findings[0].fixes![0].edits, analysis.parsed);
    expect(analyseFiles(withFile(mended, CHANNEL, applyEdits(textOf(mended, CHANNEL), edits)), time).findings).toEqual(
      [],
    );
  });
  test('while the eye is not computed, a waiver of the eye is not called dead', () => {
    const eye = filesWith(
      'limits: [{ eye: main, height: 790 mV }]\nwaivers: [{ rule: eye, at: main, until: 2026-12-31, by: us, reason: old }]',
    ).files;
    expect(open(analyseFiles(eye, time))).toEqual([]);
    expect(open(analyseFiles(eye))).toEqual([]);
  });
});

describe('order and number', () => {
  const many = (count: number) =>
    filesWith(
      `x-more: 1\npath:\n${Array.from({ length: count }, (_, i) => `  - { capacitor: extra-${i}, value: 100 uF, vlaue: 1 nF }`).join('\n')}`,
    ).files;
  test.each([
    [199, 199, 0],
    [200, 200, 0],
    [201, 200, 1],
    [450, 200, 250],
  ])('of %d findings %d are shown, and one says how many more: %d', (count, shown, more) => {
    const { findings } = analyseFiles(many(count), time);
    expect(findings.filter(({ rule }) => rule === 'schema')).toHaveLength(shown);
    const rest = findings.filter(({ rule }) => rule === 'limit');
    expect(rest.map(({ message }) => message)).toEqual(more ? [expect.stringMatching(`^${more} more`)] : []);
    expect(rest.every(({ severity }) => severity === 'error')).toBe(true);
  });
  test('of many in one mapping, too, the rest is counted', () => {
    const keys = Array.from({ length: 20_000 }, (_, i) => `q${i}: 1`).join('\n');
    const { findings } = analyseFiles(filesWith(`# written at the end\n${keys}`).files, time);
    expect(findings).toHaveLength(201);
    expect(findings[200].message).toBe('At least 800 more findings are not shown; 200 are.');
  });
  test('findings stand in the order of the text', () => {
    const { findings } = analyseFiles(
      filesWith(
        'title: Order\naggressors: []\npath: [{ via: dive, part: board.long-hole }, { capacitor: coupling, value: 2.2 nF }]\nlimits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]',
      ).files,
      time,
    );
    expect(findings.map(({ rule }) => rule)).toEqual(['droop', 'stub-resonance', 'insertion-loss', 'reserved-key']);
  });
});

describe('what does not run again', () => {
  test('a comment typed above: findings of rules are the same objects', () => {
    const before = analyseFiles(deep, time);
    const after = analyseFiles(withFile(deep, CHANNEL, `# a comment\n${textOf(deep, CHANNEL)}`), {
      ...time,
      previous: before,
    });
    expect(after.model).toBe(before.model);
    expect(after.findings[0].fixes).toBe(before.findings[0].fixes);
  });
  test('another option: the rule runs again, as from cold', () => {
    const before = analyseFiles(deep, time);
    const changed = withFile(deep, CONFIG, 'lanewright: 1\nrules: { stub-resonance: { multiple: 4 } }\n');
    const after = analyseFiles(changed, { ...time, previous: before });
    expect(after.findings[0].message).toContain('below 4 × Nyquist (20 GHz)');
    expect(after.findings.map(({ message }) => message)).toEqual(
      analyseFiles(changed, time).findings.map(({ message }) => message),
    );
  });
});

describe('whatever happens', () => {
  test('a rule that breaks is told, and the others are heard', () => {
    const analysis = analyseFiles(deep, time);
    const broken = { ...analysis, model: { ...analysis.model, transmitter: { taps: null } } } as unknown as Judged;
    const found = judge(broken).map(({ rule, message }) => `${rule}: ${message}`);
    expect(found).toEqual(
      expect.arrayContaining([
        expect.stringMatching(/^internal: The rule `tap-sum` broke/),
        expect.stringMatching(/^stub-resonance: /),
      ]),
    );
  });
  test('out of time is a finding', () => {
    const { findings, verdict } = analyse({ file: CHANNEL, files, configFile: CONFIG, today: TODAY }, undefined, {
      until: 'link',
      outOfTime: () => true,
    });
    expect(findings.map(({ rule }) => rule)).toEqual(['time-limit']);
    expect(verdict).toMatchObject({ state: 'not-computed', text: 'not computed: the time for one file was over' });
  });
  test.each(['', 'path:', 'lanewright: 1\npath: [', '- - -', '\u0000', 'limits: [{ eye: ]'])(
    'of %j there are findings or none, never an exception',
    (broken) => {
      const analysis = analyseFiles(withFile(files, CHANNEL, broken));
      expect(analysis.findings.filter(({ rule }) => rule === 'internal')).toEqual([]);
      expect(analysis.verdict.state).toBe('not-computed');
    },
  );
});

describe('parts that nobody uses', () => {
  const inBoard = (dependents: readonly FilePath[] | undefined) =>
    analyse({ file: BOARD, files, configFile: CONFIG, today: TODAY, dependents }, undefined, time).findings.map(
      ({ rule, subject, tags }) => [rule, subject, tags],
    );
  test('are named where the files that use the parts file are at hand', () => {
    expect(inBoard([CHANNEL])).toEqual([
      ['unused-part', 'long-hole', ['unnecessary']],
      ['unused-part', 'mate', ['unnecessary']],
    ]);
  });
  test('are not guessed where they are not', () => {
    expect(inBoard(undefined)).toEqual([]);
  });
});

test('rules that read a later stage are silent without it', () => {
  const findings = analyseFiles(deep, { until: 'model' as 'time' }).findings;
  expect(findings).toEqual([]);
  expect(rules.some(({ reads }) => reads === 'networks')).toBe(true);
});
