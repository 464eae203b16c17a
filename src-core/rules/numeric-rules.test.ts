import { describe, expect, test } from 'vitest';
import { analyseFiles, expectFindings, filesWith } from './testing';
import { type Sweep, throughFile } from './testing-base';

const models = new Map(
  [
    ['gain-1.0009.s4p', { gain: 1.0009 }],
    ['gain-1.0012.s4p', { gain: 1.0012 }],
    ['back-0.9795.s4p', { backwardGain: 0.9795 }],
    ['back-0.9785.s4p', { backwardGain: 0.9785 }],
    ['to-30.s4p', { toHz: 30e9 }],
    ['to-18.s4p', { toHz: 18e9 }],
  ].map(([file, sweep]) => [file as string, { kind: 'text', text: throughFile(sweep as Sweep) } as const]),
);

/** How many findings of a rule an example has. */
const count = (rule: string, example: string, until: 'time' | 'link' = 'time') =>
  analyseFiles(new Map([...filesWith(example).files, ...models]), { until }).findings.filter(
    (finding) => finding.rule === rule,
  ).length;

const run = (more: string) =>
  `path: [{ trace: run, stackup: board.main, layer: L3, length: 100 mm, impedance: 100 ohm${more} }]`;
const chip = (ohms: string) =>
  `path: [{ package: chip, length: 2 mm, impedance: ${ohms}, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }]`;

const mate = (file: string) =>
  `path: [{ connector: mate, touchstone: ${file}, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]`;
const wide = (tolerance: string) =>
  run('').replace('impedance: 100 ohm', `width: 180 um, gap: 250 um, impedance: 100 ohm ± ${tolerance}`);

describe.each([
  [
    'implausible-quantity',
    'conditions: { temperature: 160 degC }',
    'conditions: { temperature: 160.1 degC }',
    'up to 160 degC',
  ],
  ['impedance-target', wide('12.3 ohm'), wide('12.2 ohm'), 'the geometry gives 87.76 ohm'],
  ['passivity', mate('gain-1.0009.s4p'), mate('gain-1.0012.s4p'), 'a singular value of 1.001 is rounding'],
  ['reciprocity', mate('back-0.9795.s4p'), mate('back-0.9785.s4p'), 'a difference of 0.001 is rounding'],
  ['data-range', mate('to-30.s4p'), mate('to-18.s4p'), 'cursors may be off by 0.1 %'],
  ['impedance-step', chip('80 ohm'), chip('79.99 ohm'), '100 over 80 is 1.25'],
  ['impedance-step', chip('82 ohm +2/-2 ohm'), chip('82 ohm ± 2.1 ohm'), 'the lower end of the tolerance is judged'],
  ['skew', run(', skew: 20 ps'), run(', skew: 20.01 ps'), 'a fifth of 100 ps'],
  ['skew', run(', skew: -20 ps'), run(', skew: -20.01 ps'), 'the other leg later'],
  // run 4 ns, 100 ohm: t/(R C) = -ln(0.99) at 3.97997 nF
  [
    'droop',
    'path: [{ capacitor: coupling, value: 3.981 nF }]',
    'path: [{ capacitor: coupling, value: 3.979 nF }]',
    '40 bits of 100 ps',
  ],
  [
    'droop',
    'path: [{ capacitor: coupling, value: 4.4 nF ± 9% }]',
    'path: [{ capacitor: coupling, value: 4.4 nF ± 10% }]',
    'the lower end is judged',
  ],
  [
    'tap-sum',
    'transmitter: { swing: 800 mV, ffe: { pre: [-0.1], main: 0.7, post: [-0.2] } }',
    'transmitter: { swing: 800 mV, ffe: { pre: [-0.1], main: 0.7001, post: [-0.2] } }',
    'sum of magnitudes',
  ],
  [
    'budget',
    chip('100 ohm').replace(' }', ', budget: 0.1 dB @ nyquist }'),
    chip('100 ohm').replace(' }', ', budget: 0.0999 dB @ nyquist }'),
    '2 mm of 0.05 dB/mm',
  ],
  [
    'budget',
    `owners: { us: 0.45 dB @ nyquist }\n${chip('100 ohm').replace(' }', ', owner: us }, { connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 0.35 dB @ 5 GHz, owner: us }')}`,
    `owners: { us: 0.4499 dB @ nyquist }\n${chip('100 ohm').replace(' }', ', owner: us }, { connector: mate, delay: 50 ps, impedance: 100 ohm, loss: 0.35 dB @ 5 GHz, owner: us }')}`,
    'both together',
  ],
])('%s', (rule, met, missed, why) => {
  test(`just met: ${why}`, () => expect(count(rule, met)).toBe(0));
  test(`just missed: ${why}`, () => expect(count(rule, missed)).toBe(1));
});

