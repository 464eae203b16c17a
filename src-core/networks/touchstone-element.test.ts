import { describe, expect, test } from 'vitest';
import type { AnyElement, FileReference, Model } from '../model/types';
import { contextOf, equalLegs, lineOf, linspace, twoPortOf } from './testing';
import { readTouchstone } from './touchstone';
import { prepareFile } from './touchstone-element';
import { writeTouchstone } from './touchstone-write';

const model = { symbolRate: 25e9, nyquistFrequency: 12.5e9, signalling: 'differential', referenceOhms: 100 } as Model;
const place = { file: 'lane.channel.yaml', path: ['path', 2, 'touchstone'] };

function element(file: Partial<FileReference>, more: Partial<AnyElement> = {}): AnyElement {
  return {
    kind: 'connector',
    name: 'mate',
    reversed: false,
    active: false,
    places: {},
    file: { file: 'mate.s4p', place, ...file },
    ...more,
  } as AnyElement;
}

/** Two uncoupled legs of 100 ps as a four-port whose throughs are 1-2 and 3-4, up to a frequency. */
function lineFile(endHz: number, transmission = 1): string {
  const frequencies = linspace(0, endHz, 200);
  const leg = twoPortOf(frequencies, (f) => lineOf(50, 2 * Math.PI * f * 100e-12, 0.1 + f / 1e11), 50).map(
    (value) => value * transmission,
  );
  return writeTouchstone(equalLegs(leg), contextOf(frequencies));
}

const prepare = (text: string, which: AnyElement, name = 'mate.s4p') =>
  prepareFile(which, model, readTouchstone(text, name));
const said = ({ prepared }: ReturnType<typeof prepare>) =>
  prepared.notes.map(({ rule, message }) => `${rule}: ${message}`);

describe('which ports', () => {
  const written = (enter: number[], leave: number[], more: Partial<AnyElement> = {}) => element({ enter, leave }, more);

  test('a map that goes through is taken, with the delay of its through', () => {
    const file = prepare(lineFile(120e9), written([1, 3], [2, 4]));
    expect(said(file)).toEqual([]);
    expect(file.prepared.facts.delaySeconds).toBeCloseTo(100e-12, 14);
    expect(file.evaluate!(contextOf(Float64Array.of(0))).differential[4]).toBeGreaterThan(0.85);
  });

  test('one that joins others is told, with a fix that writes the one that does, over what is written or beside the file', () => {
    const beside = prepare(lineFile(120e9), written([1, 2], [3, 4]));
    expect(said(beside)).toHaveLength(1);
    expect(said(beside)[0]).toContain('the signal goes from port 1 to 2 and 3 to 4');
    const mended = '{ enter: [1, 3], leave: [2, 4] }';
    expect(beside.prepared.notes[0].fixes![0].edits).toEqual([
      { op: 'set', at: { file: place.file, path: ['path', 2] }, key: 'ports', text: mended, after: 'touchstone' },
    ]);
    const ports = { file: place.file, path: ['path', 2, 'ports'] };
    const over = prepare(lineFile(120e9), written([1, 2], [3, 4], { places: { ports } }));
    expect(over.prepared.notes[0]).toMatchObject({
      at: ports,
      fixes: [{ edits: [{ op: 'value', at: ports, text: mended }] }],
    });
  });

  test('without a map, the one that goes through', () => {
    expect(prepare(lineFile(120e9), element({})).prepared.parameters).toMatchObject({
      placement: { enter: [1, 3], leave: [2, 4] },
    });
  });

  test.each([
    ['a port that is not there', [1, 5], [2, 4], 'there is no port 5'],
    ['unequal sides', [1, 3], [2], 'As many ports'],
    ['nothing leaves', [1], [], 'No port leaves'],
  ])('%s is told, and no network made', (_, enter, leave, words) => {
    const file = prepare(lineFile(120e9), written(enter, leave));
    expect(said(file)[0]).toContain(words);
    expect(file.evaluate).toBeUndefined();
  });

  test('a one-port stands on a stub only', () => {
    const text = '# GHz S RI\n0 1 0\n120 1 0\n';
    expect(said(prepare(text, element({}), 'open.s1p'))[0]).toContain('may stand on a `stub` only');
    expect(said(prepare(text, element({}, { kind: 'stub' } as Partial<AnyElement>), 'open.s1p'))).toEqual([]);
  });
});

describe('what its data lack', () => {
  const ports = { enter: [1, 3], leave: [2, 4] };

  test('a range that leaves cursors open, by how much and how it is filled', () => {
    const file = prepare(lineFile(15e9), element(ports));
    expect(file.prepared.notes).toMatchObject([{ rule: 'data-range', at: place }]);
    expect(said(file)[0]).toMatch(
      /reach from 0 Hz to 15 GHz .* taper to nothing at 22.5 GHz. Cursors may be off by up to [\d.]+ % of the main one/,
    );
    expect(file.prepared.notes[0].value).toBeGreaterThan(0.01);
  });

  test('the wider the range the less is open, and at twice the symbol rate nothing to speak of', () => {
    const open = [8e9, 15e9, 25e9].map((end) => prepare(lineFile(end), element(ports)).prepared.notes[0]?.value ?? 0);
    expect(open).toEqual([...open].sort((a, b) => b - a));
    expect(said(prepare(lineFile(50e9), element(ports)))).toEqual([]);
  });

  test('gain, unless it may', () => {
    const text = lineFile(120e9, 1.3);
    expect(said(prepare(text, element(ports)))[0]).toMatch(/^passivity: .*largest singular value is 1\.1[78] at 0 Hz/);
    expect(said(prepare(text, element(ports, { active: true })))).toEqual([]);
  });

  test('a line that cannot be read, with its number', () => {
    expect(said(prepare('# GHz S RI\n1 2 3\n', element(ports)))).toEqual([
      'touchstone: `mate.s4p`, line 2: The last frequency has 3 of the 33 numbers that 4 ports need.',
    ]);
  });
});

test('the same data under the same map have the same key, other data another', () => {
  const result = readTouchstone(lineFile(120e9), 'mate.s4p');
  const keys = [result, result, readTouchstone(lineFile(110e9), 'mate.s4p')].map(
    (one) => prepareFile(element({}), model, one).key,
  );
  expect(keys[0]).toBe(keys[1]);
  expect(keys[0]).not.toBe(keys[2]);
  expect(prepareFile(element({}, { reversed: true }), model, result).key).not.toBe(keys[0]);
});
