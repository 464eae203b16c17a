import { XMLValidator } from 'fast-xml-parser';
import { beforeAll, expect, test } from 'vitest';
import type { Review } from '../../../src-core/review/index';
import { BOARD, CHANNEL, edited, reviewed } from '../../../src-core/review/testing';
import { HOSTILE } from '../printers/testing';
import { reviewGithub, reviewGitlab, reviewJunit, reviewSarif } from './builds';

const context = { version: '0.1.0', colour: false, maxLength: 60_000 };
let review: Review;

/** The stub comes, a waiver is written, a limit is loosened; what the loss limit said of the base goes. */
beforeAll(async () => {
  const base = edited([[CHANNEL, 'max: 12 dB', 'max: 1 dB']]);
  const head = edited([
    [CHANNEL, 'part: board.hole }', 'part: board.long-hole }'],
    [CHANNEL, 'value: 100 nF', 'value: 100 pF'],
  ]);
  const channel = await reviewed(head, { base });
  review = {
    version: 1,
    base: 'main',
    head: 'my-branch',
    channels: [channel],
    unchanged: 0,
    notes: [],
    failed: { policy: 'regression', reasons: [`::error::${HOSTILE}`] },
  };
});

test('annotations: loosened first, then what appeared; what was there before is not told', () => {
  const lines = reviewGithub(review, context).trimEnd().split('\n');
  expect(review.channels[0].loosened).toHaveLength(1);
  const commands = lines.filter((line) => line.startsWith('::'));
  expect(commands.filter((line) => line.includes('title=loosened'))).toHaveLength(1);
  expect(commands.some((line) => line.includes('title=stub-resonance'))).toBe(true);
  expect(commands).toHaveLength(1 + review.channels[0].appeared.length);
});

test('why it fails stands below, and is no command', () => {
  const lines = reviewGithub(review, context).trimEnd().split('\n');
  expect(lines.at(-1)).toMatch(/^fails by `regression`: /);
  expect(lines.at(-1)).not.toMatch(/##\[|[\u0000-\u001f\u202e]/);
});

test('SARIF: new, and gone', () => {
  const { results } = JSON.parse(reviewSarif(review, context)).runs[0];
  const states = results.map(({ ruleId, baselineState }: Record<string, string>) => [ruleId, baselineState]);
  expect(states).toContainEqual(['stub-resonance', 'new']);
  expect(states).toContainEqual(['insertion-loss', 'absent']);
});

test('JUnit and code quality tell the head as `check` does', () => {
  const { head } = review.channels[0];
  expect(XMLValidator.validate(reviewJunit(review, context))).toBe(true);
  expect(reviewJunit(review, context)).toContain('name="insertion-loss: whole"');
  const entries = JSON.parse(reviewGitlab(review, context));
  expect(entries.map(({ check_name }: { check_name: string }) => check_name)).toEqual(
    head!.findings.map(({ rule }) => rule),
  );
});

test('what a parts file has wrong is told once for all channels that use it', async () => {
  const wrong = edited([
    [BOARD, '{ copper: L2, thickness: 17 um, plane: true }', '{ copper: L2, thickness: 17, plane: true }'],
  ]);
  const channel = await reviewed(wrong);
  const two = { ...review, channels: [channel, { ...channel, file: 'other.channel.yaml' }] };
  const quantities = JSON.parse(reviewGitlab(two, context)).filter(
    ({ location }: { location: { path: string } }) => location.path === BOARD,
  );
  expect(quantities.length).toBe(channel.head!.findings.filter(({ at }) => at.file === BOARD).length);
  expect(quantities.length).toBeGreaterThan(0);
});
