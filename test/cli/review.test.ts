import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  cpSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import Ajv from 'ajv/dist/2020';
import { beforeAll, describe, expect, test } from 'vitest';
import type { CheckOutput } from '../../schemas/outputs/check';
import type { ReviewedChannel, ReviewOutput } from '../../schemas/outputs/review';
import { emptyFolder, lanewright } from './run';

const SLED = 'lanes/camera-sled.channel.yaml';
const EJECTOR = 'lanes/ejector.channel.yaml';
const UPLINK = 'lanes/uplink.channel.yaml';
const BACKPLANE = 'lanes/backplane.channel.yaml';
const BOARD = 'boards/controller.parts.yaml';

function git(folder: string, ...args: string[]): string {
  const identity = ['-c', 'user.name=someone', '-c', 'user.email=someone@lane.example', '-c', 'commit.gpgsign=false'];
  return execFileSync('git', ['-C', folder, ...identity, ...args], {
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'pipe'],
  });
}

/** A repository that holds the examples as its first commit. */
function repository(): string {
  const folder = emptyFolder();
  cpSync('examples', folder, { recursive: true });
  git(folder, 'init', '-q', '-b', 'main');
  commit(folder, 'start');
  return folder;
}

function commit(folder: string, tag: string) {
  git(folder, 'add', '-A');
  git(folder, 'commit', '-q', '-m', tag);
  git(folder, 'tag', tag);
}

/** Replaces one text in a file; one that is not there would make a test of nothing. */
function edit(folder: string, file: string, ...pairs: (readonly [from: string, to: string])[]) {
  const path = join(folder, file);
  let text = readFileSync(path, 'utf8');
  for (const [from, to] of pairs) {
    if (!text.includes(from)) throw new Error(`\`${from}\` is not in ${file}`);
    text = text.replace(from, to);
  }
  writeFileSync(path, text);
}

async function review(folder: string, ...args: string[]) {
  const result = await lanewright(['review', ...args, '--format', 'json', '--date', '2026-12-01'], { cwd: folder });
  if (!result.stdout) throw new Error(result.stderr);
  return { ...result, output: JSON.parse(result.stdout) as ReviewOutput };
}

const written = (channel: ReviewedChannel) =>
  channel.changes.filter(({ derived }) => !derived).map(({ words }) => words);

/** Every byte below a folder, `.git` and all. */
function hashOf(folder: string): string {
  const hash = createHash('sha256');
  const walk = (path: string) => {
    for (const name of readdirSync(path).sort()) {
      const inner = join(path, name);
      hash.update(inner);
      if (statSync(inner).isDirectory()) walk(inner);
      else hash.update(readFileSync(inner)).update(String(statSync(inner).mtimeMs));
    }
  };
  walk(folder);
  return hash.digest('hex');
}

