import { reportedByStages } from './reported';
import type { Rule } from './types';

export const modelRange: Rule = {
  name: 'model-range',
  severity: 'info',
  reads: 'networks',
  options: {},
  doc: `An element lies outside the range in which its model holds: a line narrower or wider than the published form was fitted for, antipads
that overlap, a laminate far above its highest frequency. The figure is still an estimate of the right kind; its error is not known.`,
  bad: '',
  good: '',
  check: reportedByStages,
};
