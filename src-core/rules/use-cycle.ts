import { reportedByStages } from './reported';
import type { Rule } from './types';

export const useCycle: Rule = {
  name: 'use-cycle',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `Parts files that \`use\` each other in a ring. Each would have to be read before the other. Take what both need into a third file.`,
  bad: '# board.parts.yaml\nuse: { board: board.parts.yaml }',
  good: '# board.parts.yaml\nuse: { other: other.parts.yaml }',
  check: reportedByStages,
};
