import { expect, test } from 'vitest';
import { fuzz } from '../fuzz/fuzz';

test('a seeded tenth of the broken texts: no crash, ranges inside, other elements keep their hints', {
  timeout: 300_000,
}, async () => {
  const { texts, faults, local } = await fuzz({
    root: process.cwd(),
    seed: 20261201,
    every: 10,
    randomEdits: 10_000,
    sequences: 1000,
    say: () => {},
  });
  expect(faults).toEqual([]);
  expect(texts).toBeGreaterThan(1000);
  expect(local.cases).toBeGreaterThan(20);
  expect(local.othersKept / local.cases).toBeGreaterThanOrEqual(0.95);
  expect(local.firstFindingInside / local.cases).toBeGreaterThanOrEqual(0.95);
});
