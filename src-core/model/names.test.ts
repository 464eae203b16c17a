import { expect, test } from 'vitest';
import { channelText, exampleModel, exampleTexts, partsText } from './fixtures';
import { changed, findingsOf, reportsIn } from './testing';

/** The example with a second parts file `ctrl`. */
const withSecond = (second: string, channel = channelText) =>
  exampleTexts({
    channel: changed('use:\n', 'use:\n  ctrl: ../boards/ctrl.parts.yaml\n', channel),
    'boards/ctrl.parts.yaml': second,
  });

test('prefixes may be left out while one file has the name', () => {
  expect(findingsOf(exampleTexts({ channel: channelText.replaceAll('sled.main', 'main') }))).toEqual([]);
  const { model } = exampleModel();
  expect(model.names.stackups.map(({ writtenAs }) => writtenAs)).toEqual([['sled.main', 'main']]);
  expect(model.names.parts.map(({ name, kind }) => [name, kind])).toEqual([
    ['through-via', 'via'],
    ['sled-mate', 'connector'],
  ]);
});

test('a name in two files is ambiguous: both places, a fix for each', () => {
  const texts = withSecond(partsText, changed('stackup: sled.main', 'stackup: main'));
  const [report, ...rest] = reportsIn(texts);
  expect(rest).toEqual([]);
  expect(report).toMatchObject({ rule: 'ambiguous-name', marked: 'main', subject: 'breakout' });
  expect(report.related?.map(({ at }) => at.file)).toEqual(['boards/ctrl.parts.yaml', 'boards/sled.parts.yaml']);
  expect(report.fixes?.map(({ title }) => title)).toEqual(['Write `ctrl.main`', 'Write `sled.main`']);
});

test.each([
  ['stackup', 'stackup: sled.main', 'stackup: sled.mian', 'sled.mian'],
  ['part', 'part: sled.sled-mate', 'part: sled.sled-mat', 'sled.sled-mat'],
  ['prefix', 'part: sled.sled-mate', 'part: sle.sled-mate', 'sle.sled-mate'],
  ['owner', 'owner: sled board', 'owner: sled bord', 'sled bord'],
  ['element of a limit', 'between: [breakout, twinax]', 'between: [breakot, twinax]', 'breakot'],
])('an unknown %s: one finding, the near name as fix', (_, from, to, marked) => {
  const reports = reportsIn(exampleTexts({ channel: changed(from, to) }));
  expect(reports.map((report) => [report.rule, report.marked])).toEqual([['unknown-name', marked]]);
  expect(reports[0].fixes?.[0].preferred).toBe(true);
});

test.each([
  ['material', 'material: core, thickness: 95 um', 'material: cor, thickness: 95 um'],
  ['foil', 'thickness: 45 um, foil: low-profile', 'thickness: 45 um, foil: low'],
])('an unknown %s is one finding, in the parts file', (_, from, to) => {
  const reports = reportsIn(exampleTexts({ parts: changed(from, to, partsText) }));
  expect(reports.map(({ rule, at }) => [rule, at.file])).toEqual([['unknown-name', 'boards/sled.parts.yaml']]);
});

test('used names are not passed on', () => {
  const texts = {
    'a.channel.yaml': 'lanewright: 1\nline-rate: 1 Gb/s\nuse: { b: b.parts.yaml }\npath:\n  - { via: v, part: c.p }\n',
    'b.parts.yaml': 'lanewright: 1\nuse: { c: c.parts.yaml }\n',
    'c.parts.yaml': 'lanewright: 1\nparts: { p: { kind: via, drill: 0.2 mm } }\n',
  };
  expect(findingsOf(texts)).toEqual(['unknown-name «c.p»']);
});

test('a cycle of `use` is told at both places', () => {
  const texts = {
    'a.channel.yaml':
      'lanewright: 1\nline-rate: 1 Gb/s\nuse: { b: b.parts.yaml }\npath:\n  - { stub: s, length: 1 mm, impedance: 50 ohm, dk: 3 }\n',
    'b.parts.yaml': 'lanewright: 1\nuse: { c: c.parts.yaml }\n',
    'c.parts.yaml': 'lanewright: 1\nuse: { back: b.parts.yaml }\n',
  };
  const reports = reportsIn(texts);
  expect(reports.map(({ rule, at, related }) => [rule, at.file, related?.map((one) => one.at.file)])).toEqual([
    ['use-cycle', 'b.parts.yaml', ['c.parts.yaml']],
    ['use-cycle', 'c.parts.yaml', ['b.parts.yaml']],
  ]);
});

