import { describe, expect, test } from 'vitest';
import { analyseExample, analyseFiles, applyFix, expectFindings, expectFix, filesWith } from './testing';

const via = (more = '') => `path: [{ via: dive, part: board.long-hole${more} }]`;
const found = (example: string) =>
  analyseFiles(filesWith(example).files, { until: 'time' }).findings.filter(({ rule }) => rule === 'stub-resonance');

test('a deep stub is named, with its length and its frequency', () => {
  expectFindings(`
    path:
      - { via: dive, part: board.long-hole, to: L3 }
      #                                         ^^ warning stub-resonance: The 3.62 mm stub of \`dive\` cuts a notch at 8.36 GHz, below 3 × Nyquist (15 GHz).
  `);
});
test('the worst end of a tolerance is judged, and both ends are shown', () => {
  expectFindings(`
    path:
      - { via: dive, part: board.long-hole, backdrill: { bottom: 2 mm ± 0.2 mm } }
      #                                                ^^^^^^^^^^^^^^^^^^^^^^^^^ warning stub-resonance: The 2 mm (1.8 to 2.2 mm) stub of \`dive\` cuts a notch at 14.4 GHz at its longest (nominal 15.8 GHz)
  `);
});
test('a remainder without tolerance takes that of the drill rules', () => {
  expect(found(via(', backdrill: { bottom: 2.05 mm ± 0.01 mm }'))).toHaveLength(0);
  expect(found(via(', backdrill: { bottom: 2.05 mm }'))).toHaveLength(1);
});
test('the first fix leaves the least that the drill rules allow at the lower end of the tolerance', () => {
  expectFix(
    '{ via: ‸dive, part: board.long-hole }',
    '{ via: dive, part: board.long-hole, backdrill: { bottom: 0.25 mm ± 0.1 mm } }',
  );
});
test('2 mm just meets the rule, the next step just misses it', () => {
  expect(found(via(', backdrill: { bottom: 2 mm ± 0.1 mm }'))).toHaveLength(0);
  expect(found(via(', backdrill: { bottom: 2.05 mm ± 0.1 mm }'))).toHaveLength(1);
});
test('the second fix leaves the most with which the rule is met at the upper end of the tolerance', () => {
  const [, longest] = found(via())[0].fixes!;
  expect(longest.edits).toMatchObject([{ text: '{ bottom: 2 mm ± 0.1 mm }' }]);
});
test('without drill rules no depth is proposed', () => {
  const { files } = filesWith(via());
  const board = (files.get('board.parts.yaml') as { text: string }).text.replace(/drill-rules: .*\n/, '');
  const all = new Map([...files, ['board.parts.yaml', { kind: 'text', text: board } as const]]);
  const findings = analyseFiles(all, { until: 'time' }).findings;
  expect(findings.map(({ rule, fixes }) => [rule, fixes])).toEqual([['stub-resonance', []]]);
});
test('where even the least remainder is too long no depth is proposed', () => {
  const { files } = filesWith(via());
  const config = 'lanewright: 1\nrules: { stub-resonance: { multiple: 30 } }\n';
  const all = new Map([...files, ['lanewright.config.yaml', { kind: 'text', text: config } as const]]);
  const dive = analyseFiles(all, { until: 'time' }).findings.find(({ subject }) => subject === 'dive');
  expect(dive).toMatchObject({ rule: 'stub-resonance', fixes: [] });
});

describe('what the title says', () => {
  test('is what the analysis of the changed text gives', () => {
    const analysis = analyseExample(via());
    const fix = analysis.findings[0].fixes![0];
    const after = analyseFiles(applyFix(fix, analysis));
    const figure = ({ figures }: typeof analysis, name: string) => figures.find((one) => one.name === name)!;
    const title = fix.resolve!().title;
    expect(title).toContain('notch from 8.36 GHz to 90.7 GHz');
    for (const [name, words] of [
      ['insertion-loss-at-nyquist', 'loss at Nyquist'],
      ['eye-height', 'eye height'],
    ]) {
      expect(title).toContain(`${words} from ${figure(analysis, name).text} to ${figure(after, name).text}`);
    }
    expect(figure(after, 'eye-height').value).toBeGreaterThan(figure(analysis, 'eye-height').value);
    expect(after.findings).toEqual([]);
  });
  test('is short while the eye is not computed, and complete once it is, though the rule does not run again', () => {
    const { files } = filesWith(via());
    const early = analyseFiles(files, { until: 'time' });
    const late = analyseFiles(files, { until: 'link', previous: early });
    expect(late.findings[0].fixes![0]).toBe(early.findings[0].fixes![0]);
    expect(late.findings[0].fixes![0].resolve!().title).toContain('eye height from');
  });
});

describe('a declared stub', () => {
  const stub = (length: string) =>
    `path: [{ capacitor: coupling, value: 100 nF }, { stub: probe, length: ${length}, impedance: 50 ohm, dk: 3.6 }]`;
  test('is shortened until it is harmless', () => {
    const [finding] = found(stub('4 mm'));
    expect(finding).toMatchObject({ subject: 'probe', valueText: '9.88 GHz' });
    // c / (4 × 15 GHz × sqrt(3.6)) = 2.633 mm
    expect(finding.fixes![0].edits).toMatchObject([{ op: 'value', text: '2.6 mm' }]);
  });
  test.each([
    ['2.633 mm', 0],
    ['2.634 mm', 1],
  ])('of %s has %d findings: a quarter wave of 15 GHz is 2.6334 mm', (length, count) => {
    expect(found(stub(length))).toHaveLength(count);
  });
});
