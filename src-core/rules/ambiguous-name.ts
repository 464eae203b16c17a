import { reportedByStages } from './reported';
import type { Rule } from './types';

export const ambiguousName: Rule = {
  name: 'ambiguous-name',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A name without its prefix that two used files declare. Prefixes may be left out only while there is one such name. Both places are shown;
the fixes write either prefix.`,
  bad: 'path: [{ connector: mate, part: mate }]',
  good: 'path: [{ connector: mate, part: board.mate }]',
  check: reportedByStages,
};
