import { describe, expect, test } from 'vitest';
import { cursorAt } from './cursor';
import { atCursor } from './testing';

const seen = (marked: string) => {
  const { text, offset } = atCursor(marked);
  const cursor = cursorAt(text, offset);
  return (
    cursor && {
      path: cursor.path,
      on: cursor.on,
      typed: cursor.typed,
      keys: [...(cursor.levels.at(-1)?.keys.keys() ?? [])],
    }
  );
};

describe('in blocks', () => {
  test('a key at the top', () => {
    expect(seen('lanewright: 1\nli‸\npath:\n')).toEqual({
      path: [],
      on: 'key',
      typed: 'li',
      keys: ['lanewright', 'path'],
    });
  });
  test('an empty line inside an entry, its other keys seen above and below', () => {
    expect(seen('path:\n  - trace: a\n    layer: L1\n    ‸\n    length: 3 mm\n  - via: b\n')).toEqual({
      path: ['path', 0],
      on: 'key',
      typed: '',
      keys: ['layer', 'trace', 'length'],
    });
  });
  test('behind a dash', () => {
    expect(seen('path:\n  - trace: a\n  - ‸\n')).toEqual({ path: ['path', 1], on: 'item', typed: '', keys: [] });
    expect(seen('path:\n- trace: a\n- vi‸\n')).toEqual({ path: ['path', 1], on: 'item', typed: 'vi', keys: [] });
  });
  test('a value', () => {
    expect(seen('path:\n  - trace: a\n    layer: ‸\n    stackup: sled.main\n')).toEqual({
      path: ['path', 0, 'layer'],
      on: 'value',
      typed: '',
      keys: ['trace', 'stackup'],
    });
    expect(seen('path:\n  - trace: ‸')).toEqual({ path: ['path', 0, 'trace'], on: 'value', typed: '', keys: [] });
  });
  test('a nested mapping', () => {
    expect(seen('path:\n  - via: a\n    backdrill:\n      bo‸')).toEqual({
      path: ['path', 0, 'backdrill'],
      on: 'key',
      typed: 'bo',
      keys: [],
    });
    expect(seen('transmitter:\n  swing: 1 V\n  ‸')).toEqual({
      path: ['transmitter'],
      on: 'key',
      typed: '',
      keys: ['swing'],
    });
  });
  test('nothing is offered in a comment', () => {
    expect(seen('path: # al‸')).toBeUndefined();
  });
});

describe('in flow', () => {
  test('keys and values of an entry', () => {
    expect(seen('path:\n  - { via: dive, ‸ }')).toEqual({ path: ['path', 0], on: 'key', typed: '', keys: ['via'] });
    expect(seen('path:\n  - { via: dive, to: L‸, drill: 1 mm }')).toEqual({
      path: ['path', 0, 'to'],
      on: 'value',
      typed: 'L',
      keys: ['via', 'drill'],
    });
  });
  test('nested, and lists', () => {
    expect(seen('path:\n  - via: a\n    backdrill: { ‸')).toEqual({
      path: ['path', 0, 'backdrill'],
      on: 'key',
      typed: '',
      keys: [],
    });
    expect(seen('limits:\n  - eye: a\n    between: [one, tw‸]')).toEqual({
      path: ['limits', 0, 'between', 1],
      on: 'value',
      typed: 'tw',
      keys: ['eye'],
    });
    expect(seen('materials:\n  core: { dk: { through: 3, ‸ } }')).toEqual({
      path: ['materials', 'core', 'dk'],
      on: 'key',
      typed: '',
      keys: ['through'],
    });
  });
  test('a bracket that was forgotten above does not count', () => {
    expect(seen('transmitter: { swing: 1 V\npath:\n  - trace: a\n    ‸')?.path).toEqual(['path', 0]);
  });
});

test('rows of a stackup', () => {
  expect(seen('stackups:\n  main:\n    - { copper: L1, ‸ }')).toEqual({
    path: ['stackups', 'main', 0],
    on: 'key',
    typed: '',
    keys: ['copper'],
  });
  expect(seen('stackups:\n  main:\n    - { copper: L1, thickness: 1 um }\n    - { ‸')?.path).toEqual([
    'stackups',
    'main',
    1,
  ]);
});

test('a text that nests without end has no place in it, and costs no more than its length', () => {
  for (const piece of ['[', '{a: ', '- ', '{ a: b, ']) {
    const text = piece.repeat(100_000);
    expect(cursorAt(text, text.length)).toBeUndefined();
  }
  const deep = Array.from({ length: 200 }, (_, depth) => `${' '.repeat(depth)}a:`).join('\n');
  expect(cursorAt(deep, deep.length)).toBeUndefined();
});
