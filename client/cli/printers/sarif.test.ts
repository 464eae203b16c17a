import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { rules } from '../../../src-core/rules/list';
import { applyEdits } from '../../../src-core/text/edits';
import { sarif } from './sarif';
import { analysed, hostileChannel, plainChannel, printed } from './testing';

const fromHere = createRequire(import.meta.url);
// The matchers of this package want another test runner; its copy of the published schema and the validator for it are what we use.
const schemas = createRequire(fromHere.resolve('@microsoft/jest-sarif/package.json'));
const Ajv = schemas('ajv');
const ajv = new Ajv({ schemaId: 'auto', allErrors: true });
ajv.addMetaSchema(schemas('ajv/lib/refs/json-schema-draft-04.json'));
const valid = ajv.compile(
  JSON.parse(readFileSync(schemas.resolve('./lib/schemas/sarif-2.1.0-rtm.5.json'), 'utf8')),
) as ((log: unknown) => boolean) & { errors?: unknown };

interface Region {
  readonly startLine: number;
  readonly startColumn: number;
  readonly endLine: number;
  readonly endColumn: number;
}
interface Location {
  readonly physicalLocation: { readonly artifactLocation: { readonly uri: string }; readonly region: Region };
  readonly message?: { readonly text: string };
}
interface Result {
  readonly ruleId: string;
  readonly ruleIndex: number;
  readonly level: string;
  readonly message: { readonly text: string };
  readonly locations: readonly Location[];
  readonly relatedLocations?: readonly Location[];
  readonly partialFingerprints: Readonly<Record<string, string>>;
  readonly suppressions: readonly {
    readonly kind: string;
    readonly justification: string;
    readonly location: Location;
  }[];
  readonly fixes?: readonly {
    readonly description: { readonly text: string };
    readonly artifactChanges: readonly {
      readonly replacements: readonly {
        readonly deletedRegion: Region;
        readonly insertedContent: { readonly text: string };
      }[];
    }[];
  }[];
}

function read(out: string) {
  const log = JSON.parse(out);
  expect(valid(log), JSON.stringify(valid.errors)).toBe(true);
  expect(log.runs).toHaveLength(1);
  return log.runs[0] as { tool: { driver: { rules: { id: string }[] } }; results: Result[]; columnKind: string };
}

const long = (text: string) => text.replace('board.hole }', 'board.long-hole }');

test('the schema that it is held to refuses what is wrong', () => {
  const log = JSON.parse(printed(sarif, [plainChannel(long)]));
  expect(valid(log)).toBe(true);
  log.runs[0].results[0].level = 'fatal';
  expect(valid(log)).toBe(false);
});

test('every rule is told, with its help and within the sizes that a forge takes', () => {
  const run = read(printed(sarif, []));
  expect(run.results).toEqual([]);
  expect(run.columnKind).toBe('utf16CodeUnits');
  expect(run.tool.driver.rules.map(({ id }) => id)).toEqual(rules.map(({ name }) => name));
  for (const rule of run.tool.driver.rules as unknown as Record<string, Record<string, string>>[]) {
    expect(rule.shortDescription.text).toMatch(/[.…]$/);
    expect(rule.shortDescription.text.length).toBeLessThanOrEqual(1024);
    expect(rule.fullDescription.text.length).toBeLessThanOrEqual(1024);
    expect(rule.help.markdown).toContain(rule.help.text);
  }
});

test('a result names rule, place and words; its region is the text of the finding', () => {
  const analysis = plainChannel(long);
  const { results, tool } = read(printed(sarif, [analysis]));
  expect(results).toHaveLength(1);
  const [{ ruleId, ruleIndex, level, message, locations, suppressions, partialFingerprints }] = results;
  expect([ruleId, level, suppressions]).toEqual(['stub-resonance', 'warning', []]);
  expect(tool.driver.rules[ruleIndex].id).toBe(ruleId);
  expect(message.text).toMatch(/^The 3\.62 mm stub of `dive`/);
  expect(Object.keys(partialFingerprints)).toEqual(['lanewrightFinding/v1']);
  const { artifactLocation, region } = locations[0].physicalLocation;
  expect(artifactLocation).toEqual({ uri: 'lane.channel.yaml', uriBaseId: '%SRCROOT%' });
  const text = analysis.parsed.get('lane.channel.yaml')!.text;
  expect(text.split('\n')[region.startLine - 1].slice(region.startColumn - 1, region.endColumn - 1)).toBe('dive');
});

