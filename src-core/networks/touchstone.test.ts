import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkValues } from '../../test/check-values';
import { largestSingularValue } from './singular-value';
import { complexPair, readTouchstone, touchstoneLimits } from './touchstone';
import { clockwisePercent } from './touchstone-quality';
import type { TouchstoneData } from './touchstone-types';

const ibis = 'Touchstone 1.1, IBIS Open Forum 2002';

function dataOf(text: string, name = 'part.s2p'): TouchstoneData {
  const { data, errors } = readTouchstone(text, name);
  expect(errors).toEqual([]);
  return data!;
}

/** S of a frequency as a table of [re, im]. */
const matrixOf = ({ ports, s }: TouchstoneData, point = 0) =>
  Array.from({ length: ports }, (_, row) =>
    Array.from({ length: ports }, (_, column) => {
      const at = 2 * (point * ports * ports + row * ports + column);
      return [s[at], s[at + 1]];
    }),
  );

/** The first error, as the text at its range and the message. */
function errorOf(text: string, name = 'part.s2p'): { at: string; line: number; message: string; rule?: string } {
  const { errors, data } = readTouchstone(text, name);
  expect(errors).toHaveLength(1);
  expect(data).toBeUndefined();
  const [{ line, range, message, rule }] = errors;
  return { at: text.slice(range.start, range.end), line, message, rule };
}

checkValues({
  id: 'F-03',
  what: 'pairs of numbers in DB and MA',
  source: 'exact',
  absoluteTolerance: 1e-5,
  compute: ({ pair, format }) => {
    const out = new Float64Array(2);
    complexPair(pair[0], pair[1], format as 'DB' | 'MA', out, 0);
    return [...out];
  },
  rows: [
    { pair: [-3.0103, 45], format: 'DB', expected: [0.5, 0.5] },
    { pair: [2, -60], format: 'MA', expected: [1, -1.73205] },
  ],
});

checkValues({
  id: 'F-04',
  what: 'an impedance normalised to R 75, magnitude in ohm and angle, back from S',
  source: `${ibis}, one-port example`,
  relativeTolerance: 1e-9,
  compute: ({ text }) => {
    const { s, referenceOhms } = dataOf(text, 'load.s1p');
    // Z = R (1 + S)/(1 − S)
    const [re, im] = [s[0], s[1]];
    const scale = referenceOhms[0] / ((1 - re) ** 2 + im * im);
    const z = [(1 - re * re - im * im) * scale, 2 * im * scale];
    return [Math.hypot(z[0], z[1]), (Math.atan2(z[1], z[0]) * 180) / Math.PI];
  },
  rows: [{ text: '# MHz Z MA R 75\n100 0.99 -4\n', expected: [74.25, -4] }],
});

checkValues({
  id: 'F-15',
  what: 'largest singular value of a gain and of a lossless network',
  source: 'exact, singular value decomposition',
  absoluteTolerance: 1e-6,
  compute: ({ s }) => largestSingularValue(Float64Array.from(s.flatMap((re) => [re, 0])), 2),
  rows: [
    { s: [0.6, 0.9, 0.9, -0.6], expected: 1.081665 },
    { s: [0.6, 0.8, 0.8, -0.6], expected: 1 },
  ],
});

checkValues({
  id: 'F-16',
  what: 'largest difference of S21 0.90 and S12 0.85',
  source: 'exact',
  absoluteTolerance: 1e-9,
  compute: ({ text }) => dataOf(text).quality.largestNonReciprocity,
  rows: [{ text: '# GHz S RI\n1 0 0 0.90 0 0.85 0 0 0\n', expected: 0.05 }],
});

