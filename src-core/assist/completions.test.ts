import { describe, expect, test } from 'vitest';
import { completionsAt, type Surroundings } from './completions';
import type { Library } from './occurrences';
import { analysed, atCursor, BOARD, HEAD, LANE } from './testing';

const START = `path:
  - trace: start
    stackup: board.main
    layer: L1
    length: 20 mm
    impedance: 100 ohm
`;

async function offered(marked: string, around: Partial<Surroundings> = {}) {
  const { text, offset } = atCursor(marked);
  const analysis = await analysed(text, {}, 'model');
  const found = await completionsAt(analysis.parsed.get(LANE)!, analysis, offset, { list: async () => [], ...around });
  return { text, found: [...found].sort((a, b) => a.rank - b.rank), labels: found.map(({ label }) => label) };
}

/** The text after taking an offer; placeholders as they stand. */
async function taken(marked: string, label: string, around: Partial<Surroundings> = {}) {
  const { text, found } = await offered(marked, around);
  const one = found.find((item) => item.label === label)!;
  const edits = [
    ...(one.also ?? []),
    { range: one.range, text: one.insert.replace(/\$\{\d:([^}]*)\}/g, '$1').replace('$0', '‸') },
  ];
  return edits
    .sort((a, b) => b.range.start - a.range.start)
    .reduce((result, edit) => result.slice(0, edit.range.start) + edit.text + result.slice(edit.range.end), text);
}

describe('kinds', () => {
  test('behind a dash, typed or not, all of a list’s kinds', async () => {
    expect((await offered(`${HEAD}path:\n  - ‸\n`)).labels).toEqual([
      'package',
      'trace',
      'cable',
      'via',
      'connector',
      'capacitor',
      'stub',
      'block',
    ]);
    expect((await offered(`${HEAD}path:\n  - tr‸`)).labels).toContain('trace');
    expect((await offered(`${HEAD}limits:\n  - ‸\n`)).labels).toEqual(['insertion-loss', 'return-loss', 'eye']);
  });
  test('a via comes with what it needs, indented, and computes at once', async () => {
    const text = await taken(
      `${HEAD}${START}  - vi‸\n  - trace: run\n    stackup: board.main\n    layer: L3\n    length: 30 mm\n    impedance: 100 ohm\n`,
      'via',
    );
    expect(text).toContain(
      '  - via: via-1\n    stackup: board.main\n    drill: 0.25 mm\n    antipad: 0.75 mm\n    pitch: 0.9 mm\n',
    );
    const analysis = await analysed(text, {}, 'time');
    expect(analysis.findings.filter(({ severity }) => severity === 'error')).toEqual([]);
  });
  test('on a line below `path:` the dash comes too', async () => {
    expect(await taken(`${HEAD}path:\n  ‸\n`, 'capacitor')).toContain(
      'path:\n  - capacitor: capacitor-1\n    value: 100 nF',
    );
  });
});

describe('keys', () => {
  test('those of the kind that are not written yet, the missing first', async () => {
    const { found, labels } = await offered(
      `${HEAD}path:\n  - via: dive\n    drill: 0.2 mm\n    ‸\n    pitch: 0.9 mm\n`,
    );
    expect(labels).not.toContain('drill');
    expect(labels).not.toContain('pitch');
    expect(
      found
        .slice(0, 2)
        .map(({ label }) => label)
        .sort(),
    ).toEqual(['antipad', 'stackup']);
  });
  test('in a flow mapping, in a nested one, at the top', async () => {
    expect((await offered(`${HEAD}path:\n  - { via: dive, ‸ }`)).labels).toContain('backdrill');
    expect((await offered(`${HEAD}path:\n  - via: dive\n    backdrill: { ‸ }`)).labels).toEqual(['top', 'bottom']);
    expect((await offered(`${HEAD}‸`)).labels).toContain('transmitter');
  });
  test('a key whose colon is there is only renamed', async () => {
    expect(await taken(`${HEAD}path:\n  - trace: a\n    lengt‸: 3 mm\n`, 'length')).toContain('    length: 3 mm');
  });
});

