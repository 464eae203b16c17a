import { expect, test } from 'vitest';
import type { FileContent } from '../text/types';
import { buildModel } from './build';
import { exampleModel, exampleTexts, parsedOf, partsText } from './fixtures';
import { changed, findingsOf, reportsIn, withPath } from './testing';

test('the example has no finding and is read in full', () => {
  const { model } = exampleModel();
  expect(findingsOf(exampleTexts())).toEqual([]);
  expect(model.computable).toBe(true);
  expect(model.elements.map(({ name }) => name)).toEqual([
    'camera-serdes',
    'breakout',
    'dive',
    'main-run',
    'rise',
    'coupling',
    'test-point',
    'sled-mate',
    'twinax',
  ]);
  expect(model.elements.some(({ incomplete }) => incomplete)).toBe(false);
  expect(model.nyquistFrequency).toBe(5.15625e9);
  expect(model.longestRun).toBe(40);
  expect(model.limits[0].between).toEqual([1, 8]);
  expect(model.transmitter?.taps).toEqual([-0.06, 0.82, -0.12]);
  expect(model.transmitter?.mainTap).toBe(1);
  expect(model.waivers[0].upTo?.value).toBe(5.1);
  expect(model.owners).toMatchObject([{ name: 'sled board', budget: { value: 12, at: 'nyquist' } }]);
});

test('a part gives the keys that are not written; places point to where each stands', () => {
  const { model } = exampleModel(
    exampleTexts({
      channel: changed(
        '    part: sled.through-via\n    to: L1',
        '    part: sled.through-via\n    drill: 0.3 mm\n    to: L1',
      ),
    }),
  );
  const rise = model.elements[4];
  expect(rise.values).toMatchObject({ drill: { value: 0.3e-3 }, antipad: { value: 0.75e-3 } });
  expect(rise.places.drill).toEqual({ file: 'lanes/camera.channel.yaml', path: ['path', 4, 'drill'] });
  expect(rise.places.antipad).toEqual({ file: 'boards/sled.parts.yaml', path: ['parts', 'through-via', 'antipad'] });
  expect(rise.places.span).toEqual(rise.place);
  expect(rise.stackup?.name).toBe('main');
});

test('a key beside `part` counts even where it cannot be read', () => {
  const texts = exampleTexts({ channel: changed('    to: L1', '    drill: 0.3 ohm\n    to: L1') });
  expect(findingsOf(texts)).toEqual(['quantity «0.3 ohm»']);
  const { model } = exampleModel(texts);
  expect(model.elements[4].values).not.toHaveProperty('drill');
  expect(model.elements[4].incomplete).toBe(true);
});

test('a via’s ends follow the neighbouring traces over capacitors and stubs', () => {
  const { model } = exampleModel();
  const [dive, rise] = [model.elements[2], model.elements[4]];
  expect([dive.from, dive.to, dive.derived]).toEqual(['L1', 'L3', { from: 'L1', to: 'L3' }]);
  expect([rise.from, rise.to, rise.derived]).toEqual(['L3', 'L1', { from: 'L3' }]);
  const over = withPath(`
  - { trace: a, stackup: main, layer: L1, length: 5 mm, impedance: 100 ohm }
  - { capacitor: c, value: 100 nF }
  - { stub: s, length: 0.5 mm, impedance: 50 ohm, dk: 3.6 }
  - { via: v, part: through-via }
  - { trace: b, stackup: main, layer: L6, length: 5 mm, impedance: 100 ohm }
`);
  expect(findingsOf(over)).toEqual([]);
  expect(exampleModel(over).model.elements[3]).toMatchObject({
    from: 'L1',
    to: 'L6',
    derived: { from: 'L1', to: 'L6' },
  });
});

