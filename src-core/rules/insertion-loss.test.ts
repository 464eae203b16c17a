import { expect, test } from 'vitest';
import { analyseFiles, expectFindings, filesWith } from './testing';

const analyse = (example: string) => analyseFiles(filesWith(example).files, { until: 'time' });
const loss = () => analyse('').figures.find(({ name }) => name === 'insertion-loss-at-nyquist')!.value;

test('the value of the limit is marked', () => {
  expectFindings(`
    limits:
      - { insertion-loss: whole, max: 1 dB @ nyquist }
      #                               ^^^^^^^^^^^^^^ error insertion-loss: \`whole\` loses 2.32 dB at 5 GHz, 1.32 dB more than the 1 dB of its limit.
  `);
});
test.each([
  [1e-6, 0, 'just meets'],
  [-1e-6, 1, 'just misses'],
])('a limit %d dB above the loss: %d findings, it %s', (above, count) => {
  expect(
    analyse(`limits: [{ insertion-loss: whole, max: ${(loss() + above).toFixed(9)} dB @ nyquist }]`).findings,
  ).toHaveLength(count);
});
test('against a mask the point with the least in hand is told', () => {
  const { findings } = analyse('limits: [{ insertion-loss: whole, max: [3 dB @ 1 GHz, 1 dB @ 4 GHz, 9 dB @ 10 GHz] }]');
  expect(findings).toMatchObject([{ rule: 'insertion-loss', subject: 'whole' }]);
  expect(findings[0].message).toContain('at 4 GHz');
  expect(findings[0].message).toContain('of its mask');
});
test.each(['7.013 GHz', '150 GHz'])(
  'at %s, between or beyond the points of the grid, the loss is computed at just that frequency',
  (frequency) => {
    // 10 mm of 0.05 dB/mm at 5 GHz, half of it as the root, half of it linear in frequency
    const ratio = Number.parseFloat(frequency) / 5;
    const exact = 0.5 * (Math.sqrt(ratio) + ratio) * 0.5;
    const limit = (allowed: number) =>
      `limits: [{ insertion-loss: part, between: [chip, chip], max: ${allowed.toFixed(9)} dB @ ${frequency} }]`;
    expect(analyse(limit(exact * 1.001)).findings.filter(({ rule }) => rule === 'insertion-loss')).toHaveLength(0);
    expect(analyse(limit(exact * 0.999)).findings.filter(({ rule }) => rule === 'insertion-loss')).toHaveLength(1);
  },
);
test('between two elements only what they hold is judged', () => {
  expect(analyse('limits: [{ insertion-loss: part, between: [chip, chip], max: 0.51 dB @ nyquist }]').findings).toEqual(
    [],
  );
  expect(
    analyse('limits: [{ insertion-loss: part, between: [chip, chip], max: 0.49 dB @ nyquist }]').findings,
  ).toHaveLength(1);
});

/** The element that a failing limit of 3 dB points to. */
const blamed = (path: string) => {
  const { findings } = analyse(`path: [${path}]\nlimits: [{ insertion-loss: whole, max: 3 dB @ nyquist }]`);
  return findings.find(({ rule }) => rule === 'insertion-loss')?.related?.[0]?.message;
};

test('a lossy trace is named, a harmless stub is not', () => {
  const lossy = '{ trace: run, stackup: board.main, layer: L3, length: 300 mm, impedance: 100 ohm }';
  const harmless = '{ stub: probe, length: 1 mm, impedance: 50 ohm, dk: 3.6 }';
  expect(blamed(`${lossy}, ${harmless}`)).toContain('`run` spends the most over its share');
});
test('a stub that takes the signal away is named', () => {
  expect(
    blamed('{ capacitor: coupling, value: 100 nF }, { stub: probe, length: 7.5 mm, impedance: 50 ohm, dk: 3.6 }'),
  ).toContain('`probe` spends the most');
});
test('an element of an owner is held against its part of the owner’s budget', () => {
  const chip =
    '{ package: chip, length: 40 mm, impedance: 100 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz, owner: us }';
  const { findings } = analyse(
    `owners: { us: 1 dB @ nyquist }\npath: [${chip}]\nlimits: [{ insertion-loss: whole, max: 3 dB @ nyquist }]`,
  );
  const related = findings.find(({ rule }) => rule === 'insertion-loss')?.related?.[0];
  expect(related?.message).toBe('`chip` spends the most over its share: 2 dB, 1 dB over the budget of `us`.');
});
test('an element with a budget is held against that', () => {
  const run =
    '{ trace: run, stackup: board.main, layer: L3, length: 300 mm, impedance: 100 ohm, budget: 4 dB @ nyquist }';
  const mate = '{ connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 1 dB @ 5 GHz, budget: 0.4 dB @ nyquist }';
  expect(blamed(`${run}, ${mate}`)).toContain('`mate` spends the most over its share: 1 dB, 0.6 dB over its budget.');
});
