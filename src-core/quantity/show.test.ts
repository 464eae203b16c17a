import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Dimension } from '../../schemas/format/types';
import { readQuantity } from './read';
import { count, exactly, show } from './show';

test.each<[string, string]>([
  [show.frequency(12.890625e9), '12.9 GHz'],
  [show.length(0.85e-3), '0.85 mm'],
  [show.length(35e-6), '35 um'],
  [show.length(110e-6), '110 um'],
  [show.length(0.168), '168 mm'],
  [show.length(0), '0 mm'],
  [show.loss(18.213), '18.2 dB'],
  [show.loss(-0.5), '-0.5 dB'],
  [show.loss(-0.0001), '0 dB'],
  [show.loss(200), 'above 120 dB'],
  [show.returnLoss(59.94), '59.9 dB'],
  [show.returnLoss(200), 'above 60 dB'],
  [show.impedance(97.26), '97.3 ohm'],
  [show.impedance(0.02), '20 mohm'],
  [show.voltage(0.06123), '61.2 mV'],
  [show.unitIntervals(0.4801), '0.48 UI'],
  [show.time(7.31e-12), '7.31 ps'],
  [show.time(0.25e-12), '0.25 ps'],
  [show.time(999.9e-12), '1 ns'],
  [show.capacitance(100e-9), '100 nF'],
  [show.capacitance(120e-15), '120 fF'],
  [show.inductance(0.3e-9), '0.3 nH'],
  [show.lossPerLength(110), '0.11 dB/mm'],
  [show.lossPerLength(5.1), '5.1 dB/m'],
  [show.delayPerLength(6.9e-9), '6.9 ps/mm'],
  [show.velocity(2e8), '0.667 c'],
  [show.bitRate(25.78125e9), '25.8 Gb/s'],
  [show.conductivity(58e6), '58 MS/m'],
  [show.temperature(60), '60 degC'],
  [show.ratio(3.3666), '3.37'],
  [show.ratio(12345678), '1.23e7'],
  [show.percent(0.084), '8.4 %'],
  [show.probability(1e-12), '1e-12'],
  [show.rangeOf(0.9e-3, 1.1e-3, 'length'), '0.9 to 1.1 mm'],
  [show.rangeOf(1e-3, 1e-3, 'length'), '1 mm'],
  [show.rangeOf(0, 1e-12, 'time'), '0 to 1 ps'],
  [count(1, 'resonance'), '1 resonance'],
  [count([], 'resonance'), '0 resonances'],
  [exactly(12.890625e9, 'frequency'), '12.890625 GHz'],
  [exactly(0.3e-3, 'length'), '0.3 mm'],
])('%s', (shown, expected) => {
  expect(shown).toBe(expected);
});

test('a tolerance is shown beside its value', () => {
  const { quantity } = readQuantity('0.2 mm +0.1/-0.05 mm', { dimensions: ['length'] });
  expect(show.quantity(quantity!)).toBe('0.2 mm +100 um/-50 um');
  expect(show.quantity(readQuantity('168 mm ± 2 mm', { dimensions: ['length'] }).quantity!)).toBe('168 mm ± 2 mm');
});

test.each([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY])('%s is shown as unknown', (value) => {
  const { count: _count, quantity: _quantity, rangeOf, dimension, ...formatters } = show;
  for (const format of Object.values(formatters)) expect(format(value)).toBe('unknown');
  expect(rangeOf(0, value, 'length')).toBe('unknown');
  expect(dimension(value, 'time')).toBe('unknown');
});

/** Sizes that occur, in SI units; beyond three digits nothing is promised. */
const sizes: [Dimension, number, number][] = [
  ['length', 1e-9, 1e3],
  ['time', 1e-15, 1e-6],
  ['frequency', 1, 1e13],
  ['impedance', 1e-3, 1e5],
  ['capacitance', 1e-15, 1e-4],
  ['inductance', 1e-12, 1e-4],
  ['voltage', 1e-6, 100],
  ['lossPerLength', 1e-2, 1e5],
  ['delayPerLength', 1e-9, 1e-7],
  ['velocity', 1e5, 3e8],
  ['bitRate', 1, 1e13],
  ['conductivity', 1, 1e9],
];

test.each(sizes)(
  'a %s that was shown reads back within three digits; one written exactly within twelve',
  (dimension, low, high) => {
    const spec = { dimensions: [dimension] };
    fc.assert(
      fc.property(
        fc.double({ min: Math.log(low), max: Math.log(high), noNaN: true }),
        fc.boolean(),
        (logarithm, negative) => {
          const value = (negative ? -1 : 1) * Math.exp(logarithm);
          const shown = readQuantity(show.dimension(value, dimension), spec).quantity;
          expect(Math.abs(shown!.value / value - 1)).toBeLessThanOrEqual(0.00501); // half of the third digit of 1.00
          const exact = readQuantity(exactly(value, dimension), spec).quantity;
          expect(Math.abs(exact!.value / value - 1)).toBeLessThanOrEqual(1e-11);
        },
      ),
      { seed: 5 },
    );
  },
);
