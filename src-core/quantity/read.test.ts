import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Dimension, QuantitySpec } from '../../schemas/format/types';
import { unitTable } from '../../schemas/format/units';
import { quantityExample, readQuantity } from './read';
import { readBand } from './read-band';

const length: QuantitySpec = { dimensions: ['length'], valid: [0, 1e6], plausible: [1e-6, 10] };
const loss: QuantitySpec = { dimensions: ['loss'], at: 'nyquist' };
const lossPerLength: QuantitySpec = { dimensions: ['lossPerLength'], at: 'required', list: true };
const impedance: QuantitySpec = { dimensions: ['impedance'], valid: [1e-9, 1e9], plausible: [10, 300] };
const ratio: QuantitySpec = { dimensions: ['ratio'], at: 'optional', valid: [1, 100], plausible: [1, 15] };
const width: QuantitySpec = { dimensions: ['unitInterval', 'time'], tolerance: false };
const rate: QuantitySpec = { dimensions: ['bitRate'], tolerance: false };
const any = (dimension: Dimension): QuantitySpec => ({ dimensions: [dimension], at: 'optional' });

test.each<[string, QuantitySpec, object]>([
  ['42 mm', length, { value: 0.042, plus: 0, minus: 0, threeSigma: false, unit: 'mm', text: '42 mm' }],
  ['4.5 mil', length, { value: 0.1143e-3 }],
  ['4.5mil', length, { value: 0.1143e-3 }],
  ['1 in', length, { value: 0.0254 }],
  ['0.11 mm', length, { value: 110e-6 }],
  ['110 um', length, { value: 110e-6 }],
  ['110 µm', length, { value: 110e-6, unit: 'um' }],
  ['110 μm', length, { value: 110e-6, unit: 'um' }],
  ['.5mm', length, { value: 0.5e-3 }],
  ['4.2e1 mm', length, { value: 0.042 }],
  ['  42   mm  ', length, { value: 0.042, text: '42   mm' }],
  ['100 ohm ± 8%', impedance, { value: 100, plus: 8, minus: 8 }],
  ['100 Ω ± 8 %', impedance, { value: 100, plus: 8, minus: 8 }],
  ['100 ohm±8%', impedance, { value: 100, plus: 8, minus: 8 }],
  ['110 um +/- 12 um', length, { value: 110e-6, plus: 12e-6, minus: 12e-6 }],
  ['110 um ± 12', length, { plus: 12e-6, minus: 12e-6 }],
  ['0.2 mm ± 12 um', length, { value: 0.2e-3, plus: 12e-6 }],
  ['0.2 mm +0.1/-0.05 mm', length, { value: 0.2e-3, plus: 0.1e-3, minus: 0.05e-3 }],
  ['0.2 mm -0.05/+0.1 mm', length, { plus: 0.1e-3, minus: 0.05e-3 }],
  ['0.2 mm +0.1 mm/-50 um', length, { plus: 0.1e-3, minus: 50e-6 }],
  ['0.2 mm +0.1 / -0.05', length, { plus: 0.1e-3, minus: 0.05e-3 }],
  ['100 ohm ± 8% (3 sigma)', impedance, { plus: 8, threeSigma: true }],
  ['0.85 dB/in @ 12.9 GHz', lossPerLength, { value: 0.85 / 0.0254, at: 12.9e9 }],
  ['0.85dB/in@12.9GHz', lossPerLength, { at: 12.9e9 }],
  ['0.11 dB/mm ± 5% @ 12.9 GHz', lossPerLength, { value: 110, plus: 5.5, at: 12.9e9 }],
  ['24 dB @ nyquist', loss, { value: 24, at: 'nyquist' }],
  ['24 dB', loss, { value: 24 }],
  ['-6 dB', loss, { value: -6 }],
  ['−6 dB', loss, { value: -6 }],
  ['3.6 @ 10 GHz', ratio, { value: 3.6, unit: '', dimension: 'ratio', at: 10e9 }],
  ['0.35 UI', width, { value: 0.35, dimension: 'unitInterval' }],
  ['3 ps', width, { value: 3e-12, dimension: 'time' }],
  ['25.78125 Gb/s', rate, { value: 25.78125e9 }],
  ['60 degC', any('temperature'), { value: 60 }],
  ['0.68 c', any('velocity'), { value: 0.68 * 299792458 }],
  ['6.9 ps/mm', any('delayPerLength'), { value: 6.9e-9 }],
  ['4.5 ns/m', any('delayPerLength'), { value: 4.5e-9 }],
  ['58 MS/m', any('conductivity'), { value: 58e6 }],
  ['20 mohm', any('impedance'), { value: 0.02 }],
])('`%s`', (text, spec, expected) => {
  const { quantity, problem } = readQuantity(text, spec);
  expect(problem).toBeUndefined();
  for (const [key, value] of Object.entries(expected)) {
    const actual = quantity?.[key as keyof typeof quantity];
    if (typeof value === 'number' && value !== 0) expect(Number(actual) / value).toBeCloseTo(1, 14);
    else expect(actual).toBe(value);
  }
});

