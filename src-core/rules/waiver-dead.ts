import { reportedByStages } from './reported';
import type { Rule } from './types';

export const waiverDead: Rule = {
  name: 'waiver-dead',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A waiver whose finding does not exist (any more): the fault was mended, its element renamed, or the rule's name misspelt. A waiver that nobody
needs would hide the next fault. The fix removes it.`,
  bad: 'waivers: [{ rule: eye, at: main, up-to: 30 mV, until: 2026-12-31, by: me, reason: an old board }]',
  good: 'waivers: []',
  check: reportedByStages,
};
