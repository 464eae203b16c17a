import { XMLParser, XMLValidator } from 'fast-xml-parser';
import { expect, test } from 'vitest';
import { visible } from './escape';
import { junit } from './junit';
import { analysed, HOSTILE, HOSTILE_FILE, hostileChannel, plainChannel, printed } from './testing';
import type { PrinterContext } from './types';

type Attributes = Readonly<Record<string, string>>;
interface Suite {
  readonly attributes: Attributes;
  readonly properties: Attributes;
  readonly cases: readonly {
    readonly attributes: Attributes;
    readonly state: string;
    readonly message?: string;
    readonly type?: string;
    readonly text: string;
  }[];
}

/** Read back by someone else's parser, which refuses what is not well-formed. */
function read(xml: string): { attributes: Attributes; suites: Suite[] } {
  expect(XMLValidator.validate(xml)).toBe(true);
  const parser = new XMLParser({
    ignoreAttributes: false,
    attributeNamePrefix: '',
    attributesGroupName: '$',
    parseAttributeValue: false,
    parseTagValue: false,
    trimValues: false,
    isArray: (name) => ['testsuite', 'testcase', 'property'].includes(name),
  });
  const { testsuites } = parser.parse(xml) as { testsuites: { $: Attributes; testsuite?: Parsed[] } };
  const suites = (testsuites.testsuite ?? []).map(({ $, properties, testcase }) => ({
    attributes: $,
    properties: Object.fromEntries((properties?.property ?? []).map(({ $: { name, value } }) => [name, value])),
    cases: testcase.map(caseOf),
  }));
  return { attributes: testsuites.$, suites };
}

/** How the parser gives a suite and a case. */
interface Parsed {
  readonly $: Attributes;
  readonly properties?: { readonly property: readonly { readonly $: Attributes }[] };
  readonly testcase: readonly ParsedCase[];
}
type ParsedCase = { readonly $: Attributes } & Readonly<
  Record<
    'failure' | 'skipped' | 'system-out',
    string | { readonly $?: Attributes; readonly '#text'?: string } | undefined
  >
>;

function caseOf(one: ParsedCase): Suite['cases'][number] {
  const state = (['failure', 'skipped', 'system-out'] as const).find((name) => name in one)!;
  const inner = one[state]!;
  return typeof inner === 'string'
    ? { attributes: one.$, state, text: inner }
    : { attributes: one.$, state, message: inner.$?.message, type: inner.$?.type, text: inner['#text'] ?? '' };
}

const suiteOf = (change: (text: string) => string, context?: Partial<PrinterContext>) =>
  read(printed(junit, [plainChannel(change)], context)).suites[0];

test('a limit is a case under one name, met or missed', () => {
  const good = suiteOf((text) => text);
  expect(good.cases.map(({ attributes, state }) => [attributes.name, state])).toEqual([
    ['insertion-loss: whole', 'system-out'],
    ['return-loss: match', 'system-out'],
    ['eye: main', 'system-out'],
  ]);
  expect(good.properties.title).toBe('Rule example');
  const bad = suiteOf((text) => text.replace('max: 12 dB', 'max: 1 dB'));
  expect(bad.cases.map(({ attributes, state }) => [attributes.name, state]).sort()).toEqual([
    ['eye: main', 'system-out'],
    ['insertion-loss: whole', 'failure'],
    ['return-loss: match', 'system-out'],
  ]);
  const missed = bad.cases.find(({ state }) => state === 'failure')!;
  expect(missed.attributes).toMatchObject({ classname: 'lane.channel.yaml', file: 'lane.channel.yaml', line: '18' });
  expect(missed.message).toMatch(/^`whole` loses .* more than the 1 dB of its limit\.$/);
  expect(missed.type).toBe('insertion-loss');
  expect(bad.attributes).toMatchObject({ tests: '3', failures: '1', errors: '0', skipped: '0' });
});

test('failed is what makes the status 1', () => {
  const long = (text: string) => text.replace('board.hole }', 'board.long-hole }');
  const state = (suite: Suite) =>
    suite.cases.find(({ attributes }) => attributes.name === 'stub-resonance: dive')?.state;
  expect(state(suiteOf(long))).toBe('system-out');
  expect(state(suiteOf(long, { failing: new Set(['error', 'warning']) }))).toBe('failure');
});

test('an accepted finding is skipped, with reason, name and date', () => {
  const [suite] = read(printed(junit, [analysed(hostileChannel({ waived: true }))])).suites;
  const skipped = suite.cases.filter(({ state }) => state === 'skipped');
  expect(skipped).toHaveLength(1);
  expect(skipped[0].message).toContain(`(accepted by ${visible(HOSTILE)} until 2099-01-01: ${visible(HOSTILE)})`);
});

test('totals are sums of the suites; a file that says nothing is one case', () => {
  const parts = analysed('lanewright: 1\n', 'empty.parts.yaml');
  const { attributes, suites } = read(
    printed(junit, [plainChannel((text) => text.replace('max: 12 dB', 'max: 1 dB')), parts]),
  );
  expect(attributes).toEqual({ name: 'lanewright check', tests: '4', failures: '1', errors: '0', skipped: '0' });
  expect(suites[1].cases.map(({ attributes: { name } }) => name)).toEqual(['findings']);
  expect(read(printed(junit, [])).suites).toEqual([]);
});

test('hostile text is text: read back it is what was written, made visible', () => {
  const out = printed(junit, [analysed(hostileChannel())]);
  const [suite, ...others] = read(out).suites;
  expect(others).toEqual([]);
  expect(suite.attributes.name).toBe(visible(HOSTILE_FILE));
  expect(suite.properties.title).toBe(visible(HOSTILE));
  const names = suite.cases.map(({ attributes }) => attributes.name);
  expect(names).toContain(`eye: ${visible(HOSTILE)}`);
  expect(new Set(names).size).toBe(names.length);
  expect(out.replaceAll('\n', '')).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]|##\[/);
});
