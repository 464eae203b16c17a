import { describe, expect, test } from 'vitest';
import { analyse } from '../analyse';
import { show } from '../quantity/show';
import { analyseExample, filesWith, TODAY } from '../rules/testing';
import { plots, previewData, renderSvg } from './index';
import { plainDescription, thinned } from './plain';
import type { PlotDescription } from './types';

/** Plots of real analyses of the rules' base channel. */
const described = (example: string): Record<string, PlotDescription> =>
  Object.fromEntries(
    plots.flatMap((plot) => plot.describe(analyseExample(example)) ?? []).map((plot) => [plot.name, plot]),
  );

const whole = analyseExample('title: Nothing changed');

describe('every plot of a real channel', () => {
  test.each(plots.map((plot) => [plot.name, plot] as const))(
    '%s: named as in the list, finite, in its domain',
    (name, plot) => {
      const description = plot.describe(whole)!;
      expect(description.name).toBe(name);
      expect(description.series.length + (description.heat ? 1 : 0)).toBeGreaterThan(0);
      for (const { x, y } of description.series) {
        expect(x.length).toBe(y.length);
        expect(x.length).toBeGreaterThan(1);
        expect(Array.from(x).every(Number.isFinite) && Array.from(y).every(Number.isFinite)).toBe(true);
      }
      expect(description.summary).not.toMatch(/unknown|undefined|NaN/);
      expect(renderSvg(description, { width: 600, height: 320, theme: 'print', idPrefix: name })).not.toMatch(
        /NaN|Infinity/,
      );
    },
  );

  test('is still described where the file is half typed', () => {
    for (const text of [
      'path: []',
      'path: [{ trace: a }]',
      'line-rate: fast',
      'limits: [{ eye: main }]',
      'receiver: {}',
    ]) {
      const analysis = analyseExample(text);
      expect(() => previewData(analysis)).not.toThrow();
    }
  });
});

describe('insertion loss', () => {
  test('shows at Nyquist the very figure of the verdict', () => {
    const figure = whole.figures.find(({ name }) => name === 'insertion-loss-at-nyquist')!;
    const { series, summary } = plots[0].describe(whole)!;
    expect(summary).toContain(`${figure.text} at Nyquist (${show.frequency(whole.model.nyquistFrequency)})`);
    const at = Array.from(series[0].x).findIndex((x) => Math.abs(x - whole.model.nyquistFrequency) < 1);
    expect(series[0].y[at]).toBeCloseTo(figure.value, 9);
  });

  test('marks the notch of a deep stub with the via that makes it, even beyond twice Nyquist', () => {
    const { 'insertion-loss': loss } = described('path: [{ via: dive, part: board.long-hole }]');
    const mark = loss.marks.find(({ element }) => element === 'dive')!;
    expect(mark.label).toContain('dive');
    expect(mark.x).toBeLessThanOrEqual(loss.x.domain[1]);
    expect(loss.summary).toContain('dive');
  });

  test('draws the cut that a limit judges as a curve of its own', () => {
    const { 'insertion-loss': loss } = described(
      'limits: [{ insertion-loss: whole, between: [breakout, run], max: 12 dB @ nyquist }]',
    );
    expect(loss.series.map(({ name }) => name)).toEqual(['Whole path', 'breakout to run']);
    expect(loss.limits).toMatchObject([{ name: 'whole', met: true, forbidden: 'above' }]);
  });

  test('a limit that is not met is drawn as such', () => {
    const { 'insertion-loss': loss } = described('limits: [{ insertion-loss: whole, max: 0.5 dB @ nyquist }]');
    expect(loss.limits[0].met).toBe(false);
    expect(loss.summary).toContain('whole not met');
  });
});

test('return loss is seen from both ends, with the limit over its band', () => {
  const { 'return-loss': loss } = described('limits: [{ return-loss: match, band: 50 MHz to 4 GHz, min: 7 dB }]');
  expect(loss.series.map(({ name }) => name)).toEqual(['From the transmitter', 'From the receiver']);
  expect(loss.limits).toMatchObject([{ name: 'match', x: [50e6, 4e9], y: [7, 7], forbidden: 'below' }]);
});

test('the single-bit response stands on its main cursor', () => {
  const { 'single-bit': bit } = described('title: Nothing changed');
  const [response, cursors] = bit.series;
  const at = Array.from(response.x).indexOf(0);
  expect(response.y[at]).toBeCloseTo(whole.link!.mainCursorVolts, 3);
  expect(cursors.y[Array.from(cursors.x).indexOf(0)]).toBeCloseTo(whole.link!.mainCursorVolts, 9);
});