test('where no trace gives a via’s end, it is asked for, and the outer layers are offered', () => {
  const [report] = reportsIn(exampleTexts({ channel: changed('    to: L1\n', '') }));
  expect(report).toMatchObject({ rule: 'layer-order', subject: 'rise', marked: 'via: rise' });
  expect(report.fixes?.map(({ title }) => title)).toEqual(['Write `to: L1`', 'Write `to: L6`']);
});

test('a via included in its neighbour’s file keeps its layers and needs no dimensions', () => {
  const texts = withPath(`
  - { trace: a, stackup: main, layer: L3, length: 5 mm, impedance: 100 ohm }
  - { via: v, stackup: main, to: L1 }
  - { connector: mate, touchstone: mate.s4p, includes: [v] }
`);
  const { model } = exampleModel({ ...texts, 'lanes/mate.s4p': '# GHz S RI R 50\n' });
  expect(model.reports).toEqual([]);
  expect(model.elements[1]).toMatchObject({ includedIn: 'mate', from: 'L3', to: 'L1', incomplete: false });
  expect(model.elements[2].file).toMatchObject({ file: 'lanes/mate.s4p' });
});

test.each([
  [
    'a layer that no via reached',
    '    layer: L3\n',
    '    layer: L6\n',
    ['layer-order «L6»'],
    '    to: L3\n    backdrill',
  ],
  ['a layer that is not there', '    layer: L3\n', '    layer: L9\n', ['unknown-layer «L9»'], undefined],
  ['a plane', '    layer: L3\n', '    layer: L2\n', ['signal-on-plane «L2»'], undefined],
  ['both ends alike', '    to: L1\n', '    to: L3\n', ['layer-order «L3»'], undefined],
  [
    'a span that does not reach',
    '    to: L1\n',
    '    to: L1\n    span: [L2, L6]\n',
    ['layer-order «[L2, L6]»'],
    undefined,
  ],
  ['a from that is not reached', '    to: L1\n', '    from: L6\n    to: L1\n', ['layer-order «L6»'], undefined],
])('layers: %s', (_, from, to, expected, dive) => {
  let channel = changed(from, to);
  if (dive) channel = changed('    backdrill', dive, channel);
  expect(findingsOf(exampleTexts({ channel }))).toEqual(expected);
});

test('two traces on two layers, and a trace of another stackup, each one finding', () => {
  const other = changed(
    'stackups:\n',
    'stackups:\n  thin:\n    - { copper: L1, thickness: 45 um }\n    - { dielectric: d1, material: core, thickness: 95 um }\n    - { copper: L2, thickness: 17 um, plane: true }\n',
    exampleTexts()['boards/sled.parts.yaml'],
  );
  const path = (second: string) => `
  - { trace: a, stackup: main, layer: L1, length: 5 mm, impedance: 100 ohm }
  - ${second}
`;
  expect(
    findingsOf(withPath(path('{ trace: b, stackup: main, layer: L3, length: 5 mm, impedance: 100 ohm }'))),
  ).toEqual(['layer-order «L3»']);
  expect(
    findingsOf(
      withPath(path('{ trace: b, stackup: thin, layer: L1, length: 5 mm, impedance: 100 ohm }'), { parts: other }),
    ),
  ).toEqual(['layer-order «thin»']);
  expect(
    findingsOf(
      withPath(
        path(
          '{ cable: x, length: 1 m, impedance: 100 ohm, delay: 4 ns/m, loss: 2 dB/m @ 5 GHz }\n  - { trace: b, stackup: thin, layer: L1, length: 5 mm, impedance: 100 ohm }',
        ),
        { parts: other },
      ),
    ),
  ).toEqual([]);
});

test('a capacitor sits on an outer layer', () => {
  const texts = withPath(`
  - { trace: a, stackup: main, layer: L3, length: 5 mm, impedance: 100 ohm }
  - { capacitor: c, value: 100 nF }
  - { trace: b, stackup: main, layer: L3, length: 5 mm, impedance: 100 ohm }
`);
  expect(findingsOf(texts)).toEqual(['layer-order «capacitor: c»']);
});

