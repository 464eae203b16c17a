import type { ElementKind } from '../networks/types';
import { declaredFacts, declaredSegment } from './declared-segment';
import { type Line, lineNetwork } from './line';
import { SKIN_SHARE } from './written';

/** A cable: a line of declared impedance, delay and loss. */
export const cableKind: ElementKind<Line> = {
  prepare({ values }, { model }) {
    const line = declaredSegment(values, model, SKIN_SHARE.cable);
    return line && { parameters: line, facts: declaredFacts(line, values, model), notes: [] };
  },
  network: lineNetwork,
};
