import { reportedByStages } from './reported';
import type { Rule } from './types';

export const reservedKey: Rule = {
  name: 'reserved-key',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A key that a later version of the format will use and this one does not: it is kept, and changes nothing. No figure takes account of it,
so the verdict would be read for more than it is.`,
  bad: 'aggressors: []',
  good: 'x-aggressors: []',
  check: reportedByStages,
};