test('defaults of the format', () => {
  const { model } = exampleModel({
    'a/short.channel.yaml':
      'lanewright: 1\nline-rate: 10 Gb/s\nmodulation: PAM4\nsignalling: single-ended\ncoding: 8b10b\ntransmitter: {}\nreceiver: {}\npath:\n  - { stub: s, length: 1 mm, impedance: 50 ohm, dk: 3.6 }\n',
  });
  expect(model).toMatchObject({
    title: 'short',
    symbolRate: 5e9,
    nyquistFrequency: 2.5e9,
    unitInterval: 2e-10,
    targetBer: 1e-12,
    longestRun: 5,
    referenceOhms: 50,
    temperatureCelsius: 20,
  });
  expect(model.transmitter).toMatchObject({
    riseTimeSeconds: 5e-11,
    impedanceOhms: 50,
    capacitanceFarads: 0,
    taps: [1],
    mainTap: 0,
    randomJitterSeconds: 0,
  });
  expect(model.receiver).toMatchObject({ bandwidthHz: 3.75e9, noiseVolts: 0, ctle: 'none', dfe: { taps: 0 } });
  expect(model.reports).toEqual([]);
});

test.each(['gap: 140 um', 'skew: 1 ps', 'common-impedance: 25 ohm'])('single-ended channels have no `%s`', (key) => {
  const texts = {
    'a.channel.yaml': `lanewright: 1\nline-rate: 1 Gb/s\nsignalling: single-ended\npath:\n  - { trace: t, length: 5 mm, impedance: 50 ohm, delay: 6 ps/mm, loss: 3 dB/m @ 1 GHz, ${key} }\n`,
  };
  expect(findingsOf(texts)).toEqual([`schema «${key.split(':')[0]}»`]);
});

test('a newer version: one finding, nothing computed', () => {
  const texts = exampleTexts({ channel: changed('lanewright: 1', 'lanewright: 2') });
  expect(findingsOf(texts)).toEqual(['format-version «2»']);
  expect(exampleModel(texts).model.computable).toBe(false);
});

test('a parts file of a newer version is one finding, in that file', () => {
  const texts = exampleTexts({
    parts: changed('lanewright: 1', 'lanewright: 2', exampleTexts()['boards/sled.parts.yaml']),
  });
  expect(findingsOf(texts)).toEqual(['format-version «2»']);
});

test.each([499, 500, 501, 50000])('%i elements', (count) => {
  const channel = `lanewright: 1\nline-rate: 1 Gb/s\npath:\n${Array.from({ length: count }, (_, i) => `  - { stub: s${i}, length: 1 mm, impedance: 50 ohm, dk: 3.6 }\n`).join('')}`;
  const texts = { 'a.channel.yaml': channel };
  const rules = reportsIn(texts).map(({ rule }) => rule);
  if (channel.length > 1024 * 1024) expect(rules[0]).toBe('limit');
  else expect(rules).toEqual(count > 500 ? ['limit'] : []);
  expect(exampleModel(texts).model.computable).toBe(count <= 500);
});

test('the same values give the same model, wherever they stand in the text', () => {
  const { model } = exampleModel();
  const { model: moved } = exampleModel(
    exampleTexts({ channel: `# a comment\n${changed('path:\n', '\n\npath: # more\n\n')}` }),
  );
  expect(moved).toEqual(model);
});

