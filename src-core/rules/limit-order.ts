import { reportedByStages } from './reported';
import type { Rule } from './types';

export const limitOrder: Rule = {
  name: 'limit-order',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The two names of \`between\` stand in the other order in \`path\`. A limit is from the input of the first to the output of the second
element, on the way from transmitter to receiver.`,
  bad: 'limits: [{ insertion-loss: part, between: [run, breakout], max: 12 dB @ nyquist }]',
  good: 'limits: [{ insertion-loss: part, between: [breakout, run], max: 12 dB @ nyquist }]',
  check: reportedByStages,
};
