import type { Element, Model } from '../model/types';
import type { ElementNote } from '../networks/types';
import { GAP_IN_WIDTHS, type Side, type TraceGeometry } from '../physics/cross-section';
import { wideBandLogarithm } from '../physics/laminate';
import { show } from '../quantity/show';
import { type Layering, seriesPermittivity } from './computed-line';
import { heldWidth } from './cross-sections';
import { type Copper, copperIndex, heightOf, layeringOf, type Slice, sideOf, type TraceSide } from './stackup';
import { endsOf, hasTolerance, isPair, rangeNote } from './written';

/** A trace's layer with what lies on both sides. */
export interface TracePlace {
  readonly copper: Copper;
  readonly lower: TraceSide & { readonly plane: Copper };
  /** Second plane's side, or the dielectric above a trace that has none; empty on an outer layer. */
  readonly upper: TraceSide;
  /** No plane on either side: the board's far copper stands in for one. */
  readonly assumedPlane: boolean;
  readonly outer: boolean;
}

/** Where a trace runs; undefined if the layer is unknown or has no dielectric beside it. */
export function placeOf({ stackup, layer }: Element<'trace'>): TracePlace | undefined {
  const index = stackup ? copperIndex(stackup, layer) : -1;
  if (!stackup || index < 0) return undefined;
  const copper = stackup.layers[index] as Copper;
  const above = sideOf(stackup, index, -1);
  const below = sideOf(stackup, index, 1);
  const place = (lower: TraceSide, upper: TraceSide, assumedPlane = false): TracePlace | undefined =>
    heightOf(lower.slices) > 0
      ? {
          copper,
          lower: { ...lower, plane: lower.plane ?? copper },
          upper,
          assumedPlane,
          outer: upper.slices.length === 0,
        }
      : undefined;
  if (below.plane) return place(below, above);
  if (above.plane) return place(above, below);
  return heightOf(below.slices) >= heightOf(above.slices) ? place(below, above, true) : place(above, below, true);
}

const dkAt = (layering: Layering, hz: number) => seriesPermittivity(layering, [hz], wideBandLogarithm([hz]))[0];

const sideAt = (slices: readonly Slice[], hz: number): Side => ({
  heightMeters: heightOf(slices),
  dk: dkAt(layeringOf(slices), hz),
});

/** All of the cross-section but width and gap, with the dielectric constants at one frequency. */
export function surroundings(
  { copper, lower, upper }: TracePlace,
  hz: number,
): Omit<TraceGeometry, 'widthMeters' | 'gapMeters'> {
  const above = upper.slices.length > 0 ? sideAt(upper.slices, hz) : undefined;
  return {
    thicknessMeters: copper.thicknessMeters,
    lower: sideAt(lower.slices, hz),
    ...(above && (upper.plane ? { upper: above } : { cover: above })),
  };
}

/**
 * The cross-section of a trace at Nyquist's dielectric constants: as written, or with the width that gives the written impedance.
 * @returns undefined where neither is written; where no width gives the impedance the nearest one, with a note
 */
export function geometryOf(
  element: Element<'trace'>,
  place: TracePlace,
  model: Model,
  notes: ElementNote[],
): TraceGeometry | undefined {
  const { width, gap, impedance } = element.values;
  const pair = isPair(model);
  const rest = surroundings(place, model.nyquistFrequency);
  if (width) {
    // a pair without a gap is another rule's error; its figures then stand for the usual gap
    return { ...rest, widthMeters: width.value, ...(pair && { gapMeters: gap?.value ?? GAP_IN_WIDTHS * width.value }) };
  }
  if (!impedance) return undefined;
  const { widthMeters, impedanceOhms } = heldWidth({ geometry: rest, pair, ohms: impedance.value });
  if (Math.abs(impedanceOhms / impedance.value - 1) > 1e-6) {
    const gap = pair ? ' with a gap of 1.5 widths' : '';
    notes.push(
      rangeNote(
        element,
        `No width on ${element.layer}${gap} gives ${show.impedance(impedance.value)}: ${show.impedance(impedanceOhms)} is the nearest, and its copper is taken. Write width and gap.`,
        'impedance',
      ),
    );
  }
  return { ...rest, widthMeters, ...(pair && { gapMeters: GAP_IN_WIDTHS * widthMeters }) };
}

/** Geometries at the ends of the tolerances of width and gap; empty where neither has one. */
export function geometryEnds(element: Element<'trace'>, nominal: TraceGeometry): TraceGeometry[] {
  const { width, gap } = element.values;
  if (!width || !(hasTolerance(width) || hasTolerance(gap))) return [];
  const gaps = gap && nominal.gapMeters !== undefined ? endsOf(gap) : [undefined];
  return endsOf(width).flatMap((widthMeters) =>
    gaps
      .filter((gapMeters) => widthMeters > 0 && (gapMeters ?? 1) > 0)
      .map((gapMeters) => ({ ...nominal, widthMeters, ...(gapMeters !== undefined && { gapMeters }) })),
  );
}