test.each<[string | number, QuantitySpec, string, string, string[]]>([
  ['42 Mm', length, 'unit-spelling', 'Units keep their case, as in SI: `Mm` is written `mm`.', ['42 mm']],
  ['12 ghz', any('frequency'), 'unit-spelling', 'Units keep their case, as in SI: `ghz` is written `GHz`.', ['12 GHz']],
  ['12 MHZ', any('frequency'), 'unit-spelling', 'Units keep their case, as in SI: `MHZ` is written `MHz`.', ['12 MHz']],
  ['12 mhz', any('frequency'), 'unit-spelling', 'Units keep their case, as in SI: `mhz` is written `MHz`.', ['12 MHz']],
  ['25 Gbps', rate, 'unit-spelling', '`Gbps` is written `Gb/s`.', ['25 Gb/s']],
  ['5 mils', length, 'unit-spelling', '`mils` is written `mil`.', ['5 mil']],
  ['60 C', any('temperature'), 'unit-spelling', '`C` is written `degC`.', ['60 degC']],
  ['60 °C', any('temperature'), 'unit-spelling', '`°C` is written `degC`.', ['60 degC']],
  ['42 mn', length, 'unknown-unit', '`mn` is not a unit; did you mean `nm`?', ['42 nm']],
  [
    '42 furlong',
    length,
    'unknown-unit',
    '`furlong` is not a unit; a length is in `nm`, `um`, `mil`, `mm`, `cm`, `in`, `m`.',
    [],
  ],
  ['3,37 mm', length, 'comma-decimal', 'Decimals are written with a point: `3,37` is `3.37`.', ['3.37 mm']],
  [
    '3,37 mm ± 0,1 mm',
    length,
    'comma-decimal',
    'Decimals are written with a point: `3,37` is `3.37`.',
    ['3.37 mm ± 0.1 mm'],
  ],
  [
    '1,000 mm',
    length,
    'comma-decimal',
    'Decimals are written with a point: `1,000` is `1.000`; thousands are written without a separator.',
    ['1.000 mm', '1000 mm'],
  ],
  [
    110,
    { ...length, plausible: [20e-6, 3e-3] },
    'bare-number',
    'A length needs a unit: `110` could be in `um` or `mil`.',
    ['110 um', '110 mil'],
  ],
  ['100', impedance, 'bare-number', 'An impedance needs a unit: `100` could be in `ohm`.', ['100 ohm']],
  ['100 ohm', length, 'dimension', 'A length is wanted; `100 ohm` is an impedance.', []],
  ['1 dB', lossPerLength, 'dimension', 'A loss per length is wanted; `1 dB` is a loss in dB.', []],
  ['8 %', length, 'dimension', 'A length is wanted; `%` stands in tolerances only.', []],
  ['3 mm', width, 'dimension', 'A part of the unit interval or a time is wanted; `3 mm` is a length.', []],
  [
    '40 %',
    { ...ratio, valid: [0, 1], plausible: undefined },
    'unit-not-wanted',
    'This is a number without unit: write `0.4` in place of `40 %`.',
    ['0.4'],
  ],
  ['3.6 ohm', ratio, 'unit-not-wanted', 'This is a number without unit: write `3.6` in place of `3.6 ohm`.', ['3.6']],
  [
    '42 mm ± 3 ohm',
    length,
    'dimension',
    'The tolerance of a length is in its own unit or in %; `ohm` is that of an impedance.',
    [],
  ],
  ['42 mm ± -3 mm', length, 'tolerance', 'A tolerance is written without a sign of its own.', ['42 mm ± 3 mm']],
  ['42 mm ±', length, 'tolerance', 'Behind `±` stands the tolerance, as `± 8%` or with a unit.', []],
  ['42 mm +- 3 mm', length, 'tolerance', 'A tolerance is written `±` or `+/-`.', ['42 mm ± 3 mm']],
  [
    '42 mm +0.1 mm',
    length,
    'tolerance',
    'A tolerance has two sides: write `+0.1/-0 mm`, or `±`.',
    ['42 mm +0.1/-0 mm'],
  ],
  [
    '42 mm +0.1/+0.1 mm',
    length,
    'tolerance',
    'A tolerance of two sides has one `+` and one `-`, as `+0.1/-0.05 mm`.',
    [],
  ],
  [
    '42 mm ± 3% (2 sigma)',
    length,
    'tolerance',
    'Behind a tolerance only `(3 sigma)` may stand: it makes the tolerance three standard deviations of a normal.',
    ['42 mm ± 3% (3 sigma)', '42 mm ± 3%'],
  ],
  [
    '42 mm (3 sigma)',
    length,
    'tolerance',
    '`(3 sigma)` stands behind a tolerance only, as `± 8% (3 sigma)`.',
    ['42 mm'],
  ],
  ['25 Gb/s ± 1%', rate, 'tolerance-not-allowed', 'No tolerance is written here: remove `± 1%`.', ['25 Gb/s']],
  [
    '1 dB/m @ 1 GHz ± 5%',
    lossPerLength,
    'tolerance',
    'The tolerance stands before the frequency.',
    ['1 dB/m ± 5% @ 1 GHz'],
  ],
  ['42 mm @ 3 GHz', length, 'at-not-allowed', 'No frequency is written here: remove `@ 3 GHz`.', ['42 mm']],
  [
    '1 dB/m',
    lossPerLength,
    'at-missing',
    'The frequency is missing at which this holds: `1 dB/m @ 12.890625 GHz`.',
    ['1 dB/m @ 12.890625 GHz'],
  ],
  [
    '1 dB/m @ nyquist',
    lossPerLength,
    'nyquist-not-allowed',
    '`@ nyquist` is for limits, budgets and owners; an element’s own data holds at a frequency, here `@ 12.890625 GHz`.',
    ['1 dB/m @ 12.890625 GHz'],
  ],
  [
    '1 dB/m @ 12.9',
    lossPerLength,
    'bare-number',
    'The frequency behind `@` needs a unit, as `@ 12.9 GHz`.',
    ['1 dB/m @ 12.9 GHz', '1 dB/m @ 12.9 MHz'],
  ],
  ['1 dB/m @ 3 mm', lossPerLength, 'dimension', 'Behind `@` stands a frequency; `3 mm` is a length.', []],
  ['24 dB @', loss, 'at', 'Behind `@` stands a frequency, as `@ 12.9 GHz`.', []],
  ['24 dB @ Nyquist', loss, 'at', '`Nyquist` is written `nyquist`.', ['24 dB @ nyquist']],
  [
    '1 dB/m @ 1 GHz, 2 dB/m @ 2 GHz',
    lossPerLength,
    'trailing',
    'Several points are written as a list in brackets.',
    ['[1 dB/m @ 1 GHz, 2 dB/m @ 2 GHz]'],
  ],
  ['42 mm or so', length, 'trailing', '`or so` behind the quantity is not understood.', ['42 mm']],
  ['-3 mm', length, 'out-of-range', '`-3 mm` is not possible here: it cannot be negative.', []],
  ['0 ohm', impedance, 'out-of-range', '`0 ohm` is not possible here: it is above zero.', []],
  ['0.3', ratio, 'out-of-range', '`0.3` is not possible here: it is at least 1.', []],
  ['1 mm ± 3 mm', length, 'out-of-range', 'With its tolerance `1 mm ± 3 mm` reaches -2 mm; it cannot be negative.', []],
  ['1e999 mm', length, 'out-of-range', '`1e999` is beyond what a number can hold.', []],
  ['1e-999 mm', length, 'out-of-range', '`1e-999` is beyond what a number can hold.', []],
  [Number.NaN, length, 'not-a-quantity', 'A length is wanted, as `42 mm`; `NaN` is none.', []],
  [
    Number.POSITIVE_INFINITY,
    ratio,
    'not-a-quantity',
    'A number without unit is wanted, as `3.6`; `Infinity` is none.',
    [],
  ],
  ['', length, 'empty', 'A length is wanted, as `42 mm`.', []],
  ['long', length, 'not-a-quantity', 'A length is wanted, as `42 mm`; `long` is none.', []],
])('`%s` is not understood', (text, spec, code, message, fixes) => {
  const { quantity, problem } = readQuantity(text, spec, { nyquistHz: 12.890625e9 });
  expect(quantity).toBeUndefined();
  expect(problem).toMatchObject({ code, message });
  expect((problem?.fixes ?? []).map((fix) => fix.text)).toEqual(fixes);
});

