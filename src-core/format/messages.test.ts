import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parse } from 'yaml';
import type { EntryListName, SchemaName } from '../../schemas/format/types';
import { entryKind, keySchemaAt, keysAt, keysOf, missingKeyProblems, missingKeys, readValues, reportOf } from './index';

const ownName = new Set<SchemaName>(['trace', 'stub', 'cable', 'package', 'return-loss']);

/** Each problem as `path: message → fix / fix`. */
function said(schema: SchemaName, text: string, options = {}): string[] {
  const named = ownName.has(schema) ? { [schema]: 'a' } : {};
  const raw = Object.assign(Object.create(null), named, parse(text));
  return readValues(schema, raw, options).problems.map(({ path, message, fixes }) => {
    const titles = fixes.map(({ title }) => title).join(' / ');
    return `${path.join('.')}: ${message}${titles && ` → ${titles}`}`;
  });
}

test.each<[SchemaName, string, string]>([
  ['trace', 'lenght: 42 mm', 'lenght: `lenght` is not a key of a trace; did you mean `length`? → Change to `length`'],
  ['trace', 'zebra: 1', 'zebra: `zebra` is not a key of a trace. → Remove `zebra`'],
  ['trace', 'weave: 1', 'weave: `weave` is not used in this version. → Remove `weave`'],
  ['trace', 'length: 100 ohm', 'length: A length is wanted; `100 ohm` is an impedance.'],
  [
    'trace',
    'length: 42',
    'length: A length needs a unit: `42` could be in `mm`, `um`, `mil`, `in` or `cm`. → Write `42 mm` / Write `42 um` / Write `42 mil` / Write `42 in` / Write `42 cm`',
  ],
  ['trace', 'length: 42 Mm', 'length: Units keep their case, as in SI: `Mm` is written `mm`. → Write `mm`'],
  ['trace', 'length: 3,37 mm', 'length: Decimals are written with a point: `3,37` is `3.37`. → Write `3.37`'],
  [
    'trace',
    'length:',
    'length: `length` has no value yet; for example `168 mm ± 2 mm`. → Write the example `168 mm ± 2 mm`',
  ],
  ['stub', 'length:', 'length: `length` has no value yet; for example `0.9 mm`. → Write the example `0.9 mm`'],
  ['cable', 'length:', 'length: `length` has no value yet; for example `0.5 m`. → Write the example `0.5 m`'],
  [
    'package',
    'len:',
    'len: `len` is not a key of a package; did you mean `length`? → Write `length` with the example `14 mm`',
  ],
  ['trace', 'len: 4 mm', 'len: `len` is not a key of a trace. → Remove `len`'],
  ['trace', 'length: [1 mm]', 'length: `length` is a length, as `168 mm ± 2 mm`; this is a list.'],
  ['trace', 'length: { a: 1 }', 'length: `length` is a length, as `168 mm ± 2 mm`; this is a mapping.'],
  ['trace', 'trace:', 'trace: This trace has no name yet: write `trace: trace-1` or a better one. → Write `trace-1`'],
  [
    'trace',
    'trace: Main Run',
    'trace: `Main Run` cannot be a name: names are lower-case letters, digits and dashes, with a letter first, as `main-run`. → Change to `main-run`',
  ],
  [
    'trace',
    'trace: "on"',
    'trace: `on` cannot be a name: YAML readers take it for a value. Write for example `on-1`. → Change to `on-1`',
  ],
  ['trace', 'note: 4', 'note: `note` is text; this is `4`. → Write `"4"`'],
  [
    'trace',
    'loss: 1 dB/m @ nyquist',
    'loss: `@ nyquist` is for limits, budgets and owners; an element’s own data holds at a frequency, here `@ 12.890625 GHz`. → Write `@ 12.890625 GHz`',
  ],
  [
    'trace',
    'loss: [1 dB/m @ 1 GHz, 2 dB/m]',
    'loss.1: The frequency is missing at which this holds: `2 dB/m @ 12.890625 GHz`. → Write `@ 12.890625 GHz`',
  ],
  [
    'trace',
    '{ delay: 7 ps/mm, velocity: 0.6 c }',
    'velocity: `delay` and `velocity` say the same thing: keep one. → Remove `delay` / Remove `velocity`',
  ],
  ['trace', 'net: CAM_P', 'net: `net` is a list of 1 to 2 entries; this is `CAM_P`. → Write `[CAM_P]`'],
  ['trace', 'reversed: 1', 'reversed: `reversed` is `true` or `false`; this is `1`. → Write `true` / Write `false`'],
  ['trace', '"__proto__": 1', '__proto__: `__proto__` is not a key of a trace. → Remove `__proto__`'],
  ['trace', 'constructor: 1', 'constructor: `constructor` is not a key of a trace. → Remove `constructor`'],
  [
    'copper',
    '{ copper: L 1, thickness: 45 um }',
    'copper: `L 1` cannot be a layer’s name: letters, digits, `_`, `.` and `-`, with a letter or digit first, as `L-1`. → Change to `L-1`',
  ],
  [
    'foil',
    'roughness: 0.6 um',
    'roughness: `roughness` is a mapping with `rms`, `rz` or `huray`; this is `0.6 um`. → Write `{ rms: 0.6 um }` / Write `{ rz: 0.6 um }`',
  ],
  ['foil', 'roughness: { rms: 1 um, rz: 3 um }', 'roughness: `roughness` has one of `rms`, `rz` or `huray`.'],
  [
    'receiver',
    'ctle: { dc-gain: -6 dB, zero: 6.45 GHz, polez: [1 GHz] }',
    'ctle.polez: `polez` is not a key of `ctle`; did you mean `poles`? → Change to `poles`',
  ],
  [
    'receiver',
    'ctle: atuo',
    'ctle: `ctle` is `auto` or a mapping with `dc-gain`, `zero` or `poles`; did you mean `auto`? → Write `auto`',
  ],
  ['receiver', 'dfe: { taps: -1 }', 'dfe.taps: `taps` is a whole number from 0 to 64; this is `-1`.'],
  [
    'material',
    '{ dk: true }',
    'dk: `dk` is a number without unit or a mapping with `through` or `in-plane`, as `3.37 @ 10 GHz`; this is `true`.',
  ],
  [
    'material',
    '{ dk: { through: 3 } }',
    'dk: `dk` lacks `in-plane`, as `in-plane: 3.37 @ 10 GHz`. → Add `in-plane: 3.37 @ 10 GHz`',
  ],
  [
    'return-loss',
    'at: reciever',
    'at: `at` is `transmitter` or `receiver`; did you mean `receiver`? → Write `receiver`',
  ],
  [
    'return-loss',
    'band: 12 GHz to 50 MHz',
    'band: A band goes from a lower to a higher frequency. → Write `50 MHz to 12 GHz`',
  ],
  [
    'waiver',
    '{ rule: eye, at: main, until: soon, by: me, reason: why }',
    'until: `soon` is not how `until` is written, as `2027-03-31`: The last day on which it is accepted, YYYY-MM-DD.',
  ],
  [
    'waiver',
    '{ rule: eye, at: main, until: 2027-03-31, by: me }',
    ': A waiver lacks `reason`, as `reason: replaced in revision C`. → Add `reason: replaced in revision C`',
  ],
  [
    'config',
    'lanewright: 2',
    'lanewright: This file is written in format version 2; this release reads version 1. Nothing is computed.',
  ],
  ['config', 'rules: {}', ': A configuration lacks `lanewright`, as `lanewright: 1`. → Add `lanewright: 1`'],
  [
    'parts',
    '{ lanewright: 1, materials: { Core M6: { dk: 3 } } }',
    'materials.Core M6: `Core M6` cannot be a name: names are lower-case letters, digits and dashes, with a letter first, as `core-m6`. → Change to `core-m6`',
  ],
  ['parts', '{ lanewright: 1, use: [a] }', 'use: `use` is a mapping; this is a list.'],
])('%s with `%s`', (schema, text, expected) => {
  expect(said(schema, text, { nyquistHz: 12.890625e9 })).toEqual([expected]);
});

