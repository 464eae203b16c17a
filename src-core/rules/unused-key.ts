import { reportedByStages } from './reported';
import type { Rule } from './types';

export const unusedKey: Rule = {
  name: 'unused-key',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A key of the format that this release does not compute with yet. It is kept; the verdict says "without" it, so that no figure is read for
more than it is.`,
  bad: '',
  good: '',
  check: reportedByStages,
};