describe('a history', () => {
  let folder = '';
  /** Each commit makes one change to the one before. */
  beforeAll(() => {
    folder = repository();
    edit(folder, SLED, ['    pitch: 0.9 mm\n    owner', '    pitch: 0.9 mm\n    to: L6\n    owner']);
    commit(folder, 'written-layer');
    edit(folder, SLED, ['to: L6', 'to: L3'], ['layer: L6', 'layer: L3']);
    commit(folder, 'layer-swap');
    edit(folder, BOARD, ['df: 0.008 @ 10 GHz', 'df: 0.012 @ 10 GHz']);
    commit(folder, 'laminate');
    const leave =
      '  - trace: leave\n    stackup: ctrl.fast\n    layer: L1\n    length: 64 mm\n    impedance: 100 ohm ± 8%\n';
    edit(folder, EJECTOR, [leave, ''], ['\nlimits:', `${leave}\nlimits:`]);
    commit(folder, 'moved-element');
    mkdirSync(join(folder, 'lanes', 'actuators'));
    renameSync(join(folder, EJECTOR), join(folder, 'lanes/actuators/flap.channel.yaml'));
    edit(folder, 'lanes/actuators/flap.channel.yaml', ['../boards', '../../boards']);
    commit(folder, 'renamed-file');
    edit(folder, 'lanes/actuators/flap.channel.yaml', ['length: 64 mm', 'length: 6.4 cm']);
    commit(folder, 'unit');
    edit(folder, BACKPLANE, ['path:', '# in the order of the drawing\npath:']);
    commit(folder, 'comment');
    edit(folder, SLED, ['trace: main-run', 'trace: long-run']);
    commit(folder, 'renamed-element');
    edit(folder, SLED, ['max: 18 dB @ nyquist', 'max: 20 dB @ nyquist']);
    commit(folder, 'looser-limit');
    const waiver =
      '\nwaivers:\n  - rule: eye\n    at: main\n    until: 2027-03-31\n    by: sled team\n    reason: first\n';
    edit(folder, SLED, ['\nlimits:', `${waiver}\nlimits:`]);
    commit(folder, 'waiver');
    edit(folder, SLED, ['reason: first', 'reason: replaced in revision C']);
    commit(folder, 'reason');
    edit(folder, UPLINK, ['line-rate: 106.25 Gb/s\n', '']);
    commit(folder, 'broken');
  });
  const step = (tag: string) => review(folder, `${tag}~1`, tag);

  test('a layer swap: both ends are one group, and the stub that follows is told', async () => {
    const { output, status } = await step('layer-swap');
    expect(output.channels.map(({ file }) => file)).toEqual([SLED]);
    const [sled] = output.channels;
    expect(written(sled)).toEqual(['dive: to L6 → L3', 'main-run: layer L6 → L3']);
    expect(sled.changes.filter(({ derived }) => !derived).map(({ group }) => group)).toEqual([1, 1]);
    expect(
      sled.changes.filter(({ derived }) => derived).map(({ subject, attribute }) => `${subject} ${attribute}`),
    ).toEqual(['dive bottom stub', 'dive bottom stub’s notch', 'rise from']);
    expect(sled.causes).toEqual([]);
    expect(sled.smallestMarginFall).toBeGreaterThan(0);
    expect(output.unchanged).toBe(5);
    expect(status).toBe(1);
  });

  test('figures are those of `check` on either side', async () => {
    const { output } = await step('layer-swap');
    for (const [tag, side] of [
      ['written-layer', 'from'],
      ['layer-swap', 'to'],
    ] as const) {
      const clone = emptyFolder();
      git(folder, 'clone', '-q', '--branch', tag, folder, clone);
      const { stdout } = await lanewright(['check', SLED, '-f', 'json', '--date', '2026-12-01', '--fail-on', 'never'], {
        cwd: clone,
      });
      const [checked] = (JSON.parse(stdout) as CheckOutput).files;
      const reviewed = output.channels[0].figures.flatMap((figure) => figure[side] ?? []);
      expect(reviewed.length).toBeGreaterThan(5);
      for (const figure of reviewed) expect(checked.figures).toContainEqual(figure);
      expect(output.channels[0].verdict[side]).toEqual(checked.verdict);
    }
  });

  test('a laminate in a parts file: the channels on that stackup, because of it alone, and no others', async () => {
    const { output } = await step('laminate');
    const users = readdirSync(join(folder, 'lanes'), { recursive: true, encoding: 'utf8' })
      .filter(
        (file) =>
          file.endsWith('.yaml') && /stackup: ctrl\.backplane/.test(readFileSync(join(folder, 'lanes', file), 'utf8')),
      )
      .map((file) => `lanes/${file}`);
    expect(users.length).toBeGreaterThan(0);
    expect(output.channels.map(({ file }) => file).sort()).toEqual(users.sort());
    for (const channel of output.channels) {
      expect(channel.because).toEqual([BOARD]);
      expect(written(channel)).toEqual(['material core-m4: df 0.008 @ 10 GHz → 0.012 @ 10 GHz']);
      expect(channel.changes[0].location.file).toBe(BOARD);
      expect(channel.figures.find(({ name }) => name === 'insertion-loss-at-nyquist')?.better).toBe(false);
    }
    expect(output.channels.length + output.unchanged).toBe(6);
  });

  test.each([
    ['moved-element', EJECTOR, 'changed', ['leave moved from place 1 to 3']],
    ['renamed-file', 'lanes/actuators/flap.channel.yaml', 'no-effect', []],
    ['unit', 'lanes/actuators/flap.channel.yaml', 'no-effect', ['leave: length 64 mm → 6.4 cm']],
    ['comment', BACKPLANE, 'no-effect', []],
    ['renamed-element', SLED, 'no-effect', ['main-run renamed to long-run']],
    ['looser-limit', SLED, 'changed', ['ball-to-ball: max 18 dB @ nyquist → 20 dB @ nyquist']],
    ['reason', SLED, 'no-effect', ['waiver of eye at main: reason first → replaced in revision C']],
  ])('%s: just that channel and that change', async (tag, file, state, words) => {
    const { output, status } = await step(tag);
    expect(output.channels.map((channel) => [channel.file, channel.state])).toEqual([[file, state]]);
    expect(written(output.channels[0])).toEqual(words);
    expect(output.unchanged).toBe(5);
    if (state === 'no-effect') {
      expect(output.channels[0]).toMatchObject({ figures: [], appeared: [], gone: [], causes: [] });
      expect(status).toBe(0);
    }
    if (tag === 'renamed-file') expect(output.channels[0].renamedFrom).toBe(EJECTOR);
    if (tag === 'looser-limit') expect(output.channels[0].loosened.map((change) => change.words)).toEqual(words);
  });

  test('a waiver is a row of its own, and what it accepts has gone', async () => {
    const { output, status } = await step('waiver');
    const [sled] = output.channels;
    expect(sled.waivers.map(({ subject, attribute }) => `${subject} ${attribute}`)).toEqual([
      'waiver of eye at main added',
    ]);
    expect(sled.gone.map(({ rule }) => rule)).toEqual(['eye']);
    expect([sled.figures, sled.causes]).toEqual([[], []]);
    expect(status).toBe(0);
    expect((await review(folder, 'waiver~1', 'waiver', '--fail-on', 'any')).status).toBe(1);
  });

  test('what has no effect passes even `any`, what has one fails it, and a broken head passes nothing', async () => {
    const status = async (tag: string, policy: string) =>
      (await review(folder, `${tag}~1`, tag, '--fail-on', policy)).status;
    expect(await status('comment', 'any')).toBe(0);
    expect(await status('moved-element', 'any')).toBe(1);
    expect(await status('looser-limit', 'regression')).toBe(0);
    expect(await status('looser-limit', 'error')).toBe(1); // the lane's eye failed before
    expect(await status('layer-swap', 'regression')).toBe(1);
    for (const policy of ['error', 'regression', 'any']) expect(await status('broken', policy)).toBe(1);
    const { output } = await step('broken');
    expect(output.channels).toMatchObject([{ file: UPLINK, state: 'broken' }]);
  });

  test('the whole history in one review, in every format; JSON keeps to its schema; nothing in the repository changed', async () => {
    const before = hashOf(folder);
    const report = join(emptyFolder(), 'review.md');
    const result = await lanewright(['review', 'start', 'broken', '-f', 'json', '-f', `md=${report}`], { cwd: folder });
    expect(hashOf(folder)).toBe(before);
    const output = JSON.parse(result.stdout) as ReviewOutput;
    const ajv = new Ajv({ strict: true, allErrors: true });
    expect(
      ajv.validate(JSON.parse(readFileSync('schemas/review-output.schema.json', 'utf8')), output),
      ajv.errorsText(),
    ).toBe(true);
    expect(output.channels[0].state).toBe('broken');
    expect(readFileSync(report, 'utf8')).toMatch(/^<!-- lanewright-review -->\n/);
    const again = await lanewright(['review', 'start', 'broken', '-f', 'json'], { cwd: folder });
    expect(again.stdout).toBe(result.stdout);
    const text = await lanewright(['review', 'start', 'broken'], { cwd: folder });
    expect(text.stdout).toMatch(/ball-to-ball: max 18 dB @ nyquist → 20 dB @ nyquist/);
    expect(text.status).toBe(1);
  });
});

