import { reportedByStages } from './reported';
import type { Rule } from './types';

export const waiverOutdated: Rule = {
  name: 'waiver-outdated',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `The last day of a waiver is over. Its finding counts again; whoever accepted it must look anew, and set a new day or mend the fault. Days are
those of UTC, or of \`--date\`.`,
  bad: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]\nwaivers: [{ rule: insertion-loss, at: whole, up-to: 12 dB, until: 2026-01-15, by: me, reason: an old board }]',
  alsoGives: ['insertion-loss'],
  good: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]\nwaivers: [{ rule: insertion-loss, at: whole, up-to: 12 dB, until: 2026-12-31, by: me, reason: an old board }]',
  check: reportedByStages,
};