test('an implausible size is read, with the units that would make it plausible', () => {
  const { quantity, problem } = readQuantity('42 m ± 2 m', length);
  expect(quantity).toMatchObject({ value: 42, plus: 2 });
  expect(problem).toMatchObject({ code: 'implausible', range: { start: 0, end: 4 } });
  expect(problem?.message).toBe('`42 m ± 2 m` is implausibly large: 1 um to 10 m is usual here. Is the unit right?');
  expect(problem?.fixes?.[0].text).toBe('42 mm ± 2 m');
});

test('just inside what is plausible there is nothing to say', () => {
  expect(readQuantity('10 m', length).problem).toBeUndefined();
  expect(readQuantity('10.1 m', length).problem?.code).toBe('implausible');
});

const bands: QuantitySpec = { dimensions: ['frequency'], band: true };
test.each([
  ['50 MHz to 12 GHz', 50e6, 12e9],
  ['50MHz to 12GHz', 50e6, 12e9],
  ['5 to 12 GHz', 5e9, 12e9],
])('the band `%s`', (text, fromHz, toHz) => {
  expect(readBand(text, bands)).toEqual({ band: { fromHz, toHz, text } });
});
test.each([
  ['12 GHz to 50 MHz', 'A band goes from a lower to a higher frequency.', ['50 MHz to 12 GHz']],
  ['1 GHz to 1 GHz', 'A band goes from a lower to a higher frequency.', []],
  ['50 MHz - 12 GHz', 'A band is written with `to`, as `50 MHz to 12 GHz`.', ['50 MHz to 12 GHz']],
  ['50 MHz..12 GHz', 'A band is written with `to`, as `50 MHz to 12 GHz`.', ['50 MHz to 12 GHz']],
  ['5 mm to 12 GHz', 'A frequency is wanted; `5 mm` is a length.', []],
  ['5 MHz to 12 ghz', 'Units keep their case, as in SI: `ghz` is written `GHz`.', ['5 MHz to 12 GHz']],
  ['5 mhz to 12 GHz', 'Units keep their case, as in SI: `mhz` is written `MHz`.', ['5 MHz to 12 GHz']],
  ['12 GHz', 'A band is wanted, as `50 MHz to 12 GHz`; `12 GHz` is none.', []],
  ['1,5 GHz to 12 GHz', 'Decimals are written with a point: `1,5` is `1.5`.', ['1.5 GHz to 12 GHz']],
])('`%s` is no band', (text, message, fixes) => {
  const { problem } = readBand(text, bands);
  expect(problem?.message).toBe(message);
  expect((problem?.fixes ?? []).map((fix) => fix.text)).toEqual(fixes);
});

