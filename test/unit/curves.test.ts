import { describe, expect, test } from 'vitest';
import { analyse } from '../../src-core/analyse';
import { type Curves, curvesOf } from '../../src-core/cascade/curves';
import { inputsOf } from '../../src-core/model/fixtures';
import { checkValues } from '../check-values';

const metersPerMil = 25.4e-6;

/** The path's curves at just these frequencies, in a single-ended channel of 50 ohm unless its head says otherwise. */
function curves(
  path: string,
  frequencies: readonly number[],
  { head = 'signalling: single-ended', files = {} }: { head?: string; files?: Record<string, string> } = {},
): Curves {
  const channel = `lanewright: 1\nline-rate: 25 Gb/s\n${head}\npath:\n${path}`;
  const analysis = analyse(inputsOf({ 'lane.channel.yaml': channel, ...files }), undefined, { until: 'time' });
  expect(analysis.networks?.without).toEqual([]);
  return curvesOf(analysis, { frequencies: Float64Array.from(frequencies) });
}

/** Columns by name at the first frequency. */
function values(found: Curves, ...names: string[]): number[] {
  return names.map((name) => {
    const column = found.parts[0].columns.find((one) => one.name === name);
    if (!column) throw new Error(`${name} is none of ${found.parts[0].columns.map((one) => one.name)}`);
    return column.values[0];
  });
}

const resistor = '  - capacitor: r\n    value: 100 nF\n    esr: 50 ohm\n';
const shunt = '  - stub: s\n    touchstone: load.s1p\n    ports: { enter: [1], leave: [] }\n';
const load = { 'load.s1p': '# GHz S RI R 50\n0 0 0\n100 0 0\n' };

checkValues({
  id: 'N-01',
  what: 'series 50 ohm, then shunt 50 ohm, between 50 ohm ports: S11, S21',
  source: 'Pozar, Microwave Engineering, tables 4.1, 4.2',
  absoluteTolerance: 1e-6,
  compute: ({ path }) => values(curves(path, [1e9], { files: load }), 'S11_re', 'S21_re'),
  rows: [
    { path: resistor, expected: [1 / 3, 2 / 3] },
    { path: shunt, expected: [-1 / 3, 2 / 3] },
  ],
});

checkValues({
  id: 'N-02',
  what: 'series 1 nH then shunt 0.2 pF at 5 GHz: Re, Im S11; Re, Im S21',
  source: 'exact',
  absoluteTolerance: 1e-6,
  compute: ({ path }) => values(curves(path, [5e9]), 'S11_re', 'S11_im', 'S21_re', 'S21_im'),
  rows: [
    {
      // The branch that carries the capacitance is a nanometre long.
      path: '  - capacitor: l\n    value: 100 nF\n    esl: 1 nH\n  - stub: c\n    length: 1 nm\n    impedance: 50 ohm\n    dk: 1\n    end-capacitance: 0.2 pF\n',
      expected: [-0.014436, 0.181828, 0.871318, -0.455561],
    },
  ],
});

const stubPath = (mil: number, dk: number) =>
  `  - stub: s\n    length: ${mil * metersPerMil * 1e3} mm\n    impedance: 50 ohm\n    dk: ${dk}\n`;

checkValues({
  id: 'N-06',
  what: 'first notch of an open stub, read off its curve, GHz',
  source: 'exact: c/(4 L √er)',
  relativeTolerance: 1e-4,
  compute: ({ mil, dk, near }) => {
    const frequencies = Array.from({ length: 4001 }, (_, i) => near * 1e9 * (0.98 + i * 1e-5));
    const { parts } = curves(stubPath(mil, dk), frequencies);
    const loss = parts[0].columns.find(({ name }) => name === 'S21_dB')!.values;
    return frequencies[loss.indexOf(Math.min(...loss))] / 1e9;
  },
  rows: [
    { mil: 10, dk: 4, near: 148, expected: 147.536 },
    { mil: 20, dk: 4, near: 74, expected: 73.768 },
    { mil: 40, dk: 4, near: 37, expected: 36.884 },
    { mil: 75, dk: 4, near: 20, expected: 19.671 },
    { mil: 75, dk: 3.5, near: 21, expected: 21.03 },
    { mil: 75, dk: 4.3, near: 19, expected: 18.973 },
  ],
});