checkValues({
  id: 'F-17',
  what: 'clockwise share of turning of a delay and of its conjugate, per cent',
  source: 'idea of IEEE 370-2020; values exact',
  absoluteTolerance: 1e-6,
  compute: ({ sign }) => {
    const points = 2001;
    const s = Float64Array.from({ length: 2 * points }, (_, i) => {
      const angle = -sign * 2 * Math.PI * (i >> 1) * 10e6 * 100e-12;
      return i % 2 ? Math.sin(angle) : Math.cos(angle);
    });
    return clockwisePercent(s, 0, 2, points);
  },
  rows: [
    { sign: 1, expected: 100 },
    { sign: -1, expected: 0 },
  ],
});

describe('what a correct reader does (F-01 to F-14)', () => {
  test('mini file a: a two-port is written 21 before 12', () => {
    const data = dataOf('! a: two ports, v1\n# R 50 RI S\n1 0.05 0  0.8 0  0.1 0  0.05 0\n');
    expect(matrixOf(data)).toEqual([
      [[0.05, 0], [0.1, 0]],
      [[0.8, 0], [0.05, 0]],
    ]); // biome-ignore format: a matrix
    expect([...data.frequencies]).toEqual([1e9]);
    expect(data.referenceOhms).toEqual([50, 50]);
  });

  test('mini file b: three ports row by row, a comment in mid-row', () => {
    const text = '! b\n# MHz S RI R 75\n2  .1 0  .2 0  .3 0   ! first row\n   .4 0  .5 0  .6 0\n   .7 0  .8 0  .9 0\n';
    const data = dataOf(text, 'b.s3p');
    expect(matrixOf(data)[0][2]).toEqual([0.3, 0]);
    expect(matrixOf(data)[2][0]).toEqual([0.7, 0]);
    expect([...data.frequencies]).toEqual([2e6]);
  });

  test('mini file c: version 2 is one clear error at its keyword', () => {
    const text =
      '[Version] 2.0\n# Hz S MA R 50\n[Number of Ports] 2\n[Network Data]\n1e9 0.1 0 0.2 0 0.9 0 0.3 0\n[End]\n';
    for (const name of ['c.s2p', 'c.ts', 'c.s6p']) {
      expect(errorOf(text, name)).toMatchObject({ at: '[Version]', line: 1 });
      expect(errorOf(text, name).message).toContain('2.0 is not read in this version');
    }
  });

  test('the option line in any order and case, with or without a blank; a later one is ignored', () => {
    const [one, two] = ['#khz r 25 ri s\n# GHz Y DB\n5 0.1 0.2\n', '# S RI R 25 kHz\n5 0.1 0.2\n'].map((text) =>
      dataOf(text, 'x.S1P'),
    );
    expect(one).toEqual(two);
    expect(one).toMatchObject({ referenceOhms: [25], frequencies: Float64Array.of(5000) });
  });

  test('what the option line leaves out is GHz, S, MA, R 50', () => {
    const data = dataOf('#\n2 0.5 90\n', 'x.s1p');
    expect([...data.frequencies]).toEqual([2e9]);
    expect(data.s[1]).toBeCloseTo(0.5, 12);
    expect(data.referenceOhms).toEqual([50]);
  });

  test('one resistance for each port on the option line', () => {
    expect(dataOf('# GHz S RI R 50 75\n1 0 0 1 0 1 0 0 0\n').referenceOhms).toEqual([50, 75]);
  });

  test('numbers are counted, not lines: four ports wrapped anyhow, CRLF and tabs', () => {
    const numbers = Array.from({ length: 32 }, (_, i) => (i % 2 ? 0 : i / 100));
    const wrapped = (per: number) =>
      `# GHz S RI R 50\r\n1\t${numbers.map((n, i) => `${n}${i % per === per - 1 ? '\r\n' : '\t'}`).join('')}`;
    for (const per of [8, 2, 4, 32]) expect([...dataOf(wrapped(per), 'x.s4p').s]).toEqual(numbers);
  });

  test('a two-port’s noise data are passed over', () => {
    const text = '# GHz S RI\n1 0 0 .5 0 .5 0 0 0\n2 0 0 .4 0 .4 0 0 0\n! noise\n1 0.7 0.6 20 0.4\n2 0.8 0.5 30 0.3\n';
    expect(dataOf(text).frequencies).toHaveLength(2);
  });

  test('the count of ports comes from the numbers where the name does not tell', () => {
    expect(dataOf('# GHz S RI\n1 0 0 1 0 1 0 0 0\n2 0 0 1 0 1 0 0 0\n', 'export.txt').ports).toBe(2);
    expect(
      dataOf(`# GHz S RI\n1 ${'0 0 '.repeat(3)}\n${'0 0 '.repeat(3)}\n${'0 0 '.repeat(3)}\n`, 'export').ports,
    ).toBe(3);
  });

  test('Z, Y, H and G of a series resistor of 50 ohm and a shunt one give the same S as by hand', () => {
    const series = [
      [1 / 3, 2 / 3],
      [2 / 3, 1 / 3],
    ]; // N-01; biome-ignore format: a matrix
    const real = (text: string) => matrixOf(dataOf(text)).map((row) => row.map(([re]) => re));
    // y of a series resistor r = R: [[1, -1], [-1, 1]]; h: [[1, 1], [-1, 0]]; g: [[0, -1], [1, 1]]
    expectNear(real('# GHz Y RI R 50\n1 1 0 -1 0 -1 0 1 0\n'), series);
    expectNear(real('# GHz H RI R 50\n1 1 0 -1 0 1 0 0 0\n'), series);
    expectNear(real('# GHz G RI R 50\n1 0 0 1 0 -1 0 1 0\n'), series);
    // z of a shunt resistor: all ones
    expectNear(real('# GHz Z RI R 50\n1 1 0 1 0 1 0 1 0\n'), [[-1 / 3, 2 / 3], [2 / 3, -1 / 3]]); // biome-ignore format: a matrix
  });
});