test('each unit is read by each of its spellings, and only as its own dimension', () => {
  for (const unit of unitTable) {
    expect(readQuantity(`3 ${unit.text}`, any(unit.dimension)).quantity, unit.text).toMatchObject({
      dimension: unit.dimension,
    });
    const other: Dimension = unit.dimension === 'length' ? 'time' : 'length';
    expect(readQuantity(`3 ${unit.text}`, any(other)).problem?.code, unit.text).toBe('dimension');
  }
});

test('the example of each dimension is one', () => {
  for (const { dimension } of unitTable) {
    const spec: QuantitySpec = { dimensions: [dimension], at: 'required' };
    expect(readQuantity(quantityExample(spec), spec).quantity).toBeDefined();
  }
});

const specs = [length, loss, lossPerLength, impedance, ratio, width, rate];
const pieces = [
  '42',
  '.5',
  '1e9',
  'e',
  '-',
  '+',
  '±',
  '+/-',
  '/',
  '%',
  ' ',
  '@',
  'nyquist',
  'mm',
  'GHz',
  'dB/in',
  'ohm',
  'µm',
  '(3 sigma)',
  '(',
  ')',
  ',',
  '.',
  'to',
  '\n',
  '`',
  '😀',
];
const texts = fc.oneof(
  fc.string(),
  fc.array(fc.constantFrom(...pieces), { maxLength: 9 }).map((parts) => parts.join('')),
);

