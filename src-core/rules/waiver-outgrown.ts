import { reportedByStages } from './reported';
import type { Rule } from './types';

export const waiverOutgrown: Rule = {
  name: 'waiver-outgrown',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `The finding has grown beyond the value that its waiver accepts. It counts again; whoever accepted it must look anew.`,
  bad: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]\nwaivers: [{ rule: insertion-loss, at: whole, up-to: 1.01 dB, until: 2026-12-31, by: me, reason: an old board }]',
  alsoGives: ['insertion-loss'],
  good: 'limits: [{ insertion-loss: whole, max: 1 dB @ nyquist }]\nwaivers: [{ rule: insertion-loss, at: whole, up-to: 12 dB, until: 2026-12-31, by: me, reason: an old board }]',
  check: reportedByStages,
};