function expectNear(got: number[][], wanted: number[][]) {
  got.flat().forEach((value, i) => {
    expect(value).toBeCloseTo(wanted.flat()[i], 12);
  });
}

describe('each fault is one error at its range', () => {
  const option = '# GHz S RI R 50\n';
  test.each([
    ['a word for a number', `${option}1 0 0 1 0 one 0 0 0\n`, 'one', 2, 'is not a number'],
    ['a number of no size', `${option}1 0 0 1 0 1e999 0 0 0\n`, '1e999', 2, 'is not a number'],
    ['a row too short', `${option}1 0 0 1 0 1 0 0 0\n2 0 0 1 0 1 0 0\n`, '2 0 0 1 0 1 0 0', 3, '8 of the 9 numbers'],
    ['a number too many', `${option}1 0 0 1 0 1 0 0 0 7\n2 0 0 1 0 1 0 0 0\n`, '7', 2, 'begins a new line'],
    ['no data', option, '# GHz S RI R 50', 1, 'no data'],
    ['an unknown option', '# GHz S RI R 50 fast\n1 0 0 1 0 1 0 0 0\n', '# GHz S RI R 50 fast', 1, '`fast`'],
    ['a reference of nothing', '# GHz S RI R 0\n1 0 0 1 0 1 0 0 0\n', '# GHz S RI R 0', 1, 'above 0'],
    ['a negative frequency', `${option}-1 0 0 1 0 1 0 0 0\n`, '-1', 2, 'below 0'],
    ['decibels read as amplitudes of ten to the thousands', '# GHz S DB\n1 0 0 90000 0 0 0 0 0\n', '', 1, 'format'],
  ])('%s', (_, text, at, line, words) => {
    const error = errorOf(text);
    expect(error).toMatchObject({ at, line });
    expect(error.message).toContain(words);
  });

  test('frequencies that do not rise, of more than two ports', () => {
    const row = `${'0 0 '.repeat(9)}\n`;
    expect(errorOf(`${option}2 ${row}2 ${row}`, 'x.s3p')).toMatchObject({ at: '2', line: 3 });
  });

  test('a text that is no such file has one fault, not a missing option line too', () => {
    expect(readTouchstone('<html>\nnothing here\n', 'x.s2p').errors).toMatchObject([
      { line: 1, message: '`<html>` is not a number.' },
    ]);
  });
  test('data without an option line are read with the default one, and that is told', () => {
    const { data, errors } = readTouchstone('1 0.5 0\n', 'x.s1p');
    expect(data?.s[0]).toBe(0.5);
    expect(errors[0].message).toContain('without an option line');
  });
});

