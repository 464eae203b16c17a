import type { ElementKind } from '../networks/types';
import { declaredFacts, declaredSegment } from './declared-segment';
import { type Line, lineNetwork } from './line';
import { SKIN_SHARE } from './written';

/** The run through a chip package: a line of declared impedance, delay and loss. */
export const packageKind: ElementKind<Line> = {
  prepare({ values }, { model }) {
    const line = declaredSegment(values, model, SKIN_SHARE.package);
    return line && { parameters: line, facts: declaredFacts(line, values, model), notes: [] };
  },
  network: lineNetwork,
};
