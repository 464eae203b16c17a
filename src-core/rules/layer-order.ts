import { reportedByStages } from './reported';
import type { Rule } from './types';

export const layerOrder: Rule = {
  name: 'layer-order',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A trace must run on the layer that the last via reached; a via must begin there, join two unlike layers and stay within its \`span\`. Traces
of two stackups need a connector, cable, package or block between them. A via that is missing in the text is missing in every figure.`,
  bad: 'path: [{ via: dive, part: board.hole, to: L6 }]',
  good: 'path: [{ via: dive, part: board.hole, to: L3 }]',
  check: reportedByStages,
};
