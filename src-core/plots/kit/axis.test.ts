import fc from 'fast-check';
import { expect, test } from 'vitest';
import { layAxis, prefixFor, usableDomain } from './axis';
import { textWidth } from './svg';

const lay = (domain: [number, number], unit = 'Hz', length = 400) =>
  layAxis({ label: 'Frequency', unit, domain }, undefined, [50, 50 + length], {
    direction: 'horizontal',
    fontSize: 11,
  });

test('an axis takes the prefix of its largest value', () => {
  expect(prefixFor('Hz', 12.9e9)).toEqual({ unit: 'GHz', size: 1e9 });
  expect(prefixFor('V', 0.35)).toEqual({ unit: 'mV', size: 1e-3 });
  expect(prefixFor('s', 5.67e-9)).toEqual({ unit: 'ns', size: 1e-9 });
  expect(prefixFor('dB', 40)).toEqual({ unit: 'dB', size: 1 });
});

test('ticks stand at round values of that prefix', () => {
  const { ticks, title } = lay([0, 25.78125e9]);
  expect(title).toBe('Frequency, GHz');
  expect(ticks.map(({ text }) => text)).toEqual(['0', '5', '10', '15', '20', '25']);
  expect(ticks[1].value).toBe(5e9);
});

test('no tick touches its neighbour, whatever the domain and width', () => {
  const magnitude = fc.double({ min: -12, max: 12, noNaN: true });
  fc.assert(
    fc.property(
      magnitude,
      fc.double({ min: -1, max: 1, noNaN: true }),
      fc.integer({ min: 60, max: 1200 }),
      (exponent, offset, length) => {
        const span = 10 ** exponent;
        const { ticks } = lay([offset * span, offset * span + span], 'Hz', length);
        for (const [i, tick] of ticks.entries()) {
          expect(tick.pixel).toBeGreaterThanOrEqual(50 - 1e-6);
          expect(tick.pixel).toBeLessThanOrEqual(50 + length + 1e-6);
          if (i === 0 || ticks.length < 3) continue;
          const halves = (textWidth(tick.text, 11) + textWidth(ticks[i - 1].text, 11)) / 2;
          expect(tick.pixel - ticks[i - 1].pixel).toBeGreaterThan(halves);
        }
      },
    ),
  );
});

test('pixels and values turn into each other', () => {
  const axis = lay([0, 25.78125e9]);
  expect(axis.fromPixel(axis.toPixel(12.9e9))).toBeCloseTo(12.9e9, 0);
});

test('a domain without width, or of no number, is made one that can be drawn', () => {
  expect(usableDomain([3, 3])).toEqual([2.7, 3.3]);
  expect(usableDomain([0, 0])).toEqual([-0.5, 0.5]);
  expect(usableDomain([Number.NaN, 1])).toEqual([0, 1]);
});
