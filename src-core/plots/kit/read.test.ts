import { describe, expect, test } from 'vitest';
import { eyeExample, lossPlot, pulsePlot } from '../testing';
import { cell, csvOf } from './csv';
import { nearestValues, neighbour } from './read';
import { tableOf } from './table';

describe('values at a place', () => {
  test('are those of the nearest sample, in the words of every other surface', () => {
    const reading = nearestValues(lossPlot(), 12.9e9)!;
    expect(reading.x).toBeCloseTo(12.890625e9, -7);
    expect(reading.text).toMatch(/^12\.9 GHz: Whole path [\d.]+ dB, breakout to twinax [\d.]+ dB$/);
  });

  test('of stems count only beside one', () => {
    const names = (x: number) => nearestValues(pulsePlot(), x)!.values.map(({ name }) => name);
    expect(names(2)).toEqual(['Response at the slicer', 'Cursors before the DFE', 'Left after the DFE']);
    expect(names(-2)).toEqual(['Response at the slicer']);
  });

  test('of an eye are its edges and, at a height, the density', () => {
    const reading = nearestValues(eyeExample(), 0, 0.12)!;
    expect(reading.values[0].text).toBe('open from -50 mV to 50 mV');
    expect(reading.values[1].text).toMatch(/^about 10⁻/);
    expect(nearestValues(eyeExample(), 0.45)).toBeUndefined();
  });

  test('a step goes to the next sample or further, never beyond the last', () => {
    const plot = lossPlot(11);
    const step = 2.578125e9;
    expect(neighbour(plot, 0, 1)).toBeCloseTo(step, 0);
    expect(neighbour(plot, 0, 1, 2.2 * step)).toBeCloseTo(2 * step, 0);
    expect(neighbour(plot, 10 * step, 1)).toBeCloseTo(10 * step, 0);
    expect(neighbour(plot, 0, -1)).toBe(0);
  });

  test('nothing is read of an empty plot', () => {
    expect(nearestValues({ ...lossPlot(), series: [] }, 1e9)).toBeUndefined();
    expect(nearestValues({ ...lossPlot(), series: [{ name: 'none', x: [], y: [] }] }, 1e9)).toBeUndefined();
  });
});

describe('CSV', () => {
  test('puts curves of one x side by side, then limits and marks', () => {
    const rows = csvOf(lossPlot(3)).split('\r\n');
    expect(rows[0]).toBe('Frequency (Hz),Whole path (dB),breakout to twinax (dB)');
    expect(rows[1]).toMatch(/^0,/);
    expect(rows.slice(5, 8)).toEqual([
      'limit,Frequency (Hz),Insertion loss (dB)',
      'ball-to-ball,12890625000,24',
      'mask,50000000,2',
    ]);
  });

  test('writes one row a point where the curves have their own x', () => {
    const rows = csvOf(pulsePlot()).split('\r\n');
    expect(rows[0]).toBe('curve,Time from the sampling instant (UI),Voltage (V)');
    expect(rows).toContain('Left after the DFE,3,0');
  });

  test('writes the density as a row a cell', () => {
    const rows = csvOf({ ...eyeExample(4, 2), series: [] }).split('\r\n');
    expect(rows[0]).toBe('Time from the sampling instant (UI),Voltage at the slicer (V),log10 of probability of a bin');
    expect(rows[1]).toMatch(/^-0\.375,-0\.1,/);
    expect(rows.slice(1, 9).every((row) => row.split(',').length === 3)).toBe(true);
  });

  test.each([
    ['=HYPERLINK("x")', `"'=HYPERLINK(""x"")"`],
    ['+1', "'+1"],
    ['@sum', "'@sum"],
    ['-lead', "'-lead"],
    ['  =1', "'  =1"],
    ['\t=1', "'\t=1"],
    ['a,b', '"a,b"'],
    ['two\nlines', '"two\nlines"'],
    ['plain', 'plain'],
  ])('the text %j becomes %j: nothing is computed on opening', (text, written) => {
    expect(cell(text)).toBe(written);
  });

  test('what is not finite is an empty cell', () => {
    const plot = lossPlot(2);
    expect(
      csvOf({ ...plot, series: [{ name: 'one', x: [0, 1], y: [Number.NaN, Number.POSITIVE_INFINITY] }] }),
    ).toContain('0,\r\n1,\r\n');
  });
});

describe('the data table', () => {
  test('has a row every round value, and limits and marks in words', () => {
    const { columns, rows, notes } = tableOf(lossPlot());
    expect(columns).toEqual(['Frequency', 'Whole path', 'breakout to twinax']);
    expect(rows.length).toBeGreaterThan(10);
    expect(rows.length).toBeLessThan(40);
    expect(rows.every((row) => row.length === 3)).toBe(true);
    expect(notes).toContain('Limit mask: not met.');
    expect(notes.some((note) => note.startsWith('dive 19.4 GHz: 19.4 GHz, '))).toBe(true);
  });

  test('has a row for each cursor where there are some', () => {
    expect(tableOf(pulsePlot()).rows).toHaveLength(11);
  });
});