test('what causes a finding is a related location', () => {
  const analysis = plainChannel((text) => text.replace('max: 12 dB', 'max: 1 dB'));
  const { results } = read(printed(sarif, [analysis]));
  const [related] = results.find(({ ruleId }) => ruleId === 'insertion-loss')!.relatedLocations!;
  const [, name] = /^`([a-z]+)` /.exec(related.message!.text)!;
  const { startLine } = related.physicalLocation.region;
  expect(analysis.parsed.get('lane.channel.yaml')!.text.split('\n')[startLine - 1]).toContain(`: ${name},`);
});

test('a fix, applied as a reader would, ends the finding', () => {
  const analysis = plainChannel(long);
  const { text } = analysis.parsed.get('lane.channel.yaml')!;
  const [fix] = read(printed(sarif, [analysis])).results[0].fixes!;
  expect(fix.description.text).toMatch(/^Backdrill `dive`/);
  const lines = text.split('\n');
  const offset = (line: number, column: number) =>
    lines.slice(0, line - 1).reduce((sum, { length }) => sum + length + 1, 0) + column - 1;
  const edits = fix.artifactChanges[0].replacements.map(({ deletedRegion: region, insertedContent }) => ({
    file: 'lane.channel.yaml',
    range: { start: offset(region.startLine, region.startColumn), end: offset(region.endLine, region.endColumn) },
    text: insertedContent.text,
  }));
  const mended = plainChannel(() => applyEdits(text, edits));
  expect(mended.findings).toEqual([]);
});

test('an accepted finding is suppressed, with the reason and the place of its waiver', () => {
  const reason = 'first lot, measured good';
  const waiver = `waivers:\n  - { rule: stub-resonance, at: dive, reason: "${reason}", by: lane team, until: 2099-01-01 }\n`;
  const { results } = read(printed(sarif, [plainChannel((text) => `${long(text)}${waiver}`)]));
  expect(results).toHaveLength(1);
  const [{ kind, justification, location }] = results[0].suppressions;
  expect([kind, justification]).toEqual(['inSource', `${reason} (lane team, until 2099-01-01)`]);
  expect(location.physicalLocation.region.startLine).toBe(22);
});

test('of more findings than a forge takes the worst are told, the rest counted, the file within its size', () => {
  const keys = Array.from({ length: 250 }, (_, i) => `key-${i}: 1\n`).join('');
  const many = plainChannel((text) => `${long(text)}${keys}`);
  const files = Math.ceil(25_000 / many.findings.length) + 1;
  const out = printed(
    sarif,
    Array.from({ length: files }, () => many),
  );
  const [{ results, invocations }] = JSON.parse(out).runs as [
    { results: Result[]; invocations: { toolExecutionNotifications: unknown[] }[] },
  ];
  expect(results).toHaveLength(25_000);
  const left = files * many.findings.length - 25_000;
  expect(JSON.stringify(invocations[0].toolExecutionNotifications)).toContain(
    `${left} findings beyond the worst 25000`,
  );
  // an error for each key and the warning of the stub, of which those of the last files give way
  expect(results.filter(({ level }) => level === 'error').length).toBe(
    Math.min(25_000, files * many.findings.filter(({ severity }) => severity === 'error').length),
  );
  expect(gzipSync(out).length).toBeLessThan(10e6);
});

test('a hostile file makes no link, no argument, no path of its own, and nothing that steers', () => {
  const analyses = [analysed(hostileChannel()), analysed(hostileChannel({ waived: true }))];
  const out = printed(sarif, analyses);
  const { results } = read(out);
  expect(results).toHaveLength(analyses[0].findings.length + analyses[1].findings.length);
  const prints = results.map(({ partialFingerprints }) => Object.values(partialFingerprints)[0]);
  expect(new Set(prints).size).toBe(prints.length);
  expect(out.replaceAll('\n', '')).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]/);
  for (const { message, locations, fixes = [], suppressions } of results) {
    const said = [message.text, ...fixes.map(({ description }) => description.text)];
    for (const text of said) {
      expect(text).not.toMatch(/(?<!\\)\[|(?<!\{)\{\d+\}(?!\})/);
      expect(text).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]/);
    }
    const { uri } = locations[0].physicalLocation.artifactLocation;
    expect(uri).toMatch(
      /^lanes%20%5D%5D%3E\/%3A%3Aerror%20file%3Da%2Cline%3D1%3A%3A%250A%22%3Cb%3E[^/?#:]*\.channel\.yaml$/,
    );
    for (const { justification } of suppressions)
      expect(justification).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u061c\u202a-\u202e\u2066-\u2069]/);
  }
});