test('a file that could not be read says why, and a text that is too large says nothing else', () => {
  const reportsOf = (content: FileContent) => {
    const inputs = { file: 'a.channel.yaml', files: new Map([['a.channel.yaml', content]]), today: '2026-12-01' };
    const parsed = parsedOf(inputs);
    const texts = [...parsed.values()].flatMap(({ reports }) => reports);
    return [...texts, ...buildModel(inputs, parsed).reports].map(({ rule, message }) => [rule, message]);
  };
  expect(reportsOf({ kind: 'too-large', bytes: 2 ** 20 + 1, limit: 2 ** 20 })).toEqual([
    ['limit', '`a.channel.yaml` is not read: it is larger than 1 MiB.'],
  ]);
  expect(reportsOf({ kind: 'refused', reason: 'it is a link that leads out of the folder that is open' })).toEqual([
    ['refused-file', '`a.channel.yaml` is not read: it is a link that leads out of the folder that is open.'],
  ]);
  expect(reportsOf({ kind: 'missing' })).toEqual([['missing-file', 'This file is not there.']]);
  expect(reportsOf({ kind: 'text', text: `#${' '.repeat(2 ** 20)}` }).map(([rule]) => rule)).toEqual(['limit']);
});

test.each([
  ['rules:\n  skew: off\n', ['schema «rules»']],
  ['lanewright: 1\nrule:\n  skew: off\n', ['schema «rule»']],
  ['lanewright: 1\nrules: off\n', ['schema «off»']],
  ['lanewright: 2\n', ['format-version «2»']],
  ['', ['schema «»']],
  ['lanewright: 1\nx-team: 3\nrules: { skew: off }\n', []],
])('the configuration %j is held against its schema', (text, findings) => {
  expect(findingsOf({ 'lanewright.config.yaml': text })).toEqual(findings);
});

test.each([
  ['an element', '  - stub: test-point\n    length: 0.9 mm\n', '  - length: 0.9 mm\n    stub: test-point\n', 'stub'],
  ['a limit', '  - eye: main\n    height: 40 mV\n', '  - height: 40 mV\n    eye: main\n', 'eye'],
])('the kind of %s that does not stand first is one finding, whose fix moves it', (_, first, later, kind) => {
  const found = reportsIn(exampleTexts({ channel: changed(first, later) }));
  expect(found.map(({ rule, marked }) => `${rule} ${marked}`)).toEqual([`schema ${kind}`]);
  expect(found[0].fixes).toMatchObject([{ preferred: true, safe: true, edits: [{ op: 'first' }] }]);
});
test('a kind stands first behind what is merged and what is ignored', () => {
  const base = changed('  - stub: test-point\n', '  - x-probe: 4\n    stub: test-point\n');
  expect(findingsOf(exampleTexts({ channel: base }))).toEqual([]);
  const merged = changed(
    '  - stub: test-point\n    length: 0.9 mm\n    impedance: 50 ohm\n',
    '  - <<: { length: 0.9 mm, impedance: 50 ohm }\n    stub: test-point\n',
  );
  expect(findingsOf(exampleTexts({ channel: merged }))).toEqual([]);
});

test('two stackups that meet are one finding, at the element in this file', () => {
  const rise = '  - via: rise\n    part: sled.through-via\n    to: L1\n';
  const parts = partsText
    .replace(
      '\nparts:',
      '\nparts:\n  other-via: { kind: via, stackup: other, drill: 0.25 mm, antipad: 0.75 mm, pitch: 0.8 mm }',
    )
    .replace(
      '\nstackups:',
      `\nstackups:\n  other: [{ copper: L1, thickness: 35 um }, { dielectric: d1, material: core, thickness: 0.2 mm }, { copper: L3, thickness: 35 um }]`,
    );
  const channel = changed(rise, '  - via: rise\n    part: sled.other-via\n    to: L1\n');
  const found = reportsIn(exampleTexts({ channel, parts }));
  expect(found.map(({ rule, at, marked }) => [rule, at.file, marked])).toEqual([
    ['layer-order', 'lanes/camera.channel.yaml', 'via: rise'],
  ]);
});

test('the kind of a stackup’s row that does not stand first is one finding', () => {
  const parts = partsText.replace('{ copper: L3, thickness: 17 um,', '{ thickness: 17 um, copper: L3,');
  expect(parts).not.toBe(partsText);
  expect(findingsOf(exampleTexts({ parts }))).toEqual(['schema «copper»']);
});