checkValues({
  id: 'N-07',
  what: 'shunt open stub of 50 ohm, 75 mil, er 4, at 10 GHz: |S21| and dB; loss at its -3.0103 dB share of the notch',
  source: 'exact: S21 = 2/(2 + j (Z0/Zs) tan θ)',
  relativeTolerance: 1e-5,
  compute: ({ hertz }) => {
    const [re, im, db] = values(curves(stubPath(75, 4), [hertz]), 'S21_re', 'S21_im', 'S21_dB');
    return hertz === 10e9 ? [Math.hypot(re, im), db] : db;
  },
  rows: [
    { hertz: 10e9, expected: [0.889646, -1.01565] },
    { hertz: (0.704833 * 299792458) / (4 * 75 * metersPerMil * 2), expected: -3.0103 },
  ],
});

checkValues({
  id: 'N-11',
  what: 'an 85 ohm section in a 100 ohm differential system at a quarter wave: reflection, return loss in dB',
  source: 'exact: (85² − 100²)/(85² + 100²)',
  relativeTolerance: 1e-5,
  compute: ({ path }) => {
    const [reflection, db] = values(
      curves(path, [2.5e9], { head: 'reference-impedance: 100 ohm' }),
      'SDD11_re',
      'SDD11_dB',
    );
    return [reflection, -db];
  },
  rows: [
    {
      path: '  - cable: c\n    length: 20 mm\n    impedance: 85 ohm\n    delay: 5 ns/m\n    loss: 0 dB/m @ 1 GHz\n',
      expected: [-0.161103, 15.858],
    },
  ],
});

checkValues({
  id: 'N-13',
  what: 'skew of 2 ps on a trace and 3 ps on a cable behind it, at 14 GHz: |Scd21|, |Sdd21| in dB; Sdd21 at 1/(2 dt)',
  source: 'derived: (e^-jωt1 ∓ e^-jωt2)/2, exact',
  absoluteTolerance: 1e-5,
  compute: ({ hertz }) => {
    const skewed = (kind: string, name: string, picoseconds: number) =>
      `  - ${kind}: ${name}\n    length: 30 mm\n    impedance: 100 ohm\n    delay: 6.5 ps/mm\n    loss: 0 dB/m @ 1 GHz\n    skew: ${picoseconds} ps\n`;
    const found = curves(skewed('trace', 'a', 2) + skewed('cable', 'b', 3), [hertz], {
      head: 'reference-impedance: 100 ohm',
    });
    const [re, im, db, ddRe] = values(found, 'SCD21_re', 'SCD21_im', 'SDD21_dB', 'SDD21_re');
    return hertz === 14e9 ? [Math.hypot(re, im), db] : ddRe;
  },
  rows: [
    { hertz: 14e9, expected: [0.218143, -0.211744] },
    { hertz: 100e9, expected: 0 },
  ],
});

describe('a lossless line in 30 unequal pieces', () => {
  const piece = (millimetres: number, i: number) =>
    `  - cable: c${i}\n    length: ${millimetres} mm\n    impedance: 85 ohm\n    delay: 5 ns/m\n    loss: 0 dB/m @ 1 GHz\n`;
  test('equals the whole to 1e-9, at any frequencies', () => {
    const lengths = Array.from({ length: 30 }, (_, i) => 1 + ((7 * i) % 11));
    const frequencies = Array.from({ length: 501 }, (_, i) => i * 0.1e9);
    const head = 'reference-impedance: 100 ohm';
    const pieces = curves(lengths.map(piece).join(''), frequencies, { head }).parts[0].columns;
    const whole = curves(piece(lengths.reduce((a, b) => a + b), 0), frequencies, { head }).parts[0].columns; // biome-ignore format: a sum
    for (const { name, values: numbers } of whole.filter((column) => !column.name.endsWith('dB'))) {
      const other = pieces.find((column) => column.name === name)!.values;
      numbers.forEach((value, i) => {
        if (Math.abs(value - other[i]) > 1e-9) expect.fail(`${name} at ${frequencies[i]} Hz: ${value} and ${other[i]}`);
      });
    }
  });
});

test('each element for itself, by its name; a piece between two', () => {
  const channel = `lanewright: 1\nline-rate: 25 Gb/s\nsignalling: single-ended\npath:\n${resistor}${stubPath(75, 4)}`;
  const analysis = analyse(inputsOf({ 'lane.channel.yaml': channel }), undefined, { until: 'time' });
  expect(curvesOf(analysis, { elements: true }).parts.map(({ name }) => name)).toEqual(['r', 's']);
  expect(curvesOf(analysis).parts.map(({ name }) => name)).toEqual(['r to s']);
  expect(curvesOf(analysis, { between: [1, 1] }).parts[0].network).toEqual(analysis.cascade!.between(1, 1));
});
