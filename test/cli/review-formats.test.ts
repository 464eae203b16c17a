import { execFileSync } from 'node:child_process';
import { cpSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { XMLValidator } from 'fast-xml-parser';
import { expect, test } from 'vitest';
import { emptyFolder, lanewright } from './run';

const EJECTOR = 'lanes/ejector.channel.yaml';

/** The examples as a repository's first commit. */
function repository(): string {
  const folder = emptyFolder();
  cpSync('examples', folder, { recursive: true });
  const git = (...args: string[]) =>
    execFileSync('git', ['-c', 'user.name=someone', '-c', 'user.email=someone@lane.example', ...args], { cwd: folder });
  git('init', '-q', '-b', 'main');
  git('add', '-A');
  git('commit', '-q', '-m', 'start');
  return folder;
}

test('a review writes the reports of build servers: of the touched channels alone, with what is new', async () => {
  const folder = repository();
  const lane = join(folder, EJECTOR);
  writeFileSync(lane, readFileSync(lane, 'utf8').replace('length: 64 mm', 'length: 2 m'));
  const names = ['sarif', 'github', 'junit', 'gitlab'] as const;
  const out = emptyFolder();
  const formats = names.flatMap((name) => ['--format', `${name}=${join(out, name)}`]);
  const { status } = await lanewright(['review', 'HEAD', ...formats], { cwd: folder });
  expect(status).toBe(1);
  const written = (name: (typeof names)[number]) => readFileSync(join(out, name), 'utf8');
  const annotations = written('github').split('\n');
  expect(annotations[0]).toMatch(/^::error file=lanes\/ejector\.channel\.yaml,line=\d+,.*title=(insertion-loss|eye)::/);
  expect(written('github')).toContain('fails by `regression`: ');
  const { results } = JSON.parse(written('sarif')).runs[0];
  expect(results.length).toBeGreaterThan(0);
  for (const { baselineState, locations } of results) {
    expect(baselineState).toBe('new');
    expect(locations[0].physicalLocation.artifactLocation.uri).toBe(EJECTOR);
  }
  const entries = JSON.parse(written('gitlab'));
  expect(entries).toHaveLength(results.length);
  expect(XMLValidator.validate(written('junit'))).toBe(true);
  expect(written('junit').match(/<testsuite /g)).toHaveLength(1);
  // the fingerprints are those that `check` gives, so that a forge sees one alert
  const checked = await lanewright(['check', EJECTOR, '--format', 'gitlab'], { cwd: folder });
  const prints = (list: { fingerprint: string }[]) => list.map(({ fingerprint }) => fingerprint).sort();
  expect(prints(entries)).toEqual(prints(JSON.parse(checked.stdout)));
});
