import { reportedByStages } from './reported';
import type { Rule } from './types';

export const ambiguousName: Rule = {
  name: 'ambiguous-name',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A name without its prefix that two used files declare. Prefixes may be left out only while there is one such name. Both places are shown;
the fixes write either prefix.`,
  bad: 'use: { board: board.parts.yaml, other: other.parts.yaml }\npath: [{ via: dive, part: hole }]',
  good: 'use: { board: board.parts.yaml, other: other.parts.yaml }\npath: [{ via: dive, part: board.hole }]',
  check: reportedByStages,
};