test('the eye has its contour and the limit as a rhombus of its height and width', () => {
  const { eye } = described('limits: [{ eye: main, height: 40 mV, width: 0.3 UI }]');
  expect(eye.series).toHaveLength(1);
  const [{ x, y }] = eye.limits;
  expect(x[2] - x[0]).toBeCloseTo(0.3, 12);
  expect(y[1] - y[3]).toBeCloseTo(0.04, 12);
  expect(eye.heat!.values.length).toBe(eye.heat!.columns * eye.heat!.rows);
});

test('impedance along the path has each element where its delay puts it', () => {
  const { impedance } = described('title: Nothing changed');
  expect(impedance.marks.map(({ element }) => element)).toEqual(whole.model.elements.map(({ name }) => name));
  const run = impedance.marks.find(({ element }) => element === 'run')!;
  expect(run.y).toBeGreaterThan(85);
  expect(run.y).toBeLessThan(115);
});

describe('the data of the preview', () => {
  const data = previewData(whole);

  test('is plain JSON: it comes back as it went', () => {
    expect(JSON.parse(JSON.stringify(data))).toEqual(data);
    expect(JSON.stringify(data).length).toBeLessThan(400_000);
  });

  test('has each figure in the words of every other surface', () => {
    for (const { name, text } of whole.figures)
      expect(data.figures.find((figure) => figure.name === name)?.text).toBe(text);
    for (const { name, text } of whole.limits)
      expect(data.limits.find((limit) => limit.name === name)?.text).toBe(text);
    expect(data.verdict.text).toBe(whole.verdict.text);
    const loss = data.ledger!.columns.findIndex(({ name }) => name === 'own-loss-at-nyquist');
    for (const [i, row] of whole.ledger!.rows.entries()) {
      expect(data.ledger!.rows[i].cells[loss]).toBe(
        row.figures.find(({ name }) => name === 'own-loss-at-nyquist')?.text ?? '',
      );
    }
  });

  test('says where each element stands, so that a click finds its lines', () => {
    const dive = whole.model.elements.find(({ name }) => name === 'dive')!;
    expect(data.ledger!.rows[dive.index]).toMatchObject({ element: 'dive', at: dive.place });
  });

  test('marks what the eye keeps from an older text', () => {
    const { files } = filesWith('title: Nothing changed');
    const edited = filesWith('line-rate: 11 Gb/s').files;
    const inputs = { file: whole.model.file, configFile: 'lanewright.config.yaml', today: TODAY };
    const before = analyse({ ...inputs, files }, undefined, { until: 'link' });
    const after = previewData(analyse({ ...inputs, files: edited }, before, { until: 'time' }));
    expect(after.stale).toBe(true);
    expect(after.plots.find(({ name }) => name === 'eye')?.description?.stale).toBe(true);
    expect(after.plots.find(({ name }) => name === 'insertion-loss')?.description?.stale).toBeUndefined();
    expect(after.figures.find(({ name }) => name === 'eye-height')?.text).toMatch(/^~/);
  });

  test('says why a plot is missing', () => {
    const none = previewData(analyseExample('line-rate: fast'));
    expect(none.plots.every(({ description, missing }) => !description && missing)).toBe(true);
    expect(none.plots[0].missing).toContain('`line-rate`');
  });
});

describe('plain arrays', () => {
  test('keep six digits of the largest value, and drop what is not finite', () => {
    const plain = plainDescription({
      ...plots[0].describe(whole)!,
      series: [{ name: 'one', x: [0, 1.23456789e10, 2e10], y: [Number.NaN, 12.3456789, 1e-9] }],
    });
    expect(plain.series[0]).toEqual({ name: 'one', x: [1.2345679e10, 2e10], y: [12.3457, 0] });
  });

  test('a long curve keeps its ends and peaks in at most as many points', () => {
    const count = 50_000;
    const x = Float64Array.from({ length: count }, (_, i) => i);
    const y = Float64Array.from({ length: count }, (_, i) => (i === 31_234 ? -99 : Math.sin(i / 50)));
    const kept = thinned(x, y, 4000);
    expect(kept.length).toBeLessThanOrEqual(4000);
    expect([kept[0], kept.at(-1), kept.includes(31_234)]).toEqual([0, count - 1, true]);
  });
});
