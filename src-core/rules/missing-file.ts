import { reportedByStages } from './reported';
import type { Rule } from './types';

export const missingFile: Rule = {
  name: 'missing-file',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A parts file or Touchstone file that is not there. Paths are relative to the file that names them.`,
  bad: 'use: { board: board.parts.yaml, other: other.parts.yaml, far: far.parts.yaml }',
  good: 'use: { board: board.parts.yaml, other: other.parts.yaml }',
  check: reportedByStages,
};
