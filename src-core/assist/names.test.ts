import { describe, expect, test } from 'vitest';
import { parseFile } from '../text/index';
import type { TextEdit } from '../text/types';
import {
  definitionAt,
  fileRenameEdits,
  highlightsAt,
  prepareRename,
  referencesOf,
  relativePath,
  renameAt,
} from './names';
import type { Library } from './occurrences';
import { atCursor, BOARD } from './testing';

const LANE_A = `lanewright: 1
use:
  board: ../boards/main.parts.yaml
path:
  - { trace: start, stackup: board.main, layer: L1 }
  - { via: dive, stackup: board.main, to: L3, span: [L1, L3] }
  - { connector: mate, part: board.mate, includes: [dive] }
limits:
  - insertion-loss: whole
    between: [start, mate]
waivers:
  - { rule: return-loss, at: whole }
`;
const LANE_B = `lanewright: 1
use: { b: ../boards/main.parts.yaml }
path:
  - { trace: start, stackup: main, layer: "L1" }
`;

function library(others: Readonly<Record<string, string>> = {}): Library {
  const texts = {
    'boards/main.parts.yaml': BOARD,
    'lanes/a.channel.yaml': LANE_A,
    'lanes/b.channel.yaml': LANE_B,
    ...others,
  };
  return new Map(Object.entries(texts).map(([file, text]) => [file, parseFile(file, text)]));
}

/** The library with one file's text marked by ‸. */
function marked(file: string, text: string) {
  const { text: plain, offset } = atCursor(text);
  return { files: library({ [file]: plain }), file, offset };
}
const inA = (needle: string) => marked('lanes/a.channel.yaml', LANE_A.replace(needle.replace('‸', ''), needle));
const inBoard = (needle: string) => marked('boards/main.parts.yaml', BOARD.replace(needle.replace('‸', ''), needle));

const written = (files: Library, { file, range }: { file: string; range: { start: number; end: number } }) =>
  files.get(file)!.text.slice(range.start, range.end);
function applied(files: Library, edits: readonly TextEdit[], file: string): string {
  return edits
    .filter((edit) => edit.file === file)
    .sort((a, b) => b.range.start - a.range.start)
    .reduce(
      (text, { range, text: by }) => text.slice(0, range.start) + by + text.slice(range.end),
      files.get(file)!.text,
    );
}

describe('where a name is declared', () => {
  test('a stackup, by its prefix or without one', () => {
    const { files, file, offset } = inA('board.ma‸in');
    const found = definitionAt(files, file, offset)!;
    expect(found.targets.map((target) => [target.file, written(files, target)])).toEqual([
      ['boards/main.parts.yaml', 'main'],
    ]);
    expect(written(files, { file, range: found.origin })).toBe('main');
    const b = marked('lanes/b.channel.yaml', LANE_B.replace('stackup: main', 'stackup: ma‸in'));
    expect(definitionAt(b.files, b.file, b.offset)!.targets[0].file).toBe('boards/main.parts.yaml');
  });
  test('a prefix is the `use` entry, its path the file', () => {
    const prefix = inA('bo‸ard.main');
    expect(written(prefix.files, definitionAt(prefix.files, prefix.file, prefix.offset)!.targets[0])).toBe('board');
    const path = inA('../boards/ma‸in.parts.yaml');
    expect(definitionAt(path.files, path.file, path.offset)!.targets[0].file).toBe('boards/main.parts.yaml');
  });
  test('a layer, in its stackup’s file; an element, a limit', () => {
    const layer = inA('to: L‸3');
    expect(definitionAt(layer.files, layer.file, layer.offset)!.targets.map(({ file }) => file)).toEqual([
      'boards/main.parts.yaml',
    ]);
    const element = inA('includes: [di‸ve]');
    expect(written(element.files, definitionAt(element.files, element.file, element.offset)!.targets[0])).toBe('dive');
    const limit = inA('at: wh‸ole');
    expect(written(limit.files, definitionAt(limit.files, limit.file, limit.offset)!.targets[0])).toBe('whole');
  });
});

test('references of a layer are found in every lane, quoted or not', () => {
  const { files, file, offset } = inBoard('copper: L‸1');
  expect(referencesOf(files, file, offset).map((one) => [one.file, written(files, one), one.declares])).toEqual([
    ['boards/main.parts.yaml', 'L1', true],
    ['lanes/a.channel.yaml', 'L1', false],
    ['lanes/a.channel.yaml', 'L1', false],
    ['lanes/b.channel.yaml', 'L1', false],
  ]);
});

test('an element of another lane with the same name is another one', () => {
  const { files, file, offset } = inA('trace: st‸art');
  expect(referencesOf(files, file, offset).map((one) => one.file)).toEqual([file, file]);
  expect(highlightsAt(files, file, offset)).toHaveLength(2);
});

