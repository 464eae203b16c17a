import { reportedByStages } from './reported';
import type { Rule } from './types';

export const schema: Rule = {
  name: 'schema',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A key that its mapping does not have, a key that is missing, a value of the wrong shape. The kind of an element or limit, its first
key, chooses what is wanted of it; where a name is near, the fix writes it. Keys that begin with \`x-\` are kept and ignored.`,
  bad: 'path: [{ capacitor: coupling, value: 100 nF, refdess: C1 }]',
  good: 'path: [{ capacitor: coupling, value: 100 nF, refdes: C1 }]',
  check: reportedByStages,
};
