import { describe, expect, test } from 'vitest';
import { eyeExample, lossPlot, pulsePlot } from '../testing';
import type { PlotDescription } from '../types';
import { layoutOf } from './layout';
import { type RenderOptions, renderSvg } from './render';

const options: RenderOptions = { width: 600, height: 320, theme: 'vars', idPrefix: 'test', interactive: true };
const hostile = `<img src=x onerror=alert(1)></svg><script>alert("1")</script>'&\u202e\u0000`;

/** Tags open and close in order, attributes are quoted: enough of XML to trust the rest to. */
function expectWellFormed(svg: string): void {
  const open: string[] = [];
  for (const [, closing, name, attributes, selfClosing] of svg.matchAll(
    /<(\/?)([a-zA-Z]+)((?:\s+[a-zA-Z0-9:-]+="[^"<]*")*)\s*(\/?)>/g,
  )) {
    if (closing) expect(open.pop()).toBe(name);
    else if (!selfClosing) open.push(name);
    expect(attributes).not.toMatch(/\son[a-z]+="/);
  }
  expect(open).toEqual([]);
  const outside = svg.replace(/<\/?[a-zA-Z]+(?:\s+[a-zA-Z0-9:-]+="[^"<]*")*\s*\/?>/g, '');
  expect(outside).not.toMatch(/[<>]/);
}

const withText = (text: string): PlotDescription => {
  const plot = lossPlot(50);
  return {
    ...plot,
    title: text,
    summary: text,
    x: { ...plot.x, label: text },
    series: plot.series.map((series) => ({ ...series, name: text })),
    limits: plot.limits.map((limit) => ({ ...limit, name: text })),
    guides: [{ x: 1e10, label: text }],
    marks: plot.marks.map((mark) => ({ ...mark, label: text, element: text })),
  };
};

describe('what is drawn', () => {
  test.each([lossPlot(), pulsePlot(), eyeExample()])(
    '$name: well formed, the same bytes each time, every number finite',
    (plot) => {
      for (const heat of ['levels', 'contours'] as const) {
        const svg = renderSvg(plot, { ...options, heat });
        expectWellFormed(svg);
        expect(renderSvg(plot, { ...options, heat })).toBe(svg);
        expect(svg).not.toMatch(/NaN|Infinity|undefined|null/);
      }
    },
  );

  test('values that are not finite leave a gap, not a number', () => {
    const plot = lossPlot(20);
    const y = Array.from(plot.series[0].y, (value, i) =>
      i === 5 ? Number.NaN : i === 9 ? Number.POSITIVE_INFINITY : value,
    );
    const svg = renderSvg(
      { ...plot, series: [{ ...plot.series[0], y }], marks: [{ x: Number.NaN, y: 0, label: 'lost' }] },
      options,
    );
    expect(svg).not.toMatch(/NaN|Infinity/);
    const [curve] = [...svg.matchAll(/ d="([^"]+)" fill="none" stroke-linejoin/g)].map(([, d]) => d);
    expect(curve.match(/M/g)).toHaveLength(3);
  });

  test('text of a file stays text in every place', () => {
    const svg = renderSvg(withText(hostile), options);
    expectWellFormed(svg);
    for (const unwanted of ['<script', '<img', '\u202e', '\u0000']) expect(svg).not.toContain(unwanted);
    expect(svg).toContain('&lt;img src=x');
  });

  test('curves differ by dash, not by colour alone, and each is named', () => {
    const svg = renderSvg(lossPlot(), options);
    const dashes = [...svg.matchAll(/<path[^>]*stroke-width="1.75"[^>]*>/g)].map(
      ([path]) => /stroke-dasharray="([^"]+)"/.exec(path)?.[1],
    );
    expect(new Set(dashes).size).toBe(2);
    for (const name of ['Whole path', 'breakout to twinax', 'limit ball-to-ball', 'limit mask (not met)'])
      expect(svg).toContain(`>${name}</text>`);
  });

  test('a stale plot says so in its title and is dimmed', () => {
    expect(renderSvg({ ...lossPlot(), stale: true }, options)).toContain('>~ Insertion loss</title>');
    expect(renderSvg(lossPlot(), options)).not.toContain('opacity="0.55"');
  });

  test('for paper every colour is fixed; in the page each is a property of the theme', () => {
    expect(renderSvg(lossPlot(), { ...options, theme: 'print' })).not.toContain('var(');
    expect(renderSvg(lossPlot(), options)).toContain('var(--plot-series-1, #1f5fa8)');
  });
});

describe('marks', () => {
  test('take the focus and name their element in the page, not in a file', () => {
    const page = renderSvg(lossPlot(), options);
    expect(page).toContain('data-element="dive" tabindex="0" role="button" aria-label="dive 19.4 GHz"');
    expect(page).toContain('role="group"');
    const file = renderSvg(lossPlot(), { ...options, interactive: false });
    expect(file).not.toContain('tabindex');
    expect(file).toContain('role="img"');
  });

  test('labels never overlap: where there is no room the mark stands alone, still named', () => {
    const crowd = Array.from({ length: 30 }, (_, i) => ({
      x: 10e9 + i * 2e7,
      y: 20,
      label: `element-${i}`,
      element: `element-${i}`,
    }));
    const svg = renderSvg({ ...lossPlot(), marks: crowd }, options);
    expect(svg.match(/class="plot-mark plot-mark-element"/g)).toHaveLength(30);
    const labels = [...svg.matchAll(/<text x="([\d.]+)" y="([\d.]+)"[^>]*paint-order[^>]*>element/g)].map(
      ([, x, y]) => [Number(x), Number(y)],
    );
    expect(labels.length).toBeLessThan(12);
    for (const [i, [x, y]] of labels.entries()) {
      for (const [otherX, otherY] of labels.slice(i + 1))
        expect(Math.abs(x - otherX) > 40 || Math.abs(y - otherY) > 10).toBe(true);
    }
  });

  test('those outside a zoom are left out', () => {
    const svg = renderSvg(lossPlot(), { ...options, zoom: { x: [0, 10e9] } });
    expect(svg).not.toContain('data-element');
  });
});

describe('the density', () => {
  test('has one path a level, at most 24, and few bytes', () => {
    const svg = renderSvg(eyeExample(200, 100), options);
    const heat = /<g shape-rendering="crispEdges"[^>]*>(.*?)<\/g>/.exec(svg)![1];
    const paths = heat.match(/<path/g)!;
    expect(paths.length).toBeGreaterThan(10);
    expect(paths.length).toBeLessThanOrEqual(24);
    expect(svg.length).toBeLessThan(150_000);
  });

  test('covers each cell above the floor once, in the colour of its level', () => {
    const values = [-20, -1, -1, -20, -20, -6];
    const plot = { ...eyeExample(3, 2), heat: { ...eyeExample(3, 2).heat!, values, floor: -18 } };
    const heat = /<g shape-rendering[^>]*>(.*?)<\/g>/.exec(renderSvg(plot, options))![1];
    expect(heat.match(/M/g)).toHaveLength(2);
    expect(heat.match(/<path/g)).toHaveLength(2);
  });

  test('its bar names whole powers of ten', () => {
    const svg = renderSvg(eyeExample(), options);
    expect(svg).toContain('>10⁻¹⁸</text>');
    expect(svg).toContain('>probability of a bin</text>');
  });

  test('its contours enclose what lies above them', () => {
    const size = 9;
    const values = Array.from({ length: size * size }, (_, i) => -Math.hypot((i % size) - 4, Math.floor(i / size) - 4));
    const plot: PlotDescription = {
      ...eyeExample(),
      series: [],
      limits: [],
      heat: { ...eyeExample().heat!, columns: size, rows: size, values, floor: -6 },
    };
    const layout = layoutOf(plot, options);
    const contours = /<g class="plot-contours">(.*?)<\/g>/.exec(renderSvg(plot, { ...options, heat: 'contours' }))![1];
    const [first] = [...contours.matchAll(/ d="([^"]+)"/g)].map(([, d]) => d);
    const cell = { x: layout.area.width / size, y: layout.area.height / size };
    const centre = { x: layout.x.toPixel(0), y: layout.y.toPixel(0) };
    const radii = [...first.matchAll(/[ML]([\d.]+),([\d.]+)/g)].map(([, x, y]) =>
      Math.hypot((Number(x) - centre.x) / cell.x, (Number(y) - centre.y) / cell.y),
    );
    // the highest contour is a whole number of decades: a circle of that many cells, straight between them
    const wanted = Math.round(Math.max(...radii));
    expect(wanted).toBeGreaterThan(0);
    for (const radius of radii) expect(Math.abs(radius - wanted)).toBeLessThan(0.2);
  });
});

test('limits are hatched on the side that is not allowed', () => {
  const plot = lossPlot();
  const layout = layoutOf(plot, options);
  const [strip] = [...renderSvg(plot, options).matchAll(/ d="([^"]+)" fill="url\(#test-hatch\)"/g)].map(([, d]) => d);
  const heights = [...strip.matchAll(/,([\d.]+)/g)].map(([, y]) => Number(y));
  // more loss is not allowed, and more loss lies lower on the page
  expect(Math.min(...heights)).toBeCloseTo(layout.y.toPixel(24), 1);
  expect(Math.max(...heights)).toBeGreaterThan(layout.y.toPixel(24) + 4);
});

test('a long curve is thinned without losing its peaks', () => {
  const count = 40_000;
  const x = Float64Array.from({ length: count }, (_, i) => (i * 25e9) / count);
  const y = Float64Array.from({ length: count }, (_, i) => (i === 17_001 ? 44 : 10));
  const plot = { ...lossPlot(), series: [{ name: 'one', x, y }], marks: [], limits: [] };
  const svg = renderSvg(plot, options);
  expect(svg.length).toBeLessThan(60_000);
  expect(svg).toContain(`,${Math.round(layoutOf(plot, options).y.toPixel(44) * 100) / 100}`);
});
