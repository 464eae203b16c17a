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

/** What a failing limit points to. */
const blamed = (path: string, max = 3) => {
  const { findings } = analyse(`path: [${path}]\nlimits: [{ insertion-loss: whole, max: ${max} dB @ nyquist }]`);
  return findings.find(({ rule }) => rule === 'insertion-loss')?.related?.[0]?.message;
};

test('a lossy trace is named, a harmless stub is not', () => {
  const lossy = '{ trace: run, stackup: board.main, layer: L3, length: 300 mm, impedance: 100 ohm }';
  const harmless = '{ stub: probe, length: 1 mm, impedance: 50 ohm, dk: 3.6 }';
  expect(blamed(`${lossy}, ${harmless}`)).toMatch(
    /^`run` spends [\d.]+ dB of [\d.]+ dB, more than any other element\.$/,
  );
});
test('a metre that takes nearly all is named, not a short package beside it whose loss is large for its delay', () => {
  const long = '{ trace: run, stackup: board.main, layer: L3, length: 1 m, impedance: 100 ohm }';
  const short = '{ package: chip, length: 2 mm, impedance: 100 ohm, delay: 6.5 ps/mm, loss: 0.25 dB/mm @ 5 GHz }';
  expect(blamed(`${short}, ${long}`)).toContain('`run` spends');
});
test.each([
  [3, 12, /^`run` spends 11\.4 dB of /],
  [7, 20, /^`probe` spends .*; a stub needs almost none\.$/],
])('beside 11 dB of trace, a stub of %d mm and a limit of %d dB: %s', (millimeters, max, words) => {
  const long = '{ trace: run, stackup: board.main, layer: L3, length: 1 m, impedance: 100 ohm }';
  const stub = `{ stub: probe, length: ${millimeters} mm, impedance: 50 ohm, dk: 3.6 }`;
  expect(blamed(`${long}, ${stub}`, max)).toMatch(words);
});
test('a loss that is told as a bound alone has no difference to its limit', () => {
  const { findings } = analyse(
    'path: [{ cable: far, length: 90 m, impedance: 100 ohm, delay: 4.5 ns/m, loss: 5 dB/m @ 5 GHz }]\nlimits: [{ insertion-loss: whole, max: 12 dB @ nyquist }]',
  );
  expect(findings.find(({ rule }) => rule === 'insertion-loss')?.message).toBe(
    '`whole` loses above 120 dB at 5 GHz, far more than the 12 dB of its limit.',
  );
});
test('a stub that takes the signal away is named', () => {
  expect(
    blamed('{ capacitor: coupling, value: 100 nF }, { stub: probe, length: 7.5 mm, impedance: 50 ohm, dk: 3.6 }'),
  ).toMatch(/^`probe` spends .*; a stub needs almost none\.$/);
});
test('an element of an owner is held against its part of the owner’s budget', () => {
  const chip =
    '{ package: chip, length: 40 mm, impedance: 100 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz, owner: us }';
  const { findings } = analyse(
    `owners: { us: 1 dB @ nyquist }\npath: [${chip}]\nlimits: [{ insertion-loss: whole, max: 3 dB @ nyquist }]`,
  );
  const related = findings.find(({ rule }) => rule === 'insertion-loss')?.related?.[0];
  expect(related?.message).toBe('`chip` spends 2 dB of 3.82 dB, 1 dB over the budget of `us`.');
});
test('an element with a budget is held against that', () => {
  const run =
    '{ trace: run, stackup: board.main, layer: L3, length: 300 mm, impedance: 100 ohm, budget: 4 dB @ nyquist }';
  const mate = '{ connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 1 dB @ 5 GHz, budget: 0.4 dB @ nyquist }';
  expect(blamed(`${run}, ${mate}`)).toMatch(/^`mate` spends 1 dB of [\d.]+ dB, 0\.6 dB over its budget\.$/);
});
