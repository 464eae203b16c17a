import { expect, test } from 'vitest';
import { keepProgress } from './progress';

function harness(supported = true) {
  const told: string[] = [];
  let time = 0;
  const reporter = {
    begin: (_title: string, _share: unknown, label: string) => told.push(`begin ${label}`),
    report: (label: string) => told.push(label),
    done: () => told.push('done'),
  };
  const connection = { window: { createWorkDoneProgress: async () => reporter } };
  const progress = keepProgress(
    connection as never,
    () => supported,
    () => time,
  );
  return { progress, told, wait: (milliseconds: number) => void (time += milliseconds) };
}

test('work of half a second is not spoken of', async () => {
  const { progress, told, wait } = harness();
  await progress.working('a');
  wait(499);
  await progress.working('b');
  progress.idle();
  wait(10_000);
  await progress.working('c');
  expect(told).toEqual([]);
});

test('longer work is, until it ends', async () => {
  const { progress, told, wait } = harness();
  await progress.working('a');
  wait(500);
  await progress.working('b');
  await progress.working('c');
  progress.idle();
  await Promise.resolve();
  expect(told).toEqual(['begin b', 'c', 'done']);
});

test('a client that cannot show it is not asked', async () => {
  const { progress, told, wait } = harness(false);
  await progress.working('a');
  wait(9999);
  await progress.working('b');
  expect(told).toEqual([]);
});
