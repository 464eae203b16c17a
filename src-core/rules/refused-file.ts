import { reportedByStages } from './reported';
import type { Rule } from './types';

export const refusedFile: Rule = {
  name: 'refused-file',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A path that leads out of the folder that is open (on the command line: out of the git work tree, the current folder or \`--root\`), by
itself or over a link, or that is no plain file. It is not read: a channel from elsewhere must not reach what is beside it.`,
  bad: 'use: { board: board.parts.yaml, other: other.parts.yaml, far: ../../far.parts.yaml }',
  good: 'use: { board: board.parts.yaml, other: other.parts.yaml }',
  check: reportedByStages,
};