describe('what is compared', () => {
  test('without arguments the working tree with the commit where it left main, new files too', async () => {
    const folder = repository();
    git(folder, 'switch', '-q', '-c', 'change');
    edit(folder, EJECTOR, ['length: 64 mm', 'length: 70 mm']);
    git(folder, 'commit', '-q', '-am', 'longer');
    git(folder, 'switch', '-q', 'main');
    edit(folder, BACKPLANE, ['line-rate', '# main went on\nline-rate']);
    git(folder, 'commit', '-q', '-am', 'elsewhere');
    git(folder, 'switch', '-q', 'change');
    cpSync(join(folder, 'lanes/uplink.channel.yaml'), join(folder, 'lanes/second.channel.yaml'));
    edit(folder, 'lanes/second.channel.yaml', ['title:', '# a copy\ntitle:']);
    const before = hashOf(folder);
    const { output } = await review(folder);
    expect(hashOf(folder)).toBe(before);
    expect(output.head).toBe('the working tree');
    expect(output.base).toMatch(/^[0-9a-f]{12} \(where this and main parted\)$/);
    expect(output.channels.map(({ file, state }) => [file, state]).sort()).toEqual([
      [EJECTOR, 'changed'],
      ['lanes/second.channel.yaml', 'added'],
    ]);
  });
  test('two folders and two files', async () => {
    const [old, fresh] = [emptyFolder(), emptyFolder()];
    for (const folder of [old, fresh]) cpSync('examples', folder, { recursive: true });
    edit(fresh, EJECTOR, ['length: 64 mm', 'length: 70 mm']);
    const folders = await review(emptyFolder(), old, fresh);
    expect(folders.output.channels.map(({ file }) => file)).toEqual([EJECTOR]);
    expect(folders.output.unchanged).toBe(5);
    cpSync(join(old, EJECTOR), join(fresh, 'lanes/old.channel.yaml'));
    const files = await review(fresh, 'lanes/old.channel.yaml', EJECTOR);
    expect(files.output.channels.map(written)).toEqual([['leave: length 64 mm → 70 mm']]);
  });
  test('line ends alone are no change', async () => {
    const folder = repository();
    writeFileSync(join(folder, SLED), readFileSync(join(folder, SLED), 'utf8').replace(/\n/g, '\r\n'));
    const { output } = await review(folder);
    expect(output).toMatchObject({ channels: [], unchanged: 6 });
  });
});

