import { execFileSync } from 'node:child_process';
import { cpSync, mkdirSync, readFileSync, symlinkSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Ajv from 'ajv/dist/2020';
import { describe, expect, test } from 'vitest';
import type { CheckOutput } from '../../schemas/outputs/check';
import { emptyFolder, lanewright } from './run';

const SLED = 'examples/lanes/camera-sled.channel.yaml';
const json = async (...args: string[]): Promise<CheckOutput> =>
  JSON.parse((await lanewright(['check', ...args, '--format', 'json', '--fail-on', 'never'])).stdout);
const GOOD = readFileSync('examples/lanes/ejector.channel.yaml', 'utf8');

/** A copy of the examples that a test may change. */
function copy(): string {
  const folder = emptyFolder();
  cpSync('examples', folder, { recursive: true });
  return folder;
}

describe('exit status', () => {
  test('1 where the examples fail, 0 where nothing does, 2 where nothing could be done', async () => {
    expect((await lanewright(['check', 'examples'])).status).toBe(1);
    expect((await lanewright(['check', 'examples/lanes/ejector.channel.yaml'])).status).toBe(0);
    const missing = await lanewright(['check', 'no-such-file.channel.yaml']);
    expect(missing.status).toBe(2);
    expect(missing.stderr).toContain('no-such-file.channel.yaml');
    expect(missing.stdout).toBe('');
    const mistyped = await lanewright(['check', '--formt', 'json']);
    expect(mistyped.status).toBe(2);
    expect(mistyped.stderr).toContain('did you mean `--format`?');
  });
  test('a folder without channels: 0 and a notice', async () => {
    const result = await lanewright(['check'], { cwd: emptyFolder() });
    expect(result.status).toBe(0);
    expect(result.stderr).toContain('no channel');
  });
});

describe('JSON', () => {
  test('validates against its schema and names the failing stub on its line, with a computed backdrill', async () => {
    const result = await lanewright(['check', 'examples', '--format', 'json']);
    expect(result.status).toBe(1);
    const output: CheckOutput = JSON.parse(result.stdout);
    const schema = JSON.parse(readFileSync('schemas/check-output.schema.json', 'utf8'));
    const ajv = new Ajv({ strict: true, allErrors: true });
    expect(ajv.validate(schema, output), ajv.errorsText()).toBe(true);
    const sled = output.files.find(({ file }) => file === SLED);
    const stub = sled?.findings.find(({ rule }) => rule === 'stub-resonance');
    expect(stub?.subject).toBe('dive');
    const line = readFileSync(SLED, 'utf8').split('\n')[(stub?.location.range.start.line ?? 0) - 1];
    expect(line).toContain('- via: dive');
    expect(stub?.fixes[0]?.title).toMatch(/GHz/);
    expect(stub?.fixes[0]?.edits[0]?.text).toMatch(/backdrill/);
  });
  test('a good lane has no finding at all', async () => {
    const { files } = await json('examples/lanes/ejector.channel.yaml');
    expect(files[0].findings).toEqual([]);
    expect(files[0].verdict?.state).toBe('good');
  });
  test('is the same in any locale and time zone', async () => {
    const args = ['check', 'examples', '--format', 'json', '--date', '2026-12-01'];
    const [here, there] = await Promise.all([
      lanewright(args),
      lanewright(args, { environment: { LC_ALL: 'tr_TR.UTF-8', LANG: 'tr_TR.UTF-8', TZ: 'Asia/Kolkata' } }),
    ]);
    expect(there.stdout).toBe(here.stdout);
  });
});

describe('the backdrill fix', () => {
  test('ends the finding, moves the response’s notch and opens the eye as its title said', async () => {
    const folder = copy();
    const file = join(folder, 'lanes', 'camera-sled.channel.yaml');
    const checkCopy = async (): Promise<CheckOutput['files'][number]> =>
      JSON.parse((await lanewright(['check', file, '--format', 'json', '--root', folder])).stdout).files[0];
    const before = await checkCopy();
    const stub = before.findings.find(({ rule }) => rule === 'stub-resonance');
    expect(stub?.fixes.length).toBeGreaterThan(0);
    const text = readFileSync(file, 'utf8').split('\n');
    const edits = [...(stub?.fixes[0].edits ?? [])].reverse();
    const offset = ({ line, column }: { line: number; column: number }) =>
      text.slice(0, line - 1).join('\n').length + (line > 1 ? 1 : 0) + column - 1;
    let changed = text.join('\n');
    for (const edit of edits)
      changed = changed.slice(0, offset(edit.range.start)) + edit.text + changed.slice(offset(edit.range.end));
    writeFileSync(file, changed);
    const after = await checkCopy();
    expect(after.findings.filter(({ rule }) => rule === 'stub-resonance')).toEqual([]);
    const figure = (checked: typeof before, name: string) =>
      checked.figures.find((candidate) => candidate.name === name)?.value ?? Number.NaN;
    expect(figure(after, 'eye-height')).toBeGreaterThan(figure(before, 'eye-height'));
    expect(figure(after, 'insertion-loss-at-nyquist')).toBeLessThan(figure(before, 'insertion-loss-at-nyquist'));
    const lowest = (checked: typeof before) =>
      Math.min(
        ...checked.resonances.filter(({ elements }) => elements.includes('dive')).map(({ frequencyHz }) => frequencyHz),
        Number.POSITIVE_INFINITY,
      );
    expect(lowest(before)).toBeLessThan(40e9);
    expect(lowest(after)).toBeGreaterThan(lowest(before));
    const rulesBefore = new Set(before.findings.map(({ rule }) => rule));
    expect(after.findings.filter(({ rule }) => !rulesBefore.has(rule))).toEqual([]);
  });
  test('a harmless stub is not named, and a lossy trace is not blamed on the stub', async () => {
    const folder = copy();
    const file = join(folder, 'lanes', 'camera-sled.channel.yaml');
    const original = readFileSync(file, 'utf8');
    const findings = async () =>
      (JSON.parse((await lanewright(['check', file, '--format', 'json', '--root', folder])).stdout) as CheckOutput)
        .files[0].findings;
    const drilled = original.replace(
      'pitch: 0.9 mm\n    owner: sled board\n  - trace: main-run',
      'pitch: 0.9 mm\n    backdrill: { bottom: 0.25 mm ± 0.1 mm }\n    owner: sled board\n  - trace: main-run',
    );
    expect(drilled).not.toBe(original);
    writeFileSync(file, drilled);
    expect((await findings()).filter(({ rule }) => rule === 'stub-resonance')).toEqual([]);
    writeFileSync(file, drilled.replace('length: 96 mm ± 1 mm', 'length: 480 mm ± 1 mm'));
    const lossy = await findings();
    const loss = lossy.find(({ rule }) => rule === 'insertion-loss');
    expect(loss).toBeDefined();
    expect(JSON.stringify(loss)).not.toContain('dive');
    expect(JSON.stringify(loss?.related)).toContain('main-run');
  });
});

describe('text for people', () => {
  test('the same piped and on a terminal but for colour; NO_COLOR wins over FORCE_COLOR', async () => {
    const plain = await lanewright(['check', SLED]);
    const coloured = await lanewright(['check', SLED], { environment: { FORCE_COLOR: '1' } });
    const refused = await lanewright(['check', SLED], { environment: { FORCE_COLOR: '1', NO_COLOR: '1' } });
    expect(plain.stdout).not.toContain('\u001b');
    expect(coloured.stdout).toContain('\u001b[');
    expect(coloured.stdout.replace(/\u001b\[\d+m/g, '')).toBe(plain.stdout);
    expect(refused.stdout).toBe(plain.stdout);
    expect(plain.stderr).toBe('');
  });
  test('concise: one line a finding, which the editor’s problem matcher reads', async () => {
    const { stdout } = await lanewright(['check', SLED, '--format', 'concise']);
    const lines = stdout.trim().split('\n');
    const { contributes } = JSON.parse(readFileSync('package.json', 'utf8'));
    const matcher = new RegExp(contributes.problemMatchers[0].pattern.regexp);
    expect(lines.length).toBeGreaterThan(0);
    for (const line of lines) expect(line).toMatch(matcher);
  });
  test('what would steer a terminal is made visible', async () => {
    const folder = copy();
    const file = join(folder, 'lanes', 'ejector.channel.yaml');
    writeFileSync(file, GOOD.replace('length: 64 mm', '"le\\e[31mngth\\u202e": 64 mm'));
    const { stdout } = await lanewright(['check', file, '--root', folder]);
    expect(stdout).not.toMatch(/[\u001b\u202e]/);
  });
});

describe('parts that no lane uses', () => {
  test('are told where a folder is checked, not where single files are named', async () => {
    const folder = copy();
    const board = join(folder, 'boards', 'controller.parts.yaml');
    const text = readFileSync(board, 'utf8');
    writeFileSync(
      board,
      text.replace('parts:\n', 'parts:\n  spare: { kind: connector, delay: 45 ps, impedance: 84 ohm }\n'),
    );
    const unused = async (...paths: string[]) =>
      (await json(...paths, '--root', folder)).files
        .flatMap(({ findings }) => findings)
        .filter(({ rule }) => rule === 'unused-part')
        .map(({ subject }) => subject);
    expect(await unused(folder)).toEqual(['spare']);
    expect(await unused(board, join(folder, 'lanes', 'blade.channel.yaml'))).toEqual([]);
  });
});

describe('files that are not read', () => {
  test('too large, or a link that leads out: one finding each, and status 1', async () => {
    const folder = emptyFolder();
    const outside = emptyFolder();
    writeFileSync(join(folder, 'sparse.channel.yaml'), '');
    truncateSync(join(folder, 'sparse.channel.yaml'), 100 * 2 ** 20);
    writeFileSync(join(outside, 'other.parts.yaml'), 'lanewright: 1\n');
    symlinkSync(join(outside, 'other.parts.yaml'), join(folder, 'link.parts.yaml'));
    for (const [name, rule] of [
      ['sparse.channel.yaml', 'limit'],
      ['link.parts.yaml', 'refused-file'],
    ]) {
      const result = await lanewright(['check', join(folder, name), '--root', folder, '--format', 'json']);
      const { files }: CheckOutput = JSON.parse(result.stdout);
      expect(files[0].findings.map((finding) => finding.rule)).toEqual([rule]);
      expect(result.status).toBe(1);
    }
  });
});

describe('standard input and several outputs', () => {
  test('a text that is not on disk is checked under its name', async () => {
    const result = await lanewright(
      ['check', '-', '--stdin-filename', 'examples/lanes/new.channel.yaml', '--format', 'json'],
      { input: GOOD.replace('64 mm', '64') },
    );
    expect(result.status).toBe(1);
    const { files }: CheckOutput = JSON.parse(result.stdout);
    expect(files[0].file).toBe('examples/lanes/new.channel.yaml');
    expect(files[0].findings[0].fixes.some(({ edits }) => edits[0].text.includes('64 mm'))).toBe(true);
  });
  test('text on stdout and JSON in a file, in one run', async () => {
    const folder = emptyFolder();
    const { stdout } = await lanewright([
      'check',
      SLED,
      '--format',
      'text',
      '--format',
      `json=${join(folder, 'out.json')}`,
    ]);
    expect(stdout).toContain('stub-resonance');
    expect(JSON.parse(readFileSync(join(folder, 'out.json'), 'utf8')).files).toHaveLength(1);
  });
});

describe('fixes and waivers', () => {
  test('--diff writes nothing, --fix writes the safe ones alone', async () => {
    const folder = copy();
    const file = join(folder, 'lanes', 'ejector.channel.yaml');
    const broken = GOOD.replace('length: 64 mm', 'lenght: 64 mm');
    writeFileSync(file, broken);
    const { stderr } = await lanewright(['check', file, '--diff', '--root', folder]);
    expect(stderr).toContain('+    length: 64 mm');
    expect(readFileSync(file, 'utf8')).toBe(broken);
    expect((await lanewright(['check', file, '--fix', '--root', folder])).status).toBe(0);
    expect(readFileSync(file, 'utf8')).toBe(GOOD);
  });
  test('what --diff shows is a patch: applied, it leaves what --fix would', async () => {
    const wanted = copy();
    const patched = copy();
    const call = ['check', 'lanes/camera-sled.channel.yaml', '--unsafe-fixes', '--root', '.'];
    await lanewright([...call, '--fix'], { cwd: wanted });
    const { stderr } = await lanewright([...call, '--diff'], { cwd: patched });
    const patch = stderr.slice(stderr.indexOf('--- '));
    const lane = ['lanes', 'camera-sled.channel.yaml'] as const;
    const before = readFileSync(join(patched, ...lane), 'utf8');
    execFileSync('git', ['apply', '--unidiff-zero', '-p0', '-'], { cwd: patched, input: patch });
    const after = readFileSync(join(patched, ...lane), 'utf8');
    expect(after).toBe(readFileSync(join(wanted, ...lane), 'utf8'));
    expect(after).not.toBe(before);
  });
  test('--add-waivers adopts a failing channel; without a reason nothing is written', async () => {
    const folder = copy();
    const file = join(folder, 'lanes', 'blade.channel.yaml');
    const before = readFileSync(file, 'utf8');
    expect((await lanewright(['check', file, '--add-waivers', 'lane team', '--root', folder])).status).toBe(2);
    expect(readFileSync(file, 'utf8')).toBe(before);
    const adopted = await lanewright([
      'check',
      file,
      '--add-waivers',
      'lane team',
      '--until',
      '2099-01-01',
      '--reason',
      'as built',
      '--root',
      folder,
    ]);
    expect(adopted.status).toBe(0);
    expect(readFileSync(file, 'utf8')).toContain('reason: as built');
  });
});

describe('what is not read', () => {
  test('a link that leads out of the root, and a pipe', async () => {
    const folder = copy();
    const outside = emptyFolder();
    writeFileSync(join(outside, 'secret.parts.yaml'), 'lanewright: 1\ntitle: secret\n');
    mkdirSync(join(folder, 'linked'));
    symlinkSync(join(outside, 'secret.parts.yaml'), join(folder, 'boards', 'leak.parts.yaml'));
    const file = join(folder, 'lanes', 'ejector.channel.yaml');
    writeFileSync(file, GOOD.replace('controller.parts.yaml', 'leak.parts.yaml'));
    const { stdout, status } = await lanewright(['check', file, '--root', folder]);
    expect(status).toBe(1);
    expect(stdout).toMatch(/leads out/);
    expect(stdout).not.toContain('secret');
  });
});
