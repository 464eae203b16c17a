import type { ElementValues } from '../../schemas/format/types';
import type { ElementKind, TwoPort } from '../networks/types';
import { appendSeries, appendShunt, scatterChain, startChain } from '../physics/chain';
import { equalLegs, legReference } from './line';

export interface CapacitorParameters {
  readonly resistanceOhms: number;
  readonly inductanceHenries: number;
  /** Of each leg, half at each end. */
  readonly padFarads: number;
}

/**
 * A series capacitor in each leg, as the band sees it: its resistance and inductance between its pads.
 * Its corner lies far below the grid, where a zero at DC would spread over thousands of cursors: droop is `link/droop`'s.
 * Equal, uncoupled legs: both modes are alike, none converts. Source: series impedance and shunt admittance in a line, Pozar,
 * Microwave Engineering, Table 4.1. Check values N-01, N-02, N-17.
 */
export const capacitorKind: ElementKind<CapacitorParameters> = {
  prepare(element) {
    const values = element.values as Partial<ElementValues['capacitor']>;
    return {
      parameters: {
        resistanceOhms: values.esr?.value ?? 0,
        inductanceHenries: values.esl?.value ?? 0,
        padFarads: values['pad-capacitance']?.value ?? 0,
      },
      facts: { construction: 'series capacitor', stubs: [] },
      notes: [],
    };
  },
  network({ resistanceOhms, inductanceHenries, padFarads }, context) {
    const { frequencies } = context;
    const reference = legReference(context);
    const leg: TwoPort = new Float64Array(8 * frequencies.length);
    const chain = new Float64Array(8);
    for (let i = 0; i < frequencies.length; i++) {
      const omega = 2 * Math.PI * frequencies[i];
      const susceptance = (omega * padFarads) / 2;
      startChain(chain);
      appendShunt(chain, 0, susceptance);
      appendSeries(chain, resistanceOhms, omega * inductanceHenries);
      appendShunt(chain, 0, susceptance);
      scatterChain(chain, reference, leg, 8 * i);
    }
    return equalLegs(leg, context);
  },
};
