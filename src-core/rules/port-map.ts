import { reportedByStages } from './reported';
import type { Rule } from './types';

export const portMap: Rule = {
  name: 'port-map',
  severity: 'error',
  reads: 'networks',
  options: {},
  doc: `With this \`ports\` map the signal does not go through the file: each entering port is coupled best to another port than the one that
it is paired with. Vendors number ports in two ways; the fix writes the map that goes through.`,
  bad: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 2], leave: [3, 4] }, includes: [] }]',
  alsoGives: ['insertion-loss', 'return-loss', 'eye', 'grid-limit', 'internal'],
  good: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