test('a file that is missing or refused is one finding; what it may hold is not called unknown', () => {
  const gone = changed('../boards/sled.parts.yaml', '../boards/gone.parts.yaml');
  expect(findingsOf(exampleTexts({ channel: gone }))).toEqual(['missing-file «../boards/gone.parts.yaml»']);
  const out = changed('../boards/sled.parts.yaml', '../../../sled.parts.yaml');
  expect(findingsOf(exampleTexts({ channel: out }))).toEqual(['refused-file «../../../sled.parts.yaml»']);
});

test('a name twice among elements and limits: both places, a free name as fix', () => {
  const reports = reportsIn(exampleTexts({ channel: changed('eye: main', 'eye: breakout') }));
  expect(reports.map(({ rule, marked }) => [rule, marked])).toEqual([['duplicate-name', 'breakout']]);
  expect(reports[0].related?.[0].at.path).toEqual(['path', 1, 'trace']);
  expect(reports[0].fixes?.[0].title).toBe('Rename this one to `breakout-1`');
});

test('a part of another kind is told, with both places', () => {
  const reports = reportsIn(exampleTexts({ channel: changed('connector: sled-mate', 'cable: sled-mate') }));
  expect(reports.map(({ rule, marked }) => [rule, marked])).toEqual([['schema', 'sled.sled-mate']]);
});

test('`between` against the direction of the path', () => {
  const reports = reportsIn(exampleTexts({ channel: changed('[breakout, twinax]', '[twinax, breakout]') }));
  expect(reports.map(({ rule, marked }) => [rule, marked])).toEqual([['limit-order', '[twinax, breakout]']]);
  expect(reports[0].fixes?.[0].edits).toMatchObject([{ op: 'value', text: '[breakout, twinax]' }]);
});

test('`__proto__` and `constructor` are names like any other', () => {
  for (const name of ['__proto__', 'constructor', 'toString']) {
    expect(findingsOf(exampleTexts({ channel: changed('part: sled.sled-mate', `part: sled.${name}`) }))).toEqual([
      `unknown-name «sled.${name}»`,
    ]);
    expect(findingsOf(exampleTexts({ channel: changed('capacitor: coupling', `capacitor: ${name}`) })).length).toBe(
      name === 'constructor' ? 0 : 1,
    );
    expect(findingsOf(exampleTexts({ channel: changed('    esl: 0.3 nH', `    ${name}: 0.3 nH`) }))).toEqual([
      `schema «${name}»`,
    ]);
  }
});

test.each([
  ['two coppers in a row', '    - { dielectric: d1, material: core, thickness: 95 um }\n', '', 'schema'],
  ['a layer twice', 'copper: L3', 'copper: L1', 'duplicate-name'],
  [
    'a mask inside',
    '    - { mask: top, material: mask, thickness: 20 um }\n    - { copper: L1, thickness: 45 um, foil: low-profile }\n',
    '    - { copper: L1, thickness: 45 um, foil: low-profile }\n    - { mask: top, material: mask, thickness: 20 um }\n',
    'schema',
  ],
  [
    'a dielectric outside',
    '    - { mask: bottom, material: mask, thickness: 20 um }\n',
    '    - { dielectric: d7, material: core, thickness: 20 um }\n',
    'schema',
  ],
])('a stackup with %s: one finding', (_, from, to, rule) => {
  const reports = reportsIn(exampleTexts({ parts: changed(from, to, partsText) }));
  expect(reports.map((report) => report.rule)).toEqual([rule]);
});

test('materials in both directions, foils with spheres', () => {
  const { model } = exampleModel(exampleTexts({ parts: changed('{ rms: 0.6 um }', '{ rz: 5 um }', partsText) }));
  const layers = model.elements[1].stackup!.layers;
  expect(layers[2]).toMatchObject({
    material: { dkThrough: { value: 3.37, atHz: 10e9 }, dkInPlane: { value: 3.6 }, df: { value: 0.004 } },
  });
  // Check value M-13: ball radius 0.29893 um, limit of the factor 1 + 84 pi/36 (Simonovich, DesignCon 2015).
  const foil = layers[1].type === 'copper' ? layers[1].foil : undefined;
  expect(foil?.roughness.kind === 'huray' && foil.roughness.radiusMeters * 1e6).toBeCloseTo(0.29893, 5);
  expect(foil?.roughness.kind === 'huray' && 1 + 1.5 * foil.roughness.ratio).toBeCloseTo(8.33038, 5);
});

test('in place of an unknown part those of the element’s kind are offered', () => {
  const [report] = reportsIn(exampleTexts({ channel: changed('part: sled.sled-mate', 'part: zebra') }));
  expect(report.message).toBe('There is no part `zebra`; there is `sled.sled-mate`.');
  expect(report.fixes?.map(({ title }) => title)).toEqual(['Change to `sled.sled-mate`']);
});
