import fc from 'fast-check';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { analyse } from './analyse';
import type { Analysis, Inputs } from './analysis';
import { elementKinds } from './elements/index';
import { CHANNEL_FILE, channelText, exampleTexts, inputsOf, partsText } from './model/fixtures';
import type { Network } from './networks/types';
import { rangeOf } from './text/range';

const inputsWith = (channel: string, parts = partsText): Inputs => inputsOf(exampleTexts({ channel, parts }));
const cold = (channel: string, until: 'time' | 'link' = 'time') => analyse(inputsWith(channel), undefined, { until });
const stages = ({ model, networks, cascade, time, link }: Analysis) => ({ model, networks, cascade, time, link });

/** Stands for an array, bit for bit: a comparison number by number of some hundred thousand takes seconds. */
function bits(numbers: Float64Array | undefined): string {
  if (!numbers) return 'none';
  let hash = 0x811c9dc5;
  for (const word of new Uint32Array(numbers.slice().buffer)) hash = Math.imul(hash ^ word, 0x01000193);
  return `${numbers.length} numbers, ${hash >>> 0}`;
}

const networkBits = ({ differential, common, full }: Network) => [bits(differential), bits(common), bits(full)];

/** All numbers that a stage holds, and all that a person reads. */
const seen = ({ networks, cascade, time, figures, limits, findings, verdict, ledger }: Analysis) => ({
  grid: networks && [networks.grid.k, networks.grid.j],
  elements: networks?.elements.map(({ element, network }) => [element.name, ...networkBits(network)]),
  total: cascade && networkBits(cascade.total),
  resonances: cascade?.resonances,
  pulse: bits(time?.pulse),
  figures,
  limits,
  findings,
  verdict,
  ledger,
});

describe('a complete channel, end to end', () => {
  const analysis = cold(channelText, 'link');

  test('has every stage, no fault of ours, and finite figures', () => {
    expect(Object.values(stages(analysis)).every(Boolean)).toBe(true);
    expect(analysis.findings.filter(({ rule }) => rule === 'internal')).toEqual([]);
    expect(analysis.figures.every(({ value }) => Number.isFinite(value))).toBe(true);
    expect(analysis.networks?.without).toEqual([]);
    expect(analysis.linkIsStale).toBe(false);
  });

  test('loses what its elements lose one by one, but for reflections', () => {
    const loss = analysis.figures.find(({ name }) => name === 'insertion-loss-at-nyquist')!.value;
    const own = analysis.ledger!.rows[analysis.ledger!.rows.length - 1].cumulativeDb;
    expect(own).toBeGreaterThan(2.5); // the cable's 3 dB at 5.16 GHz among it
    expect(Math.abs(loss - own)).toBeLessThan(1);
  });

  test('names the via stub that its computed response shows', () => {
    expect(analysis.cascade!.resonances[0].elements).toEqual(['rise']);
  });
});

describe('each stage is kept until its own input changes', () => {
  const before = cold(channelText, 'link');
  const edited = (channel: string, parts?: string) => analyse(inputsWith(channel, parts), before, { until: 'link' });

  test('the same texts: nothing is computed', () => {
    const again = edited(channelText);
    expect(again.computed).toEqual({});
    for (const name of ['model', 'networks', 'cascade', 'time', 'link', 'figures', 'ledger'] as const)
      expect(again[name]).toBe(before[name]);
  });

  test('a comment above: ranges move, no stage does', () => {
    const again = edited(`# a note\n${channelText}`);
    expect(again.computed).toEqual({ parsed: 1 });
    for (const [name, stage] of Object.entries(stages(before))) expect(again[name as 'model']).toBe(stage);
    const { place } = again.model.elements[2];
    const start = (analysis: Analysis) => rangeOf(analysis.parsed.get(CHANNEL_FILE)!, place).start;
    expect(start(again) - start(before)).toBe('# a note\n'.length);
  });

  test('one length: one network and a few products', () => {
    const again = edited(channelText.replace('length: 60 mm', 'length: 61 mm'));
    expect(again.computed).toMatchObject({ parsed: 1, model: 1, networks: 1, time: 1, link: 1 });
    expect(again.computed.products).toBeLessThanOrEqual(5);
  });

  test('a limit: no network, no pulse, no eye', () => {
    const again = edited(channelText.replace('max: 24 dB', 'max: 23 dB'));
    expect(again.computed).toEqual({ parsed: 1, model: 1 });
    expect(again.linkIsStale).toBe(false);
  });

  test('a title: likewise', () => {
    expect(edited(channelText.replace('title: Camera', 'title: The camera')).computed).toEqual({ parsed: 1, model: 1 });
  });

  test('a material of the parts file: only what it is part of', () => {
    const again = edited(channelText, partsText.replace('delay: 60 ps', 'delay: 61 ps'));
    expect(again.computed).toMatchObject({ parsed: 1, networks: 1 });
  });

  test('while the eye waits, the one of before stands, marked', () => {
    const longer = inputsWith(channelText.replace('length: 60 mm', 'length: 70 mm'));
    const typing = analyse(longer, before, { until: 'time' });
    expect([typing.link, typing.linkIsStale]).toEqual([before.link, true]);
    const rest = analyse(longer, typing, { until: 'link' });
    expect([rest.linkIsStale, rest.computed]).toEqual([false, { link: 1 }]);
    expect(rest.link!.eyeHeightVolts).not.toBe(before.link!.eyeHeightVolts);
  });
});