test('a bad key is left out, the others are kept', () => {
  const { values, problems } = readValues(
    'trace',
    parse('{ trace: a, length: 42, width: 110 um, gap: 1 furlong, zebra: 1 }'),
  );
  expect(Object.keys(values)).toEqual(['trace', 'width']);
  expect(problems.map(({ path }) => path[0])).toEqual(['zebra', 'length', 'gap']);
});

test('an implausible size is said, and read', () => {
  const { values, problems } = readValues('trace', { trace: 'a', length: '42 m' });
  expect(values.length?.value).toBe(42);
  expect(problems.map(({ rule }) => rule)).toEqual(['implausible-quantity']);
});

test('an inner mapping that lacks a key is left out as a whole', () => {
  expect(readValues('receiver', parse('ctle: { dc-gain: -6 dB, zero: 1 parsec, poles: [1 GHz] }')).values).toEqual({});
});

test('keys that begin with `x-` pass, among names too', () => {
  expect(said('parts', '{ lanewright: 1, x-owner: me, materials: { x-note: { any: thing } } }')).toEqual([]);
});

test.each<[EntryListName, unknown, string, string[]]>([
  [
    'elements',
    'tr',
    '`tr` is not an element yet: write its kind and its own name, as `trace: trace-1`.',
    ['Write `trace: trace-1`'],
  ],
  [
    'elements',
    'c',
    '`c` is not an element yet: write its kind and its own name, as `cable: cable-1`.',
    ['Write `cable: cable-1`', 'Write `connector: connector-1`', 'Write `capacitor: capacitor-1`'],
  ],
  [
    'elements',
    { tarce: 'a', length: '1 mm' },
    '`tarce` is no kind of element; did you mean `trace`?',
    ['Change to `trace`'],
  ],
  [
    'elements',
    { trace: 'a', via: 'b' },
    'This entry names `trace` and `via`; an element is of one kind. Is a dash missing before `via`?',
    ['Keep `trace`', 'Keep `via`'],
  ],
  [
    'elements',
    { width: '1 mm' },
    'This entry does not say what it is: an element begins with its kind and own name, as `trace: trace-1`.',
    ['Add `trace: trace-1`'],
  ],
  [
    'elements',
    { lenght: '1 mm', drill: '1 mm' },
    'This entry does not say what it is: an element begins with its kind and own name, as `via: via-1`.',
    ['Add `via: via-1`'],
  ],
  ['limits', { eyes: 'a' }, '`eyes` is no kind of limit; did you mean `eye`?', ['Change to `eye`']],
  [
    'parts',
    { kind: 'conector' },
    '`conector` is no kind of part; did you mean `connector`?',
    ['Change to `connector`'],
  ],
  [
    'parts',
    { drill: '1 mm' },
    'A part says its `kind`: `package`, `trace`, `cable`, `via`, `connector`, `capacitor`, `stub` or `block`.',
    ['Add `kind: via`'],
  ],
  ['waivers', 'eye', 'A waiver is a mapping with `rule`, `at`, `until`, `by` and `reason`; this is `eye`.', []],
])('an entry of %s: %j', (list, entry, message, titles) => {
  const { problem } = entryKind(list, entry);
  expect(problem?.message).toBe(message);
  expect(problem?.fixes.map(({ title }) => title)).toEqual(titles);
});

