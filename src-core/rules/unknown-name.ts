import { reportedByStages } from './reported';
import type { Rule } from './types';

export const unknownName: Rule = {
  name: 'unknown-name',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A name that is declared nowhere the file looks: an element in \`between\` or \`includes\`, a part, stackup, material or foil. A name is looked
up in its own file first, then by its prefix in what \`use\` names; names that a used file itself uses are not passed on.`,
  bad: 'path: [{ via: dive, part: board.hold }]',
  good: 'path: [{ via: dive, part: board.hole }]',
  check: reportedByStages,
};