describe('values', () => {
  test('layers, the one that the path has reached preselected', async () => {
    const { found } = await offered(`${HEAD}${START}  - trace: next\n    stackup: board.main\n    layer: ‸\n`);
    expect(found[0]).toMatchObject({ label: 'L1', preselect: true });
    expect(found.map(({ label }) => label)).toEqual(['L1', 'L3', 'L2', 'L4']);
  });
  test('stackups and parts of the kind, prefixed', async () => {
    expect((await offered(`${HEAD}path:\n  - trace: a\n    stackup: ‸\n`)).found[0].label).toBe('board.main');
    expect((await offered(`${HEAD}path:\n  - connector: a\n    part: ‸\n`)).labels).toContain('board.mate');
    expect((await offered(`${HEAD}path:\n  - cable: a\n    part: ‸\n`)).labels).not.toContain('board.mate');
  });
  test('elements, choices, a free name', async () => {
    expect((await offered(`${HEAD}${START}limits:\n  - insertion-loss: a\n    between: [st‸]\n`)).labels).toEqual([
      'start',
    ]);
    expect((await offered('lanewright: 1\nmodulation: ‸\n')).labels).toEqual(['NRZ', 'PAM4']);
    expect((await offered(`${HEAD}path:\n  - trace: ‸\n`)).labels).toEqual(['trace-1']);
  });
  test('units behind a number, and the frequency behind @', async () => {
    expect((await offered(`${HEAD}path:\n  - trace: a\n    length: 12‸\n`)).labels).toContain('12 mil');
    expect(await taken(`${HEAD}path:\n  - trace: a\n    length: 12 m‸\n`, '12 mm')).toContain('length: 12 mm\n');
    expect((await offered(`${HEAD}${START}limits:\n  - insertion-loss: a\n    max: 12 dB @ ‸\n`)).labels).toEqual([
      '@ nyquist',
    ]);
    expect((await offered(`${HEAD}${START}  - cable: c\n    loss: 1 dB/m @ ‸\n`)).labels).toEqual(['@ 5 GHz']);
  });
  test('directly behind the colon the space is written too', async () => {
    expect(await taken('lanewright: 1\nmodulation:‸\n', 'NRZ')).toContain('modulation: NRZ\n');
  });
});

describe('paths', () => {
  const folders: Record<string, { name: string; kind: 'file' | 'folder' }[]> = {
    '': [
      { name: 'board.parts.yaml', kind: 'file' },
      { name: 'models', kind: 'folder' },
      { name: 'notes.txt', kind: 'file' },
    ],
    models: [{ name: 'a.s4p', kind: 'file' }],
  };
  const list = async (folder: string) => folders[folder] ?? [];
  test('files of the kind wanted, and folders, which ask again', async () => {
    const { labels } = await offered('lanewright: 1\nuse:\n  b: ‸\n', { list });
    expect(labels).toEqual(['board.parts.yaml', 'models/']);
    expect((await offered('lanewright: 1\npath:\n  - block: a\n    touchstone: models/‸\n', { list })).labels).toEqual([
      'a.s4p',
    ]);
  });
  test('nothing above the root is looked at', async () => {
    const asked: string[] = [];
    await offered('lanewright: 1\nuse:\n  b: ../../‸\n', {
      list: async (folder) => {
        asked.push(folder);
        return [];
      },
    });
    expect(asked).toEqual([]);
  });
});

test('a stackup of a parts file that is not used yet brings its `use` entry', async () => {
  const parsed = (await analysed(BOARD, {}, 'model', 'boards/other.parts.yaml')).parsed;
  const library = async (): Promise<Library> => parsed;
  const text = await taken('lanewright: 1\nline-rate: 10 Gb/s\npath:\n  - trace: a\n    stackup: ‸\n', 'other.main', {
    library,
  });
  expect(text).toBe(
    'lanewright: 1\nline-rate: 10 Gb/s\nuse:\n  other: boards/other.parts.yaml\n\npath:\n  - trace: a\n    stackup: other.main\n',
  );
});

test('nothing is offered in a comment', async () => {
  expect((await offered(`${HEAD}path: # ‸`)).found).toEqual([]);
});

test.each([
  ['an unknown kind', '  - trcae: tail\n    length: 3 mm\n    ‸\n', ['stackup', 'layer'], []],
  ['no kind', '  - length: 3 mm\n    layer: L1\n    ‸\n', ['trace', 'stackup', 'width'], ['drill']],
  ['two kinds', '  - trace: tail\n    via: tail\n    ‸\n', ['length', 'stackup'], []],
])('an entry with %s keeps its completion', async (_, entry, wanted, others) => {
  const { labels } = await offered(`${HEAD}${START}${entry}`);
  expect(labels).toEqual(expect.arrayContaining(wanted));
  for (const other of others) expect(labels).not.toContain(other);
});

test('`includes` offers what stands beside, beyond what it names already', async () => {
  const path = (includes: string) =>
    `${HEAD}${START}  - via: dive\n    part: board.hole\n  - connector: mate\n    includes: ${includes}\n  - stub: probe\n  - trace: far\n`;
  expect((await offered(path('[‸]'))).labels).toEqual(['dive', 'probe']);
  expect((await offered(path('[dive, ‸]'))).labels).toEqual(['start', 'probe']);
  expect((await offered(path('[probe, di‸ve]'))).labels).toEqual(['dive', 'far']);
});
