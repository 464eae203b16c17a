import type { ElementValues } from '../../schemas/format/types';
import type { ElementKind, ElementNote, NetworkContext, TwoPort } from '../networks/types';
import { appendLine, appendShunt, hyperbolic, scatterChain, startChain } from '../physics/chain';
import { declaredWave, scatterDeclared } from './declared-line';
import { declaredLine, legOhms } from './declared-segment';
import { type Line, legReference } from './line';
import { delaySecondLeg } from './skew';
import { endsOf, hasTolerance, isPair, lossPoints, rangeNote, SKIN_SHARE } from './written';

export interface ConnectorParameters {
  readonly line: Extract<Line, { model: 'declared' }>;
  /** Of each leg, half at each end. */
  readonly capacitanceFarads: number;
}

/** A connector without a file: half its capacitance, a line of its delay, impedance and loss, the other half. */
export const connectorKind: ElementKind<ConnectorParameters> = {
  prepare(element, { model }) {
    const values = element.values as Partial<ElementValues['connector']>;
    const { impedance, delay, loss = [], skew, capacitance } = values;
    if (!impedance || !delay) return undefined;
    const pair = isPair(model);
    const notes: ElementNote[] = [];
    if (skew?.dimension === 'length')
      notes.push(
        rangeNote(
          element,
          'A connector has no length of its own: write its skew as a time. It is left out until then.',
          'skew',
        ),
      );
    const skewSeconds = pair && skew?.dimension === 'time' ? skew.value : 0;
    const line = declaredLine({
      ...legOhms(values, impedance.value, pair),
      points: lossPoints(loss, model),
      skinShare: values['skin-share']?.value ?? SKIN_SHARE.connector,
      delaySeconds: delay.value,
      skewSeconds,
    });
    return {
      parameters: { line, capacitanceFarads: capacitance?.value ?? 0 },
      facts: {
        impedanceOhms: impedance.value,
        commonImpedanceOhms: pair ? (values['common-impedance']?.value ?? impedance.value / 4) : undefined,
        impedanceRangeOhms: hasTolerance(impedance) ? endsOf(impedance) : undefined,
        delaySeconds: delay.value,
        skewSeconds,
        construction: 'declared',
        stubs: [],
      },
      notes,
    };
  },
  network({ line, capacitanceFarads }, context) {
    const differential = withEnds(line, 'odd', capacitanceFarads / 2, context);
    if (context.singleEnded) return { differential };
    const common = line.alike ? differential : withEnds(line, 'even', capacitanceFarads / 2, context);
    return delaySecondLeg({ differential, common }, line.skewSeconds, context.frequencies);
  },
};

/** The line between its two end capacitances. */
function withEnds(
  line: ConnectorParameters['line'],
  mode: 'odd' | 'even',
  farads: number,
  context: NetworkContext,
): TwoPort {
  const { frequencies } = context;
  const reference = legReference(context);
  if (farads === 0) return scatterDeclared(line, mode, frequencies, reference);
  const impedance = mode === 'odd' ? line.oddOhms : line.evenOhms;
  const wave = declaredWave(line, frequencies);
  const out: TwoPort = new Float64Array(8 * frequencies.length);
  const chain = new Float64Array(8);
  const h = new Float64Array(4);
  for (let i = 0; i < frequencies.length; i++) {
    const susceptance = 2 * Math.PI * frequencies[i] * farads;
    hyperbolic(wave[2 * i], wave[2 * i + 1], h);
    startChain(chain);
    appendShunt(chain, 0, susceptance);
    appendLine(chain, h, impedance, 0);
    appendShunt(chain, 0, susceptance);
    scatterChain(chain, reference, out, 8 * i);
  }
  return out;
}