describe('what cannot be read has its own line, and the rest is reviewed', () => {
  const refusal = async (folder: string, ...args: string[]) => {
    const result = await lanewright(['review', ...args], { cwd: folder });
    expect(result.status).toBe(2);
    expect(result.stdout).toBe('');
    return result.stderr;
  };
  test('revisions that are none', async () => {
    const folder = repository();
    expect(await refusal(folder, 'no-such-branch')).toContain('`no-such-branch` is no revision of this repository.');
    expect(await refusal(folder, '--', '--upload-pack=touch')).toContain('starts with `-`');
    expect(await refusal(folder, 'main..main')).toContain('is not one revision');
    expect(await refusal(emptyFolder(), 'main')).toContain('no git working tree');
    git(folder, 'branch', '-m', 'trunk');
    expect(await refusal(folder)).toContain('name the base');
  });
  test('a shallow clone says so', async () => {
    const folder = repository();
    edit(folder, EJECTOR, ['length: 64 mm', 'length: 70 mm']);
    commit(folder, 'next');
    const clone = join(emptyFolder(), 'clone');
    git(folder, 'clone', '-q', '--depth', '1', `file://${folder}`, clone);
    expect(await refusal(clone, 'HEAD~1')).toContain('shallow');
  });
  test('links, submodules and large-file pointers of a revision', async () => {
    const folder = repository();
    const secret = join(emptyFolder(), 'secret.channel.yaml');
    writeFileSync(secret, readFileSync(join(folder, EJECTOR)));
    symlinkSync(secret, join(folder, 'lanes/link.channel.yaml'));
    const model = readFileSync(join(folder, 'models/mezzanine.s4p'));
    const id = createHash('sha256').update(model).digest('hex');
    const pointer = (of: string) =>
      `version https://git-lfs.github.com/spec/v1\noid sha256:${of}\nsize ${model.length}\n`;
    writeFileSync(join(folder, 'models/mezzanine.s4p'), pointer(id));
    const head = git(folder, 'rev-parse', 'HEAD').trim();
    git(folder, 'update-index', '--add', '--cacheinfo', `160000,${head},vendor`);
    git(folder, 'add', 'lanes', 'models');
    git(folder, 'commit', '-q', '-m', 'pointer');
    const missing = await review(folder, 'HEAD~1', 'HEAD');
    const sled = missing.output.channels.find(({ file }) => file === SLED);
    expect(sled?.appeared.map(({ message }) => message).join()).toMatch(/pointer of a large file/);
    const link = missing.output.channels.find(({ file }) => file === 'lanes/link.channel.yaml');
    expect(link?.notes.join()).toMatch(/links of a revision are not followed/);
    expect(missing.status).toBe(1);
    const store = join(folder, '.git/lfs/objects', id.slice(0, 2), id.slice(2, 4));
    mkdirSync(store, { recursive: true });
    writeFileSync(join(store, id), model);
    const { output } = await review(folder, 'HEAD~1', 'HEAD');
    expect(output.channels.map(({ file }) => file)).toEqual(['lanes/link.channel.yaml']);
  });
  test('a broken base is named, and the head is shown as it is', async () => {
    const folder = repository();
    edit(folder, EJECTOR, ['line-rate: 10.3125 Gb/s\n', '']);
    commit(folder, 'broken');
    edit(folder, EJECTOR, ['title:', 'line-rate: 10.3125 Gb/s\ntitle:']);
    const { output, status } = await review(folder, 'broken');
    expect(output.channels).toMatchObject([{ file: EJECTOR, state: 'changed', verdict: { to: { state: 'good' } } }]);
    expect(output.channels[0].notes.join()).toMatch(/^BASE is not computed/);
    expect(status).toBe(0);
  });
});