/** A figure of the base, and limits a hair to either side of it. */
const base = analyseFiles(filesWith('').files);
const outcome = (kind: string) => base.limits.find((limit) => limit.kind === kind)!;

describe('limits on what was computed', () => {
  test.each([
    ['return-loss', -1e-6, 0],
    ['return-loss', 1e-6, 1],
  ] as const)('%s wanted at %d dB from what there is: %d findings', (rule, above, findings) => {
    const wanted = (outcome(rule).actual.value + above).toFixed(9);
    expect(count(rule, `limits: [{ return-loss: match, band: 50 MHz to 5 GHz, min: ${wanted} dB }]`)).toBe(findings);
  });
  test.each([
    ['height', -1e-6, 0],
    ['height', 1e-6, 1],
    ['width', -1e-6, 0],
    ['width', 1e-6, 1],
  ] as const)('eye %s wanted at %d from what there is: %d findings', (side, above, findings) => {
    const { eyeHeightVolts, eyeWidthUi } = base.link!;
    const wanted =
      side === 'height'
        ? `height: ${(1e3 * (eyeHeightVolts + above)).toFixed(9)} mV`
        : `width: ${(eyeWidthUi + above).toFixed(9)} UI`;
    expect(count('eye', `limits: [{ eye: main, ${wanted} }]`, 'link')).toBe(findings);
  });
});

test('a band beyond the grid is judged at just its frequencies', () => {
  const { limits, findings, networks } = analyseFiles(
    filesWith('limits: [{ return-loss: match, band: 300 GHz to 500 GHz, min: 60 dB }]').files,
    { until: 'time' },
  );
  const grid = networks!.grid;
  expect(grid.stepHz * (grid.points - 1)).toBeLessThan(300e9);
  expect(limits.find(({ name }) => name === 'match')?.atHz).toBeGreaterThanOrEqual(300e9);
  expect(findings.map(({ rule }) => rule)).toContain('return-loss');
});
test('a swing that cannot be read is one finding, not also a missing one', () => {
  for (const swing of ['800', '1e-30 mV', '8 ohm']) {
    const { findings } = analyseFiles(filesWith(`transmitter: { swing: ${swing} }`).files);
    expect(findings.map(({ rule }) => rule)).toEqual(['quantity']);
  }
});
test('an impedance step shows both ends of the tolerance and names the neighbour', () => {
  expectFindings(`
    path:
      - { package: chip, length: 2 mm, impedance: 85 ohm, delay: 6.5 ps/mm, loss: 0.05 dB/mm @ 5 GHz }
      - { trace: breakout, stackup: board.main, layer: L1, length: 10 mm, impedance: 100 ohm ± 8% }
      #                                                                              ^^^^^^^^^^^^ warning impedance-step: \`breakout\` (92 to 108 ohm) differs from \`chip\` (85 ohm) by up to 27.1 %, more than 25 %.
  `);
});
test('the eye that fails is marked at the size that fails it', () => {
  expectFindings(
    `
    limits:
      - { eye: main, height: 40 mV, width: 0.99 UI }
      #                                    ^^^^^^^ error eye: 0.99 UI is wanted
  `,
    'link',
  );
});
test.each([
  ['receiver: { noise: 1 mV }', 0],
  ['receiver: { noise: 1 mV, dfe: { taps: 3, limit: 0.5 } }', 3],
])('the eye that fails tells the largest cursor that is left: %s', (receiver, taken) => {
  const { findings, link } = analyseFiles(
    filesWith(`${receiver}\nlimits: [{ eye: main, height: 40 mV, width: 0.99 UI }]`).files,
  );
  const { pulse, mainIndex, samplesPerUi } = link!;
  const uis = Array.from({ length: 60 }, (_, i) => i - 20).filter((ui) => ui < 0 || ui > taken);
  const shares = uis.map((ui) => (pulse[mainIndex + ui * samplesPerUi] ?? 0) / pulse[mainIndex]);
  const most = shares.reduce((at, share, i) => (Math.abs(share) > Math.abs(shares[at]) ? i : at), 0);
  const said = findings.find(({ rule }) => rule === 'eye')?.related?.[0].message ?? '';
  const [, share, ui, side] = /is (-?[\d.]+) % of the main one, (\d+) UI (before|after) it/.exec(said) ?? [];
  expect(Number(share)).toBeCloseTo(100 * shares[most], 1);
  expect(side === 'after' ? Number(ui) : -Number(ui)).toBe(uis[most]);
});