test('an entry without anything gets a fix for each kind', () => {
  expect(entryKind('elements', null).problem?.fixes).toHaveLength(8);
  expect(entryKind('limits', null).problem?.fixes).toHaveLength(3);
});

test.each([
  [
    'via',
    { drill: 1, stackup: 1 },
    false,
    'This via lacks `antipad` and `pitch`; until then it counts as a straight through.',
  ],
  ['via', { drill: 1, stackup: 1 }, true, 'This via lacks `antipad`; until then it counts as a straight through.'],
  [
    'trace',
    { length: 1, stackup: 1, layer: 1, width: 1 },
    false,
    'This trace lacks `gap`; until then it counts as a straight through.',
  ],
  [
    'trace',
    { length: 1 },
    false,
    'This trace lacks `width` or `impedance`, `stackup` and `layer`; until then it counts as a straight through.',
  ],
  [
    'cable',
    { length: 1, impedance: 1, loss: 1 },
    false,
    'This cable lacks `delay`, `velocity` or `dk`; until then it counts as a straight through.',
  ],
  ['block', {}, false, 'This block lacks `touchstone`; until then it counts as a straight through.'],
] as const)('%s with %j, single-ended %s', (kind, values, singleEnded, message) => {
  expect(missingKeyProblems(kind, missingKeys(kind, values, singleEnded)).map((problem) => problem.message)).toEqual([
    message,
  ]);
});

test.each([
  ['trace', { length: 1, stackup: 1, layer: 1, impedance: 1 }, false],
  ['trace', { length: 1, impedance: 1, delay: 1, loss: 1 }, false],
  ['trace', { length: 1, stackup: 1, layer: 1, width: 1 }, true],
  ['connector', { delay: 1, impedance: 1 }, false],
  ['via', { touchstone: 1 }, false],
] as const)('%s with %j lacks nothing', (kind, values, singleEnded) => {
  expect(missingKeys(kind, values, singleEnded)).toEqual([]);
});

