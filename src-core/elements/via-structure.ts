import type { Element, Model, Stackup } from '../model/types';
import { barrelPerMeter, padCapacitance } from '../physics/via-barrel';
import type { OpenStub, Stretch } from './open-stub';
import { type Copper, copperIndex, inPlanePoint, type Slice, sliceOf } from './stackup';
import { endsOf, hasTolerance, isPair } from './written';

type ViaValues = Element<'via'>['values'];
export type ViaSide = 'top' | 'bottom';

/** Rows of the stackup between which a barrel stands and which it joins, all by position from the top. */
export interface ViaEnds {
  readonly first: number;
  readonly last: number;
  readonly upper: number;
  readonly lower: number;
  /** True where the transmitter side is the lower layer. */
  readonly upwards: boolean;
}

/** undefined where a layer is unknown, both are the same, or one lies outside the span. */
export function endsInStackup(element: Element<'via'>, stackup: Stackup): ViaEnds | undefined {
  const coppers = stackup.layers.flatMap((layer, i) => (layer.type === 'copper' ? [i] : []));
  const span = element.values.span?.map((name) => copperIndex(stackup, name)) ?? [
    coppers[0],
    coppers[coppers.length - 1],
  ];
  const from = copperIndex(stackup, element.from);
  const to = copperIndex(stackup, element.to);
  const ends = {
    first: Math.min(...span),
    last: Math.max(...span),
    upper: Math.min(from, to),
    lower: Math.max(from, to),
  };
  const inside = ends.first >= 0 && ends.first <= ends.upper && ends.upper < ends.lower && ends.lower <= ends.last;
  return inside ? { ...ends, upwards: from > to } : undefined;
}

/** Default pad: an annular ring of 0.1 mm. */
export const padDiameter = ({ pad, drill }: ViaValues) => pad?.value ?? (drill?.value ?? 0) + 0.2e-3;

function slicesBetween(stackup: Stackup, from: number, to: number): Slice[] {
  const slices: Slice[] = [];
  for (let i = from; i <= to; i++) {
    const slice = sliceOf(stackup, i);
    if (slice) slices.push(slice);
  }
  return slices;
}

/** Slices as stretches of barrel, alike neighbours joined. */
function stretchesOf(slices: readonly Slice[], barrel: { inductance: number; capacitance: number }): Stretch[] {
  const stretches: Stretch[] = [];
  for (const { heightMeters, material } of slices) {
    const dielectric = inPlanePoint(material);
    const last = stretches[stretches.length - 1];
    if (last && JSON.stringify(last.dielectric) === JSON.stringify(dielectric))
      stretches[stretches.length - 1] = { ...last, lengthMeters: last.lengthMeters + heightMeters };
    else stretches.push({ lengthMeters: heightMeters, ...barrel, dielectric });
  }
  return stretches;
}

/** The first `lengthMeters` of stretches. */
function cut(stretches: readonly Stretch[], lengthMeters: number): Stretch[] {
  let left = lengthMeters;
  return stretches.flatMap((stretch) => {
    const taken = Math.min(left, stretch.lengthMeters);
    left -= taken;
    return taken > 0 ? [{ ...stretch, lengthMeters: taken }] : [];
  });
}

/** How far the field of a pad's edge reaches: its thickness and, on either side, half the clearance or the next layer. */
function padReach(stackup: Stackup, index: number, clearanceMeters: number): number {
  const beside = [index - 1, index + 1].map((i) => {
    const layer = stackup.layers[i];
    return layer?.type === 'dielectric' ? Math.min(layer.thicknessMeters, clearanceMeters / 2) : 0;
  });
  return stackup.layers[index].thicknessMeters + beside[0] + beside[1];
}

/** Lengths that a stub may have: nominal and both ends of its tolerance. */
export interface StubLengths {
  readonly nominal: number;
  readonly range: readonly [number, number];
  readonly drilled: boolean;
}

