import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { expect, test } from 'vitest';

const root = process.cwd();

/** design section 6: what each folder may import of the others. */
const mayImport: Record<string, readonly string[]> = {
  schemas: [],
  'src-core': ['schemas'],
  server: ['src-core', 'schemas'],
  client: ['src-core', 'schemas'],
};

/**
 * The folders of src-core in the order in which data flows, what all use (`quantity`, `format`, `physics`) before its first user;
 * none imports a later one. Only the contract of an element kind, types alone, stands with the networks that are its result.
 */
const stages = [
  'text',
  'quantity',
  'format',
  'physics',
  'model',
  'elements',
  'networks',
  'cascade',
  'time',
  'link',
  'figures',
  'rules',
  'plots',
  'assist',
  'review',
];

const entriesOf = (folder: string) =>
  existsSync(join(root, folder)) ? readdirSync(join(root, folder), { withFileTypes: true }) : [];

const sources = (folder: string): string[] =>
  entriesOf(folder).flatMap((entry) => {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) return entry.name === 'generated' ? [] : sources(path);
    return /\.tsx?$/.test(entry.name) && !/\.test\.ts$/.test(entry.name) ? [path] : [];
  });

interface Import {
  readonly from: string;
  readonly to: string;
  readonly typesOnly: boolean;
}

function importsOf(file: string): Import[] {
  const text = readFileSync(join(root, file), 'utf8');
  return [
    ...text.matchAll(
      /^(?:import|export)\s+(type\s+)?([^'";]*?)from\s+'([^']+)'|import\('([^']+)'\)|^import\s+'([^']+)'/gm,
    ),
  ].map((match) => {
    const target = match[3] ?? match[4] ?? match[5];
    const named = match[2] ?? '';
    const allTypes =
      /^\{[^}]*\}\s*$/.test(named.trim()) &&
      named
        .replace(/[{}]/g, '')
        .split(',')
        .filter((name) => name.trim())
        .every((name) => name.trim().startsWith('type '));
    return {
      from: file,
      to: target.startsWith('.') ? relative(root, join(root, dirname(file), target)) : target,
      typesOnly: match[1] !== undefined || allTypes || match[4] !== undefined,
    };
  });
}

test('each folder imports only what the structure allows', () => {
  for (const folder of Object.keys(mayImport)) expect(sources(folder).length, folder).toBeGreaterThan(0);
  const wrong: string[] = [];
  for (const [folder, allowed] of Object.entries(mayImport)) {
    for (const { from, to } of sources(folder).flatMap(importsOf)) {
      const top = to.split('/')[0];
      if (top in mayImport && top !== folder && !allowed.includes(top)) wrong.push(`${from} imports ${to}`);
    }
  }
  expect(wrong).toEqual([]);
});

test('src-core knows no editor, no protocol, no Node', () => {
  const wrong = sources('src-core')
    .flatMap(importsOf)
    .filter(({ to }) => /^(node:|vscode|fs$|path$|os$|crypto$|child_process|worker_threads)/.test(to));
  expect(wrong).toEqual([]);
});

test('no stage imports a later one', () => {
  const wrong: string[] = [];
  for (const [index, stage] of stages.entries()) {
    for (const { from, to, typesOnly } of sources(join('src-core', stage)).flatMap(importsOf)) {
      const later = stages.findIndex((name) => to.startsWith(`src-core/${name}/`));
      if (later > index && !(typesOnly && to === 'src-core/networks/types')) wrong.push(`${from} imports ${to}`);
    }
  }
  expect(wrong).toEqual([]);
});

test('every folder of src-core has its place in that order', () => {
  const folders = readdirSync(join(root, 'src-core'), { withFileTypes: true }).filter((entry) => entry.isDirectory());
  // `stages` is not one: it holds the pieces of `analyse.ts`, which composes all of them.
  expect(folders.map(({ name }) => name).filter((name) => !stages.includes(name))).toEqual(['stages']);
});

test('no file needs, by whatever way round, one that needs it', () => {
  const files = Object.keys(mayImport).flatMap(sources);
  const needs = new Map(
    files.map((file) => [
      file,
      importsOf(file)
        .filter(({ typesOnly }) => !typesOnly)
        .flatMap(({ to }) => files.filter((other) => other === `${to}.ts` || other === `${to}/index.ts`)),
    ]),
  );
  expect([...needs.values()].flat().length).toBeGreaterThan(files.length);
  /** The way from a file back to itself, if there is one. */
  const circle = (start: string) => {
    const seen = new Set<string>();
    const ways = [[start]];
    for (let way = ways.pop(); way; way = ways.pop()) {
      for (const next of needs.get(way[way.length - 1]) ?? []) {
        if (next === start) return [...way, next].join(' → ');
        if (!seen.has(next)) ways.push([...way, next]);
        seen.add(next);
      }
    }
    return undefined;
  };
  expect(files.map(circle).filter((way) => way !== undefined)).toEqual([]);
});

test('protocol types stop in the server, nothing opens a socket, and only client/git runs a program', () => {
  const outside = ['src-core', 'client/cli', 'client/report', 'client/preview'].flatMap(sources).flatMap(importsOf);
  expect(outside.filter(({ to }) => /^vscode-language/.test(to))).toEqual([]);
  const everywhere = ['src-core', 'client', 'server'].flatMap(sources).flatMap(importsOf);
  expect(everywhere.filter(({ to }) => /^(node:)?(net|http|https|dgram|tls)$/.test(to))).toEqual([]);
  const running = everywhere.filter(({ to }) => /^(node:)?child_process$/.test(to));
  expect(running.filter(({ from }) => from !== 'client/git/objects.ts')).toEqual([]);
});