test('a problem becomes a report at a place of the file', () => {
  const [problem] = readValues('trace', { trace: 'a', lenght: '1 mm' }).problems;
  const report = reportOf(problem, { file: 'a.channel.yaml', path: ['path', 2] });
  expect(report.at).toEqual({ file: 'a.channel.yaml', path: ['path', 2, 'lenght'], on: 'key' });
  expect(report.fixes?.[0].edits).toEqual([
    { op: 'key', at: { file: 'a.channel.yaml', path: ['path', 2, 'lenght'] }, name: 'length' },
  ]);
});

test('keys are found by their place', () => {
  expect(keySchemaAt('channel', ['path', 3, 'length'], 'trace')?.quantity?.dimensions).toEqual(['length']);
  expect(keySchemaAt('channel', ['receiver', 'ctle', 'zero'])?.required).toBe(true);
  expect(keySchemaAt('channel', ['limits', 0, 'at'], 'return-loss')?.choices).toEqual(['transmitter', 'receiver']);
  expect(keySchemaAt('parts', ['materials', 'core', 'dk', 'through'])?.type).toBe('quantity');
  expect(keySchemaAt('parts', ['parts', 'mezz', 'delay'], 'connector')?.quantity?.dimensions).toEqual(['time']);
  expect(keySchemaAt('channel', ['path', 3, 'length'], undefined)).toBeUndefined();
  expect(keysAt('parts', ['stackups', 'main', 0], 'copper').map(({ key }) => key)).toContain('plane');
  expect(keysOf('via').map(({ key }) => key)).toContain('backdrill');
});

test('whatever YAML makes, reading returns, with problems inside it', () => {
  const schemas: SchemaName[] = [
    'channel',
    'parts',
    'config',
    'trace',
    'via',
    'receiver',
    'waiver',
    'foil',
    'part-via',
  ];
  const keys = fc.oneof(
    fc.constantFrom('length', 'ctle', 'use', 'materials', 'roughness', '__proto__', 'toString', 'x-a'),
    fc.string(),
  );
  const { tree } = fc.letrec((again) => ({
    tree: fc.oneof(
      fc.string(),
      fc.double(),
      fc.boolean(),
      fc.constant(null),
      fc.array(again('tree'), { maxLength: 4 }),
      fc.dictionary(keys, again('tree'), { maxKeys: 5 }),
    ),
  }));
  fc.assert(
    fc.property(fc.constantFrom(...schemas), tree, (schema, value) => {
      for (const { path, message } of readValues(schema, value).problems) {
        let here: unknown = value;
        for (const step of path) here = (here as Record<string, unknown>)[step];
        expect(message).not.toMatch(/anyOf|oneOf|\bNaN\b|\[object/);
      }
    }),
    { numRuns: 500, seed: 20 },
  );
});

test('a file that lacks a key is marked at its first line, an entry as a whole', () => {
  expect(readValues('channel', {}).problems.map(({ lacks, on }) => [lacks, on])).toEqual([
    ['lanewright', 'value'],
    ['line-rate', 'value'],
    ['path', 'value'],
  ]);
  expect(new Set(readValues('waiver', {}).problems.map(({ on }) => on))).toEqual(new Set(['entry']));
});
test('a temperature below absolute zero', () => {
  const { problems } = readValues('channel', { conditions: { temperature: '-300 degC' } });
  expect(problems.at(-1)?.message).toBe('`-300 degC` is not possible here: it is at least -273 degC.');
});

test.each([
  ['channel', 'a channel'],
  ['parts', 'a parts file'],
  ['config', 'a configuration'],
] as const)('an empty %s file says how one begins', (schema, noun) => {
  const [{ message, fixes }, ...others] = readValues(schema, null).problems;
  expect(message).toBe(`This file is empty: ${noun} begins with \`lanewright: 1\`.`);
  expect(fixes.map(({ title }) => title)).toEqual(['Add `lanewright: 1`']);
  expect(others).toEqual([]);
});

test.each([
  ['stub', { impedance: 1, dk: 1 }, 'Add the example `length: 0.9 mm`'],
  ['package', { impedance: 1, delay: 1, loss: 1 }, 'Add the example `length: 14 mm`'],
  ['cable', { impedance: 1, delay: 1, loss: 1 }, 'Add the example `length: 0.5 m`'],
] as const)('what a %s lacks is offered as an example of its kind', (kind, values, title) => {
  const [{ fixes }] = missingKeyProblems(kind, missingKeys(kind, values, false));
  expect(fixes.map((fix) => fix.title)).toEqual([title]);
});
