import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import type { Network } from '../networks/types';
import { stepResponse, tdr } from './tdr';
import { gridFor } from './testing';

const grid = gridFor(100e9, 9, 2);

/** A network of an element between lines of 50 ohm, from its reflection and transmission. */
function network(at: (frequencyHz: number) => { s11: [number, number]; s21: [number, number] }): Network {
  const differential = new Float64Array(8 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    const { s11, s21 } = at(grid.frequencies[i]);
    differential.set([...s11, ...s21, ...s21, ...s11], 8 * i);
  }
  return { differential };
}

const seriesInductor = (henries: number) => (f: number) => {
  // s11 = x/(2 + x), s21 = 2/(2 + x), x = jωL/50
  const x = (2 * Math.PI * f * henries) / 50;
  const scale = 1 / (4 + x * x);
  return {
    s11: [x * x * scale, 2 * x * scale] as [number, number],
    s21: [4 * scale, -2 * x * scale] as [number, number],
  };
};

const shuntCapacitor = (farads: number) => (f: number) => {
  // s11 = -y/(2 + y), s21 = 2/(2 + y), y = jωC 50
  const y = 2 * Math.PI * f * farads * 50;
  const scale = 1 / (4 + y * y);
  return {
    s11: [-y * y * scale, -2 * y * scale] as [number, number],
    s21: [4 * scale, -2 * y * scale] as [number, number],
  };
};

/** A lossless line of other impedance, one way 100 ps. */
const section = (ohms: number) => (f: number) => {
  const z = ohms / 50;
  const theta = 2 * Math.PI * f * 100e-12;
  const [c, s] = [2 * z * Math.cos(theta), (z * z + 1) * Math.sin(theta)];
  const scale = 1 / (c * c + s * s);
  const top = (z * z - 1) * Math.sin(theta);
  return {
    s11: [top * s * scale, top * c * scale] as [number, number],
    s21: [2 * z * c * scale, -2 * z * s * scale] as [number, number],
  };
};

/** Reflected step for a straight ramp of 20 ps that begins at 0. */
function reflectedRamp({ differential }: Network): Float64Array {
  const spectrum = new Float64Array(2 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    const x = Math.PI * grid.frequencies[i] * 20e-12;
    const size = x === 0 ? 1 : Math.sin(x) / x;
    const [re, im] = [differential[8 * i], differential[8 * i + 1]];
    spectrum[2 * i] = size * (re * Math.cos(x) + im * Math.sin(x));
    spectrum[2 * i + 1] = size * (im * Math.cos(x) - re * Math.sin(x));
  }
  return stepResponse(spectrum, grid.stepHz, 8 * (grid.points - 1), 5e-12);
}

const peak = (values: Float64Array) => values.reduce((a, b) => (Math.abs(b) > Math.abs(a) ? b : a));

checkValues({
  id: 'D-02',
  what: 'Reflected peak of 1 nH in 50 ohm for a 20 ps ramp',
  source: 'exact, (tau/tr)(1 - exp(-tr/tau))',
  relativeTolerance: 0.01,
  compute: () => peak(reflectedRamp(network(seriesInductor(1e-9)))),
  rows: [{ expected: 0.432332 }],
});

checkValues({
  id: 'D-03',
  what: 'Reflected peak of 0.2 pF in 50 ohm for a 20 ps ramp',
  source: 'exact, as D-02 with the sign turned',
  relativeTolerance: 0.01,
  compute: () => peak(reflectedRamp(network(shuntCapacitor(0.2e-12)))),
  rows: [{ expected: -0.245421 }],
});

checkValues({
  id: 'D-06',
  what: 'TDR of 50 ohm, a 75 ohm section, 50 ohm: impedance on the section and after the second step',
  source: 'exact, bounce diagram: reflection 0.2, then 0.008',
  relativeTolerance: 1e-3,
  compute: () => {
    const { transmitter, sampleSeconds } = tdr(network(section(75)), grid, 50, 10e-12);
    const at = (seconds: number) => transmitter[Math.round(seconds / sampleSeconds)];
    return [at(100e-12), at(300e-12)];
  },
  rows: [{ expected: [75, 50.806] }],
});

checkValues({
  id: 'D-01',
  what: 'Impedance shown by a section of 42.5 ohm after 50, and by its reflection',
  source: 'exact',
  relativeTolerance: 1e-3,
  compute: () => {
    const { receiver, sampleSeconds } = tdr(network(section(42.5)), grid, 50, 10e-12);
    const ohms = receiver[Math.round(100e-12 / sampleSeconds)];
    return [ohms, (ohms - 50) / (ohms + 50)];
  },
  rows: [{ expected: [42.5, -0.081081] }],
});

test('before the step there is the reference, and an overshoot below a tenth of a percent', () => {
  const { transmitter, sampleSeconds } = tdr(network(section(75)), grid, 50, 1e-12);
  const flat = transmitter.subarray(Math.round(60e-12 / sampleSeconds), Math.round(140e-12 / sampleSeconds));
  for (const ohms of flat) expect(Math.abs(ohms - 75)).toBeLessThan(0.1);
});
