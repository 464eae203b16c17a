import fc from 'fast-check';
import { expect, test } from 'vitest';
import { blend, type Leaf } from './blend';

const FILE = 'lane.channel.yaml';

const entry = fc.record({
  kind: fc.constantFrom('trace', 'via'),
  name: fc.constantFrom('a', 'b', 'c', 'd', 'e', 'f'),
  length: fc.constantFrom('1 mm', '2 mm', '3 mm'),
  layer: fc.option(fc.constantFrom('L1', 'L3'), { nil: undefined }),
});
type Drawn = typeof entry extends fc.Arbitrary<infer T> ? T : never;

const channelOf = (path: readonly Drawn[], rate: number, limits: readonly string[]) => ({
  'line-rate': `${rate} Gb/s`,
  path: path.map(({ kind, name, length, layer }) => ({ [kind]: name, length, ...(layer && { layer }) })),
  ...(limits.length > 0 && { limits: limits.map((name) => ({ eye: name, height: '40 mV' })) }),
});

/** Names once each, as in a file without findings. */
const channel = fc
  .tuple(
    fc.uniqueArray(entry, { selector: ({ name }) => name, maxLength: 6 }),
    fc.integer({ min: 1, max: 3 }),
    fc.uniqueArray(fc.constantFrom('x', 'y', 'z')),
  )
  .map(([path, rate, limits]) => channelOf(path, rate, limits));

const leavesOf = (base: unknown, head: unknown) => {
  const leaves: Leaf[] = [];
  blend(base, head, FILE, (leaf) => Boolean(leaves.push(leaf)));
  return leaves;
};

test('with no change taken a state is base, with all taken it is head', () => {
  fc.assert(
    fc.property(channel, channel, (base, head) => {
      expect(blend(base, head, FILE, () => false)).toEqual(base);
      expect(blend(base, head, FILE, () => true)).toEqual(head);
    }),
  );
});

test('each difference has an id of its own, the same in every state, and there is none between equal files', () => {
  fc.assert(
    fc.property(channel, channel, fc.array(fc.boolean(), { minLength: 60, maxLength: 60 }), (base, head, coins) => {
      const ids = leavesOf(base, head).map(({ id }) => id);
      expect(new Set(ids).size).toBe(ids.length);
      const asked: string[] = [];
      blend(base, head, FILE, ({ id }) => {
        asked.push(id);
        return coins[ids.indexOf(id)] ?? false;
      });
      expect(asked.sort()).toEqual(ids.sort());
      expect(leavesOf(head, head)).toEqual([]);
    }),
  );
});

test('one entry that moved is one difference, and its value another', () => {
  const base = channelOf(
    (['a', 'b', 'c', 'd'] as const).map((name) => ({
      kind: 'trace' as const,
      name,
      length: '1 mm' as const,
      layer: undefined,
    })),
    1,
    [],
  );
  const [a, b, c, d] = base.path;
  const head = { ...base, path: [b, c, { ...a, length: '2 mm' }, d] };
  expect(leavesOf(base, head).map(({ what, subject, attribute }) => `${what} ${subject} ${attribute}`)).toEqual([
    'value a length',
    'moved a position',
  ]);
  const movedAlone = blend(base, head, FILE, ({ what }) => what === 'moved') as typeof base;
  expect(movedAlone.path).toEqual([b, c, a, d]);
});
