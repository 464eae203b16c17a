import type { Element, Model } from '../model/types';
import type { ElementFacts, ElementKind, ElementNote, NetworkContext, StubFact, TwoPort } from '../networks/types';
import { appendLine, appendShunt, scatterChain, startChain } from '../physics/chain';
import { wideBandLogarithm } from '../physics/laminate';
import { LEAST_RATIO } from '../physics/via-barrel';
import { show } from '../quantity/show';
import { equalLegs, legReference } from './line';
import { type Medium, mediumOf, type OpenStub, stretchAt, stubAdmittance, stubNotch } from './open-stub';
import { perGrid } from './per-grid';
import { endsInStackup, padDiameter, type ViaParameters, type ViaStructure, viaStructure } from './via-structure';
import { isPair, rangeNote } from './written';

/**
 * A via, or a pair: pads and stubs at the layers that it joins, stretches of barrel between. Legs alike and uncoupled in the sense of
 * `barrelPerMeter`, so both modes see the same. Copper's own loss is left out: some thousandths of a dB.
 */
export const viaKind: ElementKind<ViaParameters> = {
  prepare(element, { model }) {
    const via = element as Element<'via'>;
    const { drill, antipad, pitch } = via.values;
    const ends = via.stackup && endsInStackup(via, via.stackup);
    if (!via.stackup || !ends || !drill || !antipad || (isPair(model) && !pitch)) return undefined;
    const structure = viaStructure(via, via.stackup, ends, model);
    return { parameters: structure.parameters, facts: factsOf(structure, model), notes: rangeNotes(via, model) };
  },
  network: viaNetwork,
};

function factsOf({ parameters, barrelMeters, stubs }: ViaStructure, model: Model): ElementFacts {
  const [log] = wideBandLogarithm([model.nyquistFrequency]);
  const sections = parameters.barrel.map(mediumOf).map(({ lengthMeters, inductance, capacitance, infinite, slope }) => {
    const loaded = capacitance * (infinite + slope * log);
    return { seconds: lengthMeters * Math.sqrt(inductance * loaded), ohmSeconds: lengthMeters * inductance };
  });
  const delaySeconds = sections.reduce((sum, { seconds }) => sum + seconds, 0);
  // of all stretches together: total inductance over total delay
  const legOhms = sections.reduce((sum, { ohmSeconds }) => sum + ohmSeconds, 0) / delaySeconds;
  return {
    lengthMeters: barrelMeters,
    impedanceOhms: isPair(model) ? 2 * legOhms : legOhms,
    commonImpedanceOhms: isPair(model) ? legOhms / 2 : undefined,
    delaySeconds,
    construction: isPair(model) ? 'pair of barrels' : 'coaxial barrel',
    stubs: stubs.filter(({ lengths }) => lengths.range[1] > 0).map(stubFact),
  };
}

function stubFact({ side, lengths, ofLength }: ViaStructure['stubs'][number]): StubFact {
  return {
    side,
    lengthMeters: lengths.nominal,
    lengthRangeMeters: lengths.range,
    notchHz: stubNotch(ofLength(lengths.nominal)),
    lowestNotchHz: stubNotch(ofLength(lengths.range[1])),
  };
}

/** Where the barrel's formulas say nothing. */
function rangeNotes(via: Element<'via'>, model: Model): ElementNote[] {
  const { drill, antipad, pitch } = via.values;
  if (!drill || !antipad) return [];
  const notes: ElementNote[] = [];
  const pad = padDiameter(via.values);
  const largest = Math.max(pad, drill.value);
  if (antipad.value < LEAST_RATIO * largest)
    notes.push(
      rangeNote(
        via,
        `The antipad (${show.length(antipad.value)}) must be larger than the ${pad > drill.value ? 'pad' : 'hole'} (${show.length(largest)}) in it: ${show.length(LEAST_RATIO * largest)} is taken.`,
        'antipad',
      ),
    );
  if (!isPair(model) || !pitch) return notes;
  if (pitch.value < LEAST_RATIO * drill.value)
    notes.push(
      rangeNote(
        via,
        `The holes of this pair overlap: the pitch (${show.length(pitch.value)}) must be larger than the drill (${show.length(drill.value)}).`,
        'pitch',
      ),
    );
  else if (antipad.value > 2 * pitch.value)
    notes.push(
      rangeNote(
        via,
        `The antipad (${show.length(antipad.value)}) is wider than twice the pitch: the model of a pair does not hold there.`,
        'antipad',
      ),
    );
  return notes;
}

function viaNetwork(parameters: ViaParameters, context: NetworkContext) {
  const { frequencies } = context;
  const reference = legReference(context);
  const log = perGrid(frequencies, 'laminate-logarithm', () => wideBandLogarithm(frequencies));
  const barrel = parameters.barrel.map(mediumOf);
  const enter = endOf(parameters.enterFarads, parameters.enterStub);
  const leave = endOf(parameters.leaveFarads, parameters.leaveStub);
  const leg: TwoPort = new Float64Array(8 * frequencies.length);
  const chain = new Float64Array(8);
  const [y, h, z] = [new Float64Array(2), new Float64Array(4), new Float64Array(2)];
  const appendEnd = ({ farads, media, endFarads }: JointEnd, omega: number, re: number, im: number) => {
    appendShunt(chain, 0, omega * farads);
    if (media.length === 0) return;
    stubAdmittance(media, endFarads, omega, re, im, y, h, z);
    appendShunt(chain, y[0], y[1]);
  };
  for (let i = 0; i < frequencies.length; i++) {
    const omega = 2 * Math.PI * frequencies[i];
    const re = log[2 * i];
    const im = log[2 * i + 1];
    startChain(chain);
    appendEnd(enter, omega, re, im);
    for (const medium of barrel) {
      stretchAt(medium, omega, re, im, h, z);
      appendLine(chain, h, z[0], z[1]);
    }
    appendEnd(leave, omega, re, im);
    scatterChain(chain, reference, leg, 8 * i);
  }
  return equalLegs(leg, context);
}

/** What stands at a joint: the pad, and a stub where there is one. */
interface JointEnd {
  readonly farads: number;
  readonly media: readonly Medium[];
  readonly endFarads: number;
}

const endOf = (farads: number, stub: OpenStub | undefined): JointEnd => ({
  farads,
  media: stub ? stub.stretches.map(mediumOf) : [],
  endFarads: stub?.endFarads ?? 0,
});