test('policy and thresholds are those of the base’s config, whatever the change makes of them', async () => {
  const folder = repository();
  const config = (text: string) => writeFileSync(join(folder, 'lanewright.config.yaml'), `lanewright: 1\n${text}`);
  config('review: { fail-on: regression, loss-reserve: 0.05 dB }\n');
  commit(folder, 'strict');
  edit(folder, UPLINK, ['length: 40 mm', 'length: 42 mm']);
  config('review: { fail-on: error, loss-reserve: 9 dB }\nrules: { stub-resonance: off }\n');
  commit(folder, 'loosens');
  const strict = await review(folder, 'strict', 'loosens');
  expect(strict.status).toBe(1);
  expect(strict.output.failed.reasons.join()).toMatch(/by more than 0.05 dB/);
  const uplink = strict.output.channels.find(({ file }) => file === UPLINK);
  expect(uplink?.loosened.map(({ words }) => words)).toContain('rule stub-resonance: severity warning → off');
  edit(folder, UPLINK, ['length: 42 mm', 'length: 44 mm']);
  commit(folder, 'later');
  expect((await review(folder, 'loosens', 'later')).status).toBe(0);
});

test('a new channel is judged by the policy that the base has for its place', async () => {
  const folder = repository();
  writeFileSync(join(folder, 'lanewright.config.yaml'), 'lanewright: 1\nreview: { fail-on: any }\n');
  commit(folder, 'any');
  writeFileSync(join(folder, 'lanewright.config.yaml'), 'lanewright: 1\n');
  cpSync(join(folder, EJECTOR), join(folder, 'lanes/new.channel.yaml'));
  const { output, status } = await review(folder, 'any');
  expect(output.channels).toMatchObject([{ file: 'lanes/new.channel.yaml', state: 'added' }]);
  expect(output.failed.policy).toBe('any');
  expect(status).toBe(1);
});

describe('Markdown', () => {
  test('keeps to its length, the worst first, and says how many are left', async () => {
    const folder = repository();
    const text = readFileSync(join(folder, EJECTOR), 'utf8');
    for (let i = 0; i < 12; i++) writeFileSync(join(folder, `lanes/lane-${i}.channel.yaml`), text);
    commit(folder, 'many');
    for (let i = 0; i < 12; i++)
      edit(folder, `lanes/lane-${i}.channel.yaml`, ['length: 64 mm', `length: ${70 + i} mm`]);
    const { stdout } = await lanewright(['review', 'many', '-f', 'md', '--max-length', '6000'], { cwd: folder });
    expect(Buffer.byteLength(stdout)).toBeLessThanOrEqual(6000);
    const shown = stdout.match(/<details/g)?.length ?? 0;
    expect(shown).toBeGreaterThan(0);
    expect(stdout.match(/<\/details>/g)?.length).toBe(shown);
    expect(stdout).toContain(`… and ${12 - shown} more`);
  });
  test('a hostile change stays text', async () => {
    const folder = repository();
    const hostile =
      '<img src=x onerror=alert(1)> @everyone #1 [go](https://a.example) <!-- --> ::error::x | \u001b[31m';
    edit(folder, EJECTOR, ['title: Controller to ejector driver', `title: ${JSON.stringify(hostile)}`]);
    edit(folder, EJECTOR, ['length: 64 mm', 'length: 90 mm']);
    const name = 'lanes/<b>@all #2 `x` | y.channel.yaml';
    writeFileSync(join(folder, name), readFileSync(join(folder, EJECTOR)));
    const { stdout } = await lanewright(['review', 'start', '-f', 'md'], { cwd: folder });
    expect(stdout.match(/<!--/g)).toHaveLength(1);
    expect(stdout).not.toMatch(/<(?!\/?details|\/?summary|br>|!-- lanewright-review)/);
    expect(stdout).not.toMatch(/@(?:everyone|all)|#[12]\b|https:|\]\(/);
    const text = await lanewright(['review', 'start'], { cwd: folder });
    expect(text.stdout).not.toContain('\u001b');
    expect(text.stdout).not.toMatch(/^::/m);
    rmSync(join(folder, name));
  });
});
