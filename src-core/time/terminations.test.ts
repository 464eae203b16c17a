import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { transfer } from './terminations';
import { gridFor, matchedPath } from './testing';

const through = (grid = gridFor(1e9)) => matchedPath(grid, () => [1, 0]);
const end = (ohms: number, farads = 0) => ({ ohms, farads });

checkValues({
  id: 'S-11',
  what: 'An ideal through between equal terminations off the reference',
  source: 'IEEE 802.3 Annex 93A, form of H21',
  absoluteTolerance: 1e-9,
  compute: () => {
    const grid = gridFor(1e9);
    const ends = { source: end(55), load: end(55), referenceOhms: 50 };
    return [transfer(through(), grid.frequencies, ends, ends)[0]];
  },
  rows: [{ expected: 1 }],
});

test('capacitance at both ends of a through is one RC', () => {
  const grid = gridFor(25e9);
  const ends = { source: end(90, 0.1e-12), load: end(110, 0.2e-12), referenceOhms: 100 };
  const H = transfer(through(grid), grid.frequencies, ends, ends);
  for (let i = 0; i < grid.points; i += 37) {
    // divider of 90 and 110 ohm, twice since a matched load halves; then 1/(1 + jω (90 ∥ 110) 0.3 pF)
    const x = 2 * Math.PI * grid.frequencies[i] * ((90 * 110) / 200) * 0.3e-12;
    const level = (2 * 110) / 200 / (1 + x * x);
    expect(H[2 * i]).toBeCloseTo(level, 12);
    expect(H[2 * i + 1]).toBeCloseTo(-level * x, 12);
  }
});

test('four ports without conversion give what the differential two-port gives', () => {
  const grid = gridFor(25e9);
  const line = 75 / 100;
  const differential = new Float64Array(8 * grid.points);
  const full = new Float64Array(32 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    // lossless line of 75 ohm in 100 ohm, 60 ps: S11 = j sin (z² - 1) / D, S21 = 2 z / D, D = 2 z cos + j (z² + 1) sin
    const theta = 2 * Math.PI * grid.frequencies[i] * 60e-12;
    const [c, s] = [2 * line * Math.cos(theta), (line * line + 1) * Math.sin(theta)];
    const scale = 1 / (c * c + s * s);
    const top = (line * line - 1) * Math.sin(theta);
    const s11 = [top * s * scale, top * c * scale];
    const s21 = [2 * line * c * scale, -2 * line * s * scale];
    differential.set([...s11, ...s21, ...s21, ...s11], 8 * i);
    const at = (r: number, k: number, value: number[]) => full.set(value, 32 * i + 8 * r + 2 * k);
    at(0, 0, s11);
    at(2, 2, s11);
    at(0, 2, s21);
    at(2, 0, s21);
    // the common mode: something else altogether
    at(1, 3, [0.5, -0.3]);
    at(3, 1, [0.5, -0.3]);
    at(1, 1, [0.2, 0.1]);
  }
  const ends = { source: end(85, 0.12e-12), load: end(115, 0.15e-12), referenceOhms: 100 };
  const common = { source: end(20, 0.48e-12), load: end(30), referenceOhms: 25 };
  const two = transfer({ differential }, grid.frequencies, ends, common);
  const four = transfer({ differential, full }, grid.frequencies, ends, common);
  for (let i = 0; i < two.length; i++) expect(four[i]).toBeCloseTo(two[i], 12);
});

test('a mode that converts there and back adds by way of its own terminations', () => {
  const grid = gridFor(25e9);
  const full = new Float64Array(32 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    const at = (r: number, k: number, re: number) => full.set([re, 0], 32 * i + 8 * r + 2 * k);
    at(2, 0, 0.8); // straight on
    at(3, 0, 0.3); // differential into common at the receiver
    at(2, 3, 0.1); // what returns from the common load into differential
  }
  const ends = { source: end(100), load: end(100), referenceOhms: 100 };
  const common = { source: end(25), load: end(75), referenceOhms: 25 };
  const H = transfer({ differential: new Float64Array(8 * grid.points), full }, grid.frequencies, ends, common);
  // the common load of 75 ohm in 25 reflects a half
  expect(H[0]).toBeCloseTo(0.8 + 0.3 * 0.5 * 0.1, 12);
});