/** What a backdrill leaves of a stub of `available` metres; a remainder without ± takes the drill rules'. */
export function stubLengths(available: number, remaining: ViaValues['drill'], toleranceMeters: number): StubLengths {
  if (!remaining || remaining.value >= available)
    return { nominal: available, range: [available, available], drilled: false };
  const [low, high] = hasTolerance(remaining)
    ? endsOf(remaining)
    : [remaining.value - toleranceMeters, remaining.value + toleranceMeters];
  const within = (meters: number) => Math.min(Math.max(meters, 0), available);
  return { nominal: remaining.value, range: [within(low), within(high)], drilled: true };
}

export interface ViaStub extends OpenStub {
  readonly side: ViaSide;
}

/** A via as its network needs it, per leg. Stubs at a joint: on its outer side. */
export interface ViaParameters {
  /** From the transmitter side on. */
  readonly barrel: readonly Stretch[];
  readonly enterFarads: number;
  readonly leaveFarads: number;
  readonly enterStub?: ViaStub;
  readonly leaveStub?: ViaStub;
}

export interface ViaStructure {
  readonly parameters: ViaParameters;
  readonly barrelMeters: number;
  readonly stubs: readonly {
    readonly side: ViaSide;
    readonly lengths: StubLengths;
    readonly ofLength: (meters: number) => OpenStub;
  }[];
}

/** Derives barrel, pads and stubs of a via from its stackup. `drill`, `antipad` and, in a pair, `pitch` must be known. */
export function viaStructure(element: Element<'via'>, stackup: Stackup, ends: ViaEnds, model: Model): ViaStructure {
  const { values } = element;
  const hole = values.drill?.value ?? 0;
  const antipad = values.antipad?.value ?? 0;
  const pad = padDiameter(values);
  const barrel = barrelPerMeter(hole, antipad, isPair(model) ? values.pitch?.value : undefined);
  const padAt = (index: number) => {
    const slice = sliceOf(stackup, index);
    const dk = slice ? inPlanePoint(slice.material).dk : 1;
    return padCapacitance(pad, hole, antipad, padReach(stackup, index, Math.max(0, antipad - pad)), dk);
  };
  const tolerance = stackup.drillRules.backdrillToleranceMeters ?? 0;
  const stubOn = (side: ViaSide) => {
    const slices =
      side === 'top'
        ? slicesBetween(stackup, ends.first, ends.upper - 1).reverse()
        : slicesBetween(stackup, ends.lower + 1, ends.last);
    const stretches = stretchesOf(slices, barrel);
    const available = stretches.reduce((sum, { lengthMeters }) => sum + lengthMeters, 0);
    const lengths = stubLengths(available, values.backdrill?.[side], tolerance);
    // a drilled barrel has lost its outer pad
    const endFarads = lengths.drilled ? 0 : padAt(side === 'top' ? ends.first : ends.last);
    const ofLength = (meters: number): OpenStub => ({ stretches: cut(stretches, meters), endFarads });
    return { side, lengths, ofLength };
  };
  const through = stretchesOf(slicesBetween(stackup, ends.upper, ends.lower), barrel);
  const stubs = [
    ...(ends.upper > ends.first ? [stubOn('top')] : []),
    ...(ends.lower < ends.last ? [stubOn('bottom')] : []),
  ];
  const network = (side: ViaSide): ViaStub | undefined => {
    const stub = stubs.find((one) => one.side === side);
    return stub && stub.lengths.nominal > 0 ? { side, ...stub.ofLength(stub.lengths.nominal) } : undefined;
  };
  const [top, bottom] = [network('top'), network('bottom')];
  const [upperFarads, lowerFarads] = [padAt(ends.upper), padAt(ends.lower)];
  const parameters: ViaParameters = ends.upwards
    ? {
        barrel: [...through].reverse(),
        enterFarads: lowerFarads,
        leaveFarads: upperFarads,
        enterStub: bottom,
        leaveStub: top,
      }
    : { barrel: through, enterFarads: upperFarads, leaveFarads: lowerFarads, enterStub: top, leaveStub: bottom };
  return { parameters, barrelMeters: through.reduce((sum, { lengthMeters }) => sum + lengthMeters, 0), stubs };
}

export type { Copper };