describe('what is kept never shows', () => {
  const pieces = [
    'length: 14 mm',
    'length: 60 mm ± 2 mm',
    'skew: 1.5 ps',
    'to: L1',
    'value: 100 nF',
    'rise-time: 24 ps',
    'part: sled.sled-mate',
    '  - via: rise\n    part: sled.through-via\n    to: L1\n',
    '0.5 m',
    'temperature: 60',
  ];
  const changes = [
    '',
    'length: 33 mm',
    'skew: -3 ps',
    'to: L6',
    '2 m',
    'lenght: 1 mm',
    '- tr',
    'temperature: 25',
    'rise-time: 9 ps',
  ];
  const edit = fc.record({ from: fc.constantFrom(...pieces), to: fc.constantFrom(...changes), back: fc.boolean() });

  test('a random sequence of edits ends as a cold start, bit for bit', () => {
    fc.assert(
      fc.property(fc.array(edit, { minLength: 1, maxLength: 5 }), (edits) => {
        let text = channelText;
        let analysis = cold(text);
        for (const { from, to, back } of edits) {
          text = back ? channelText : text.replace(from, to);
          analysis = analyse(inputsWith(text), analysis, { until: 'time' });
        }
        expect(seen(analysis)).toEqual(seen(cold(text)));
      }),
      { seed: 11, numRuns: 40 },
    );
  }, 60_000);

  test('a grid kept while one types gives way to the text’s own at rest', () => {
    // the longer cable delays enough to ask for a finer grid
    const long = cold(channelText.replace('length: 0.5 m', 'length: 1.2 m'));
    const short = cold(channelText);
    expect(long.networks!.grid.k).toBeGreaterThan(short.networks!.grid.k);
    const typing = analyse(inputsWith(channelText), long, { until: 'time', keepGrid: true });
    expect(typing.networks!.grid).toBe(long.networks!.grid);
    const rest = analyse(inputsWith(channelText), typing, { until: 'time' });
    expect(seen(rest)).toEqual(seen(short));
  });
});

describe('nothing makes it fail', () => {
  afterEach(() => vi.restoreAllMocks());

  test('a kind that breaks is one finding at its element, and the rest is computed', () => {
    vi.spyOn(elementKinds.cable, 'network').mockImplementation(() => {
      throw new Error('a slip');
    });
    const analysis = cold(channelText.replace('delay: 4.5 ns/m', 'delay: 4.6 ns/m'));
    const internal = analysis.findings.filter(({ rule }) => rule === 'internal');
    expect(internal).toMatchObject([{ subject: 'twinax', severity: 'error', at: { path: ['path', 8] } }]);
    expect(internal[0].message).toContain('a slip');
    expect(analysis.networks!.without).toEqual(['twinax']);
    expect(analysis.time).toBeDefined();
  });

  test('a network that is not finite is a fault of ours, and no number of it gets out', () => {
    vi.spyOn(elementKinds.stub, 'network').mockImplementation((_, { frequencies }) => ({
      differential: new Float64Array(8 * frequencies.length).fill(Number.NaN),
    }));
    const analysis = cold(channelText.replace('dk: 3.6', 'dk: 3.7'));
    expect(analysis.findings.filter(({ rule }) => rule === 'internal')).toMatchObject([{ subject: 'test-point' }]);
    expect(analysis.time!.pulse.every(Number.isFinite)).toBe(true);
  });

  test.each([
    '',
    '[',
    'path:',
    'lanewright: 2\nline-rate: 1 Gb/s\npath: []\n',
    '\u0000',
    'lanewright: 1\nline-rate: 10 Gb/s\npath: []\n',
  ])('the text %j', (text) => {
    const analysis = cold(text, 'link');
    expect(analysis.findings.filter(({ rule }) => rule === 'internal')).toEqual([]);
    expect(analysis.verdict.text.length).toBeGreaterThan(0);
  });

  test('no file at all', () => {
    const analysis = analyse(
      { file: 'gone.channel.yaml', files: new Map([['gone.channel.yaml', { kind: 'missing' }]]), today: '2026-01-01' },
      undefined,
      { until: 'link' },
    );
    expect(analysis.verdict.state).toBe('not-computed');
  });

  test('the time for a file over at any kernel: what was known stands, and it is told', () => {
    for (const allowed of [0, 1, 5, 12, 19]) {
      let asked = 0;
      const analysis = analyse(inputsWith(channelText), undefined, {
        until: 'link',
        outOfTime: () => asked++ >= allowed,
      });
      expect(analysis.timedOut).toBe(true);
      expect(analysis.findings.map(({ rule }) => rule)).toContain('time-limit');
      expect(analysis.model.elements).toHaveLength(9);
      expect(analysis.link).toBeUndefined();
    }
  });
});

test('a Touchstone file in place of an element: read once, placed, and its faults told at the element', () => {
  const channel = channelText.replace('    part: sled.sled-mate', '    touchstone: mate.s2p');
  const file = (text: string) => ({ ...exampleTexts({ channel }), 'lanes/mate.s2p': text });
  const good = analyse(inputsOf(file('# GHz S RI R 50\n0 0 0 1 0 1 0 0 0\n60 0 0 1 0 1 0 0 0\n')), undefined, {
    until: 'time',
  });
  expect(
    good.findings.filter(({ rule }) => ['touchstone', 'port-map', 'data-range', 'internal'].includes(rule)),
  ).toEqual([]);
  expect(good.networks!.elements[7]).toMatchObject({ through: false, prepared: { facts: { dataRangeHz: [0, 60e9] } } });
  const bad = analyse(inputsOf(file('# GHz S RI R 50\n0 0 0 1 0 one 0 0 0\n')), good, { until: 'time' });
  const finding = bad.findings.find(({ rule }) => rule === 'touchstone')!;
  expect(finding.at.path.slice(0, 2)).toEqual(['path', 7]);
  expect(finding.message).toContain('line 2: `one` is not a number');
  expect(bad.networks!.without).toEqual(['sled-mate']);
});
