import { expect, test } from 'vitest';
import { parse } from 'yaml';
import type { ElementKindName, EntryListName, SchemaName } from '../../schemas/format/types';
import { channelText, configText, partsText } from './documents.fixture';
import { entryKind, missingKeys, readValues } from './index';

type Document = Record<string, Record<string, unknown>[]>;

/** An entry as the model reads it. */
function readEntry(list: EntryListName, entry: unknown) {
  const chosen = entryKind(list, entry);
  if (chosen.problem) return { kind: '', values: {}, problems: [chosen.problem] };
  return { kind: chosen.kind, ...readValues(chosen.schema, entry) };
}

const lists: [EntryListName, string][] = [
  ['elements', 'path'],
  ['limits', 'limits'],
  ['waivers', 'waivers'],
];

test('every key of a full channel is read without a problem', () => {
  const document = parse(channelText) as Document;
  const { values, problems } = readValues('channel', document);
  expect(problems).toEqual([]);
  expect(values['line-rate']).toMatchObject({ value: 25.78125e9, unit: 'Gb/s' });
  expect(values.transmitter?.ffe).toEqual({ pre: [-0.06], main: 0.82, post: [-0.12] });
  expect(values.owners?.['sled board']).toMatchObject({ value: 12, at: 'nyquist' });
  for (const [list, key] of lists) {
    for (const entry of document[key]) expect(readEntry(list, entry).problems, JSON.stringify(entry)).toEqual([]);
  }
});

test('no element of a full channel lacks a key', () => {
  const document = parse(channelText) as Document;
  const elements = document.path
    .map((entry) => readEntry('elements', entry))
    .filter(({ values }) => !('part' in values));
  expect(elements.length).toBeGreaterThan(9);
  for (const { kind, values } of elements)
    expect(missingKeys(kind as ElementKindName, values, false), kind).toEqual([]);
});

test('every key of a parts file is read without a problem', () => {
  const document = parse(partsText);
  const { values, problems } = readValues('parts', document);
  expect(problems).toEqual([]);
  expect(values.materials?.['core-m6'].dk).toMatchObject({ value: 3.37, at: 10e9 });
  expect(values.foils?.['low-profile'].roughness?.rms).toMatchObject({ value: 0.6e-6 });
  for (const row of document.stackups.main) expect(readEntry('stackup-rows', row).problems).toEqual([]);
  for (const part of Object.values(document.parts)) expect(readEntry('parts', part).problems).toEqual([]);
});

test('a configuration is read without a problem', () => {
  expect(readValues('config', parse(configText)).problems).toEqual([]);
});

test.each<[SchemaName, string, string]>([
  ['receiver', 'ctle: { dc-gain: -6 dB, zero: 6.45 GHz, poles: [6.45 GHz, 25.8 GHz] }', 'ctle'],
  ['channel', 'coding: { longest-run: 66 }', 'coding'],
  ['material', 'dk: { through: 3.37 @ 10 GHz, in-plane: 3.6 @ 10 GHz }', 'dk'],
  ['foil', 'roughness: { rz: 3 um }', 'roughness'],
  ['foil', 'roughness: { huray: { radius: 0.5 um, ratio: 2.1 } }', 'roughness'],
  ['via', 'span: [L1, L4]', 'span'],
  ['trace', 'skew: 0.2 mm', 'skew'],
  ['trace', 'net: [CAM0_P, CAM0_N]', 'net'],
  ['eye', 'width: 3 ps', 'width'],
])('%s takes `%s`', (schema, text, key) => {
  const { values, problems } = readValues(schema, parse(text));
  expect(problems.filter(({ path }) => path.length > 0)).toEqual([]);
  expect(values).toHaveProperty([key]);
});