describe('limits, at one less, at and beyond', () => {
  const file = (points: number) => `# Hz S RI\n${Array.from({ length: points }, (_, i) => `${i} 0 0\n`).join('')}`;
  test('100,000 frequencies', () => {
    expect(dataOf(file(touchstoneLimits.points - 1), 'x.s1p').frequencies).toHaveLength(99_999);
    expect(dataOf(file(touchstoneLimits.points), 'x.s1p').frequencies).toHaveLength(100_000);
    const tooMany = errorOf(file(touchstoneLimits.points + 1), 'x.s1p');
    expect(tooMany.message).toContain('more than the 100,000 frequencies');
    expect(tooMany.rule).toBe('limit');
  });
  test('four ports', () => {
    const text = (ports: number) => `# GHz S RI\n1 ${'0 0 '.repeat(ports * ports)}\n`;
    expect(dataOf(text(3), 'x.s3p').ports).toBe(3);
    expect(dataOf(text(4), 'x.s4p').ports).toBe(4);
    expect(errorOf(text(5), 'x.s5p').message).toBe('The file has 5 ports; 1 to 4 are read.');
    expect(errorOf(text(5), 'x.s5p').rule).toBe('limit');
    expect(errorOf(text(40), 'x.s400p').message).toContain('400 ports');
  });
  test('64 MiB of text', () => {
    const comment = (size: number) => `# Hz S RI\n1 0 0\n!${' '.repeat(size - 18)}\n`;
    expect(comment(100)).toHaveLength(100);
    for (const size of [touchstoneLimits.characters - 1, touchstoneLimits.characters]) {
      expect(dataOf(comment(size), 'x.s1p').ports).toBe(1);
    }
    expect(errorOf(comment(touchstoneLimits.characters + 1), 'x.s1p').message).toContain('64 MiB');
  });
});

test('no text, however broken, throws; ranges lie inside it and numbers are finite', () => {
  const good = '! c\n# GHz S MA R 50\n1 0.1 10 0.9 -20 0.9 -20 0.1 10\n2 0.1 20 0.8 -40 0.8 -40 0.1 20 ! end\n';
  const pieces = fc.constantFrom(
    '#',
    '!',
    '[Version] 2.0',
    'R',
    '\n',
    ' ',
    '1',
    '-',
    'e',
    '1e400',
    'GHz',
    'Z',
    'DB',
    '\u0000',
    'é',
    '0 0 0 0',
  );
  const broken = fc
    .tuple(fc.nat(good.length), fc.nat(12), fc.array(pieces, { maxLength: 6 }))
    .map(([at, cut, put]) => good.slice(0, at) + put.join('') + good.slice(at + cut));
  fc.assert(
    fc.property(
      fc.oneof(
        broken,
        fc.array(pieces, { maxLength: 60 }).map((all) => all.join('')),
      ),
      fc.constantFrom('a.s1p', 'a.s2p', 'a.s4p', 'a'),
      (text, name) => {
        const { data, errors } = readTouchstone(text, name);
        for (const { range, message } of errors) {
          expect(range.start >= 0 && range.start <= range.end && range.end <= text.length).toBe(true);
          expect(message).not.toMatch(/NaN|undefined/);
        }
        expect(data === undefined).toBe(errors.length > 0 && data === undefined);
        if (data) expect(data.s.every(Number.isFinite) && data.frequencies.every(Number.isFinite)).toBe(true);
        if (!data) expect(errors.length).toBeGreaterThan(0);
      },
    ),
    { seed: 7, numRuns: 2000 },
  );
});