describe('rename', () => {
  const renamed = (at: ReturnType<typeof inA>, name: string) => {
    const result = renameAt(at.files, at.file, at.offset, name);
    return 'problem' in result ? result.problem : result.edits;
  };
  test('a stackup across files, prefixes left alone', () => {
    const at = inA('board.ma‸in');
    const edits = renamed(at, 'core-board') as readonly TextEdit[];
    expect(applied(at.files, edits, 'boards/main.parts.yaml')).toContain('  core-board:\n');
    expect(applied(at.files, edits, 'lanes/a.channel.yaml')).toContain('stackup: board.core-board, layer');
    expect(applied(at.files, edits, 'lanes/b.channel.yaml')).toContain('stackup: core-board,');
  });
  test('a material, a part, a layer, a prefix', () => {
    const material = inBoard('material: co‸re');
    expect(
      applied(material.files, renamed(material, 'resin') as readonly TextEdit[], 'boards/main.parts.yaml').match(
        /resin/g,
      ),
    ).toHaveLength(4);
    const part = inBoard('ma‸te:');
    expect(applied(part.files, renamed(part, 'plug') as readonly TextEdit[], 'lanes/a.channel.yaml')).toContain(
      'part: board.plug',
    );
    const layer = inA('to: L‸3');
    const edits = renamed(layer, 'S3') as readonly TextEdit[];
    expect(applied(layer.files, edits, 'lanes/a.channel.yaml')).toContain('to: S3, span: [L1, S3]');
    expect(applied(layer.files, edits, 'boards/main.parts.yaml')).toContain('copper: S3');
    const prefix = inA('bo‸ard: ../');
    expect(applied(prefix.files, renamed(prefix, 'pcb') as readonly TextEdit[], 'lanes/a.channel.yaml')).not.toContain(
      'board.',
    );
  });
  test('an element with its limits; a limit with its waivers', () => {
    const element = inA('trace: st‸art');
    expect(applied(element.files, renamed(element, 'entry') as readonly TextEdit[], element.file)).toContain(
      'between: [entry, mate]',
    );
    const limit = inA('insertion-loss: who‸le');
    expect(applied(limit.files, renamed(limit, 'all') as readonly TextEdit[], limit.file)).toContain('at: all');
  });
  test('is refused where the name is taken, breaks the pattern, or is none', () => {
    expect(renamed(inA('trace: st‸art'), 'dive')).toMatch('`dive` is the name of another one already');
    expect(renamed(inA('trace: st‸art'), 'whole')).toMatch('is the name of another one already');
    expect(renamed(inA('trace: st‸art'), 'Start 1')).toMatch('A name begins with a small letter');
    expect(renamed(inA('trace: st‸art'), 'yes')).toMatch('A name begins');
    expect(prepareRename(...(Object.values(inA('rule: retu‸rn-loss')) as [Library, string, number]))).toEqual({
      problem: 'The names of rules are fixed.',
    });
    expect(prepareRename(...(Object.values(inA('lanewri‸ght: 1')) as [Library, string, number]))).toHaveProperty(
      'problem',
    );
  });
});

describe('renamed files', () => {
  test('paths that name a file follow it, and a moved file keeps its own', () => {
    const files = library();
    const moved = fileRenameEdits(files, [{ from: 'boards/main.parts.yaml', to: 'pcb/sled/main.parts.yaml' }]);
    expect(moved.map(({ file, text }) => [file, text])).toEqual([
      ['lanes/a.channel.yaml', '../pcb/sled/main.parts.yaml'],
      ['lanes/b.channel.yaml', '../pcb/sled/main.parts.yaml'],
    ]);
    expect(
      fileRenameEdits(files, [{ from: 'lanes/a.channel.yaml', to: 'a.channel.yaml' }]).map(({ text }) => text),
    ).toEqual(['boards/main.parts.yaml']);
    expect(fileRenameEdits(files, [{ from: 'boards', to: 'pcb' }])).toHaveLength(2);
  });
  test('a relative path leads from file to file', () => {
    expect(relativePath('a/b/c.yaml', 'a/d/e.yaml')).toBe('../d/e.yaml');
    expect(relativePath('c.yaml', 'e.yaml')).toBe('e.yaml');
  });
});

test('names like `__proto__` are names', () => {
  const text =
    'lanewright: 1\npath:\n  - trace: __proto__\n  - trace: constructor\nlimits:\n  - insertion-loss: a\n    between: [__proto__, constr‸uctor]\n';
  const { files, file, offset } = marked('lanes/p.channel.yaml', text);
  expect(definitionAt(files, file, offset)!.targets).toHaveLength(1);
});
