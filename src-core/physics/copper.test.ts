import { expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import {
  COPPER_CONDUCTIVITY,
  conductivityAt,
  roundWireRatio,
  skinDepth,
  slabImpedance,
  surfaceResistance,
} from './copper';

checkValues({
  id: 'M-02',
  what: 'annealed copper at 20 °C: resistivity in 1e-8 ohm m, conductivity in MS/m',
  source: 'NBS Handbook 100, Copper Wire Tables, 1966: 0.15328 ohm g/m² at 8.89 g/cm³',
  relativeTolerance: 1e-3,
  compute: () => [1e8 / COPPER_CONDUCTIVITY, COPPER_CONDUCTIVITY / 1e6],
  rows: [{ expected: [1.7242, 58.0] }],
});

checkValues({
  id: 'M-03',
  what: 'copper at 85 °C: resistivity in 1e-8 ohm m, conductivity in MS/m',
  source: 'NBS Handbook 100; IEC 60028: 0.00393 per K from 20 °C',
  relativeTolerance: 1e-3,
  compute: () => [1e8 / conductivityAt(58e6, 85), conductivityAt(58e6, 85) / 1e6],
  rows: [{ expected: [2.1645, 46.2] }],
});

checkValues({
  id: 'M-04',
  what: 'skin depth at 10 GHz, µm',
  source: 'Pozar, Microwave Engineering, Example 1.2',
  relativeTolerance: 1e-4,
  compute: () => skinDepth(10e9, 5.813e7) * 1e6,
  rows: [{ expected: 0.6601 }],
});

checkValues({
  id: 'M-05',
  what: 'skin depth of copper, µm',
  source: 'exact',
  relativeTolerance: 1e-4,
  compute: ({ hz }) => skinDepth(hz, 5.8e7) * 1e6,
  rows: [
    { hz: 1e6, expected: 66.085 },
    { hz: 1e9, expected: 2.0898 },
    { hz: 10e9, expected: 0.66085 },
    { hz: 14e9, expected: 0.55852 },
  ],
});

checkValues({
  id: 'M-06',
  what: 'skin depth of aluminium and silver at 10 GHz, µm',
  source: 'Pozar, Microwave Engineering, Example 1.2',
  relativeTolerance: 1e-4,
  compute: ({ conductivity }) => skinDepth(10e9, conductivity) * 1e6,
  rows: [
    { conductivity: 3.816e7, expected: 0.8147 },
    { conductivity: 6.173e7, expected: 0.6406 },
  ],
});

checkValues({
  id: 'M-07',
  what: 'surface resistance, mohm',
  source: 'Pozar, Microwave Engineering, Example 3.7',
  relativeTolerance: 1e-4,
  compute: ({ hz, conductivity }) => surfaceResistance(hz, conductivity) * 1e3,
  rows: [
    { hz: 10e9, conductivity: 5.813e7, expected: 26.06 },
    { hz: 1e9, conductivity: 5.8e7, expected: 8.2502 },
  ],
});

checkValues({
  id: 'M-08',
  what: 'slab of 17.5 µm, mohm per square (at 1 Hz: DC resistance, and DC inductance in pH)',
  source: 'Ramo, Whinnery, Van Duzer, plane conductor of finite depth; checked by 20,000 stacked layers',
  relativeTolerance: 1e-4,
  compute: ({ hz }) => {
    const [re, im] = slabImpedance(hz, 5.8e7, 17.5e-6);
    return [re * 1e3, hz === 1 ? (im / (2 * Math.PI)) * 1e12 : im * 1e3];
  },
  rows: [
    { hz: 1, expected: [0.98522, 7.3304] },
    { hz: 10e6, expected: [1.02749, 0.45494] },
    { hz: 100e6, expected: [2.60137, 2.64525] },
    { hz: 1e9, expected: [8.25023, 8.25023] },
  ],
});

checkValues({
  id: 'M-09',
  what: 'round wire, impedance over DC resistance',
  source: 'Ramo, Whinnery, Van Duzer, round wire; checked by finite differences',
  relativeTolerance: 1e-4,
  printedWithin: 5e-5,
  compute: ({ radius }) => roundWireRatio(radius),
  rows: [
    { radius: 1, expected: [1.0205, 0.2474] },
    { radius: 2, expected: [1.2646, 0.8705] },
    { radius: 5, expected: [2.7681, 2.4767] },
  ],
});

test('a slab has its DC resistance at 0 Hz, a half-space none', () => {
  expect([...slabImpedance(0, 5.8e7, 17.5e-6)]).toEqual([1 / (5.8e7 * 17.5e-6), 0]);
  expect([...slabImpedance(0, 5.8e7, Number.POSITIVE_INFINITY)]).toEqual([0, 0]);
});

test('a slab passes from series to closed form to skin effect without a step', () => {
  for (const skinDepths of [1e-4, 0.1, 12]) {
    const hz = (skinDepths / 17.5e-6) ** 2 / (Math.PI * 4e-7 * Math.PI * 5.8e7);
    const below = slabImpedance(hz * 0.9999, 5.8e7, 17.5e-6);
    const above = slabImpedance(hz * 1.0001, 5.8e7, 17.5e-6);
    expect(above[0] / below[0]).toBeCloseTo(1, 3);
    expect(above[1] / below[1]).toBeCloseTo(1, 3);
  }
});