test('no text makes the reader throw; ranges lie inside it; what is read is finite; no fix changes nothing', () => {
  fc.assert(
    fc.property(texts, fc.constantFrom(...specs), (text, spec) => {
      for (const reading of [readQuantity(text, spec, { nyquistHz: 12e9 }), readBand(text, bands)]) {
        const { problem } = reading;
        const values =
          'quantity' in reading && reading.quantity
            ? [reading.quantity.value, reading.quantity.plus, reading.quantity.minus]
            : [];
        expect(values.every(Number.isFinite)).toBe(true);
        if (!problem) continue;
        expect(problem.range?.start).toBeGreaterThanOrEqual(0);
        expect(problem.range?.end).toBeLessThanOrEqual(text.length);
        expect(problem.range?.start).toBeLessThanOrEqual(problem.range!.end);
        expect(problem.message).not.toMatch(/\n/);
        for (const fix of problem.fixes ?? []) expect(fix.text).not.toBe(text);
      }
    }),
    { numRuns: 3000, seed: 11 },
  );
});

test('a text of 100 kB is refused, at the limit it is read', () => {
  expect(readQuantity(`1${' '.repeat(497)}mm`, length).quantity?.value).toBe(1e-3);
  expect(readQuantity(`1${' '.repeat(498)}mm`, length).problem?.message).toBe('This text is too long for a quantity.');
  const worst = [
    '1'.repeat(1e5),
    `${'1,'.repeat(5e4)}1`,
    ','.repeat(1e5),
    `1${'m'.repeat(1e5)}`,
    `1 mm${' '.repeat(1e5)}x`,
    `1 mm ${'('.repeat(1e5)}`,
    `1 mm +${'1/'.repeat(5e4)}`,
    '@'.repeat(1e5),
    'to '.repeat(3e4),
    `1 ${'m/'.repeat(5e4)}`,
  ];
  for (const text of worst) {
    for (const spec of specs) expect(readQuantity(text, spec).problem?.message.length).toBeLessThan(400);
    expect(readBand(text, bands).problem).toBeDefined();
  }
});
