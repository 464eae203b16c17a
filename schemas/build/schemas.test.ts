import { readFileSync } from 'node:fs';
import Ajv from 'ajv/dist/2020';
import { describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { channelText, configText, partsText } from '../../src-core/format/documents.fixture';
import { readQuantity } from '../../src-core/quantity/read';
import { readBand } from '../../src-core/quantity/read-band';
import { formatSchemas } from '../format/index';
import type { NodeSchema } from '../format/node';
import { unitTable } from '../format/units';
import { plain } from './plain';
import { publishedSchemas } from './published';
import { formatReference } from './reference';
import { vocabulary } from './validators';

const folder = new URL('../', import.meta.url);
const published = publishedSchemas();

/** As a schema-aware editor would check it: our own keywords say nothing to it. */
const ajv = new Ajv({ strict: false, allErrors: true });
ajv.addVocabulary(vocabulary);
const validators = new Map(Object.entries(published).map(([name, schema]) => [name, ajv.compile(schema)]));

function problemsOf(name: keyof typeof published, value: unknown): string[] {
  const validate = validators.get(name)!;
  validate(value);
  return (validate.errors ?? []).map(({ instancePath, keyword }) => `${instancePath} ${keyword}`);
}

describe('the published schemas', () => {
  test('are valid JSON Schema and take full documents', () => {
    expect(new Ajv({ strict: false }).validateSchema(published.channel)).toBe(true);
    expect(problemsOf('channel', parse(channelText))).toEqual([]);
    expect(problemsOf('parts', parse(partsText))).toEqual([]);
    expect(problemsOf('config', parse(configText))).toEqual([]);
  });

  test('choose the schema of an entry by its kind', () => {
    const channel = { lanewright: 1, 'line-rate': '10 Gb/s' };
    expect(problemsOf('channel', { ...channel, path: [{ trace: 'a', drill: '1 mm' }] })).toContain(
      '/path/0 additionalProperties',
    );
    expect(problemsOf('channel', { ...channel, path: [{ via: 'a', drill: '1 mm' }] })).toEqual([]);
    expect(problemsOf('channel', { ...channel, path: [{ drill: '1 mm' }] })).toContain('/path/0 anyOf');
    const limits = [{ eye: 'main', min: '1 dB' }];
    expect(problemsOf('channel', { ...channel, path: [], limits })).toContain('/limits/0 additionalProperties');
    expect(problemsOf('parts', { lanewright: 1, parts: { a: { kind: 'via', width: '1 mm' } } })).toContain(
      '/parts/a additionalProperties',
    );
    expect(problemsOf('parts', { lanewright: 1, stackups: { main: [{ copper: 'L1' }] } })).toContain(
      '/stackups/main/0 required',
    );
  });
});

test('the committed files are what the format gives', () => {
  const committed = (file: string) => readFileSync(new URL(file, folder), 'utf8');
  for (const [name, schema] of Object.entries(published))
    expect(JSON.parse(committed(`${name}.schema.json`))).toEqual(schema);
  expect(committed('README.md')).toBe(formatReference(committed('format/meanings.md')));
});

/** Every key of every mapping, inner ones too. */
function keysIn(node: NodeSchema, path: string): [string, NodeSchema][] {
  const own = Object.entries(node.properties ?? {}).map(([key, child]): [string, NodeSchema] => [
    `${path}.${key}`,
    child,
  ]);
  const inner = [
    ...own,
    ...Object.entries(node.patternProperties ?? {}).filter(([pattern]) => pattern !== '^x-'),
    ...(node.anyOf ?? []).map((branch): [string, NodeSchema] => [path, branch]),
  ];
  return [...own, ...inner.flatMap(([name, child]) => keysIn(child, name))];
}
const allKeys = Object.entries(formatSchemas).flatMap(([name, schema]) => keysIn(plain(schema) as NodeSchema, name));

test('every key is described', () => {
  expect(allKeys.length).toBeGreaterThan(200);
  expect(allKeys.filter(([, node]) => !node.description).map(([path]) => path)).toEqual([]);
});

test('every quantity has an example and a default that its own specification takes', () => {
  const quantities = allKeys.filter(([, node]) => node['x-quantity']);
  expect(quantities.length).toBeGreaterThan(100);
  for (const [path, node] of quantities) {
    const spec = node['x-quantity']!;
    const byDefault =
      /^[0-9]/.test(node['x-default'] ?? '') && !/×|,/.test(node['x-default']!) ? [node['x-default']] : [];
    const examples = [...(node.examples ?? []), ...byDefault.filter((text) => text !== '0' && text !== '0.25 UI')];
    expect(examples.length, path).toBeGreaterThan(0);
    for (const example of examples as string[]) {
      for (const text of example.startsWith('[') ? (parse(example) as string[]) : [example]) {
        const { problem } = spec.band ? readBand(text, spec) : readQuantity(text, spec);
        expect(problem, `${path}: ${text}`).toBeUndefined();
      }
    }
  }
});

test('the reference names every key and every unit', () => {
  const reference = formatReference('');
  for (const [path] of allKeys) expect(reference).toContain(`\`${path.slice(path.lastIndexOf('.') + 1)}\``);
  for (const { text } of unitTable) expect(reference).toContain(`\`${text}\``);
});
