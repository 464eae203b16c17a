import type { ElementValues } from '../../schemas/format/types';
import type { ElementKind, TwoPort } from '../networks/types';
import { appendShunt, scatterChain, startChain } from '../physics/chain';
import { SPEED_OF_LIGHT } from '../physics/constants';
import { jointPoint, wideBandLogarithm } from '../physics/laminate';
import { DEFAULT_DELAY_HZ } from './declared-line';
import { equalLegs, legReference } from './line';
import { mediumOf, type OpenStub, stubAdmittance, stubNotch } from './open-stub';
import { perGrid } from './per-grid';
import { endsOf, frequencyOf, isPair } from './written';

/** A branch of each leg that ends open: all its keys are those of one leg. Both modes are alike. Check values N-06, N-07. */
export const stubKind: ElementKind<OpenStub> = {
  prepare(element, { model }) {
    const values = element.values as Partial<ElementValues['stub']>;
    const { length, impedance, dk, df, 'end-capacitance': end } = values;
    if (!length || !impedance || !dk) return undefined;
    const dkHz = frequencyOf(dk) ?? DEFAULT_DELAY_HZ;
    const dielectric = jointPoint(dk.value, dkHz, df?.value ?? 0, frequencyOf(df) ?? dkHz);
    const slowness = Math.sqrt(dielectric.dk) / SPEED_OF_LIGHT;
    const ofLength = (lengthMeters: number): OpenStub => ({
      stretches: [
        {
          lengthMeters,
          inductance: impedance.value * slowness,
          capacitance: slowness / (impedance.value * dielectric.dk),
          dielectric,
        },
      ],
      endFarads: end?.value ?? 0,
    });
    const range = endsOf(length);
    const nominal = ofLength(length.value);
    return {
      parameters: nominal,
      facts: {
        lengthMeters: length.value,
        impedanceOhms: isPair(model) ? 2 * impedance.value : impedance.value,
        construction: 'open branch',
        stubs: [
          {
            side: 'branch',
            lengthMeters: length.value,
            lengthRangeMeters: range,
            notchHz: stubNotch(nominal),
            lowestNotchHz: stubNotch(ofLength(range[1])),
          },
        ],
      },
      notes: [],
    };
  },
  network({ stretches, endFarads }, context) {
    const { frequencies } = context;
    const reference = legReference(context);
    const media = stretches.map(mediumOf);
    const log = perGrid(frequencies, 'laminate-logarithm', () => wideBandLogarithm(frequencies));
    const leg: TwoPort = new Float64Array(8 * frequencies.length);
    const chain = new Float64Array(8);
    const [y, h, z] = [new Float64Array(2), new Float64Array(4), new Float64Array(2)];
    for (let i = 0; i < frequencies.length; i++) {
      stubAdmittance(media, endFarads, 2 * Math.PI * frequencies[i], log[2 * i], log[2 * i + 1], y, h, z);
      startChain(chain);
      appendShunt(chain, y[0], y[1]);
      scatterChain(chain, reference, leg, 8 * i);
    }
    return equalLegs(leg, context);
  },
};
