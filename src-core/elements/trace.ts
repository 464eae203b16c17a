import type { Element, Model } from '../model/types';
import type { ElementFacts, ElementKind, ElementNote, Prepared } from '../networks/types';
import { SPEED_OF_LIGHT } from '../physics/constants';
import { conductivityAt } from '../physics/copper';
import { type CrossSection, type ModeSection, modeImpedances, type TraceGeometry } from '../physics/cross-section';
import type { Surface } from '../physics/roughness';
import { show } from '../quantity/show';
import { type ComputedLine, computedAt, type LineMode } from './computed-line';
import { heldCrossSection } from './cross-sections';
import { declaredAt } from './declared-line';
import { declaredFacts, declaredLine, declaredSegment, legOhms, skewOf } from './declared-segment';
import { type Line, lineNetwork } from './line';
import { type Copper, layeringOf } from './stackup';
import { geometryEnds, geometryOf, placeOf, type TracePlace } from './trace-geometry';
import { endsOf, frequencyOf, hasTolerance, isPair, lossPoints, rangeNote, SKIN_SHARE, writtenDelay } from './written';

/** Difference to a target impedance that has no ±: what the closed forms and a fabricator usually leave open. Common practice. */
const USUAL_TOLERANCE = 0.05;

/** A run of trace: computed from its cross-section, or as far as it declares impedance, delay and loss, from those. */
export const traceKind: ElementKind<Line> = {
  prepare(element, { model }) {
    const trace = element as Element<'trace'>;
    const place = placeOf(trace);
    const notes: ElementNote[] = [];
    const geometry = place && geometryOf(trace, place, model, notes);
    if (!trace.values.length) return undefined;
    if (place && geometry) return fromGeometry(trace, place, geometry, model, notes);
    const line = declaredSegment(withLayerDk(trace, place), model, SKIN_SHARE.trace);
    return line && { parameters: line, facts: declaredFacts(line, trace.values, model), notes };
  },
  network: lineNetwork,
};

/** Values with the layer's dielectric constant where nothing else says how fast the line is. */
function withLayerDk({ values }: Element<'trace'>, place: TracePlace | undefined): Element<'trace'>['values'] {
  if (writtenDelay(values) !== undefined || !place) return values;
  const [{ dk, atHz }] = layeringOf(place.lower.slices);
  return {
    ...values,
    dk: { value: dk, at: atHz, dimension: 'ratio', text: '', unit: '', plus: 0, minus: 0, threeSigma: false },
  };
}

function fromGeometry(
  trace: Element<'trace'>,
  place: TracePlace,
  geometry: TraceGeometry,
  model: Model,
  notes: ElementNote[],
): Prepared<Line> {
  const section = heldCrossSection(geometry);
  const computed = slowed(computedLine(trace, place, geometry, section, model), trace, section);
  const { values } = trace;
  const at = computedAt(computed, 'odd', model.nyquistFrequency);
  const pair = isPair(model);
  const lengthMeters = values.length?.value ?? 0;
  const skewSeconds = pair ? skewOf(values, at.delaySeconds / (lengthMeters || 1)) : 0;
  const impedanceOhms = pair ? 2 * section.odd.impedanceOhms : section.odd.impedanceOhms;
  const line: Line = values.loss
    ? declaredLoss(trace, impedanceOhms, section, computed, skewSeconds, model)
    : { ...computed, skewSeconds };
  notes.push(...geometryNotes(trace, place, section, impedanceOhms));
  return { parameters: line, facts: factsOf(trace, place, geometry, section, line, impedanceOhms, model), notes };
}

const surfaceOf = ({ foil }: Copper, model: Model): Surface => ({
  conductivity: conductivityAt(foil.conductivity, model.temperatureCelsius),
  roughness: foil.roughness,
});

function computedLine(
  { values }: Element<'trace'>,
  place: TracePlace,
  { widthMeters, thicknessMeters }: TraceGeometry,
  section: CrossSection,
  model: Model,
): ComputedLine {
  const mode = (of: ModeSection): LineMode => ({
    inductance: of.airImpedanceOhms / SPEED_OF_LIGHT,
    capacitance: 1 / (of.airImpedanceOhms * SPEED_OF_LIGHT),
    lowerShare: of.lowerShare,
    upperShare: of.upperShare,
    stripPerMeter: of.stripPerMeter,
    lowerPlanePerMeter: of.lowerPlanePerMeter,
    upperPlanePerMeter: of.upperPlanePerMeter,
    slabMeters: of.stripPerMeter * widthMeters * thicknessMeters, // so that R at DC is 1/(σ w t)
  });
  const { lower, upper, copper } = place;
  return {
    model: 'computed',
    lengthMeters: values.length?.value ?? 0,
    odd: mode(section.odd),
    even: mode(section.even),
    alike: section.odd === section.even,
    lower: layeringOf(lower.slices),
    upper: layeringOf(upper.slices),
    strip: surfaceOf(copper, model),
    lowerPlane: surfaceOf(lower.plane, model),
    upperPlane: surfaceOf(upper.plane ?? lower.plane, model),
  };
}

/** The same line where `delay`, `velocity` or `dk` say how fast it is: slower or faster, at the same impedance. */
function slowed(line: ComputedLine, { values }: Element<'trace'>, { odd }: CrossSection): ComputedLine {
  const written = values.loss ? undefined : writtenDelay(values);
  if (written === undefined) return line;
  const ratio = (written * SPEED_OF_LIGHT) / Math.sqrt(odd.effectiveDk);
  const mode = (one: LineMode) => ({
    ...one,
    inductance: one.inductance * ratio,
    capacitance: one.capacitance * ratio,
  });
  return { ...line, odd: mode(line.odd), even: mode(line.even) };
}

/** A declared loss in place of copper and laminate; impedances and, where none is written, delay stay the geometry's. */
function declaredLoss(
  { values }: Element<'trace'>,
  impedanceOhms: number,
  { even }: CrossSection,
  computed: ComputedLine,
  skewSeconds: number,
  model: Model,
): Line {
  const points = lossPoints(values.loss ?? [], model, computed.lengthMeters);
  const written = writtenDelay(values);
  const hz = frequencyOf(values.dk) ?? Math.max(...points.map((point) => point.hz));
  const legs = legOhms(values, impedanceOhms, isPair(model));
  const ownCommon = values['common-impedance'] === undefined && computed.odd !== computed.even;
  return declaredLine({
    oddOhms: legs.oddOhms,
    evenOhms: ownCommon ? even.impedanceOhms : legs.evenOhms,
    points,
    skinShare: values['skin-share']?.value ?? SKIN_SHARE.trace,
    delaySeconds:
      written === undefined ? computedAt(computed, 'odd', hz).delaySeconds : written * computed.lengthMeters,
    delayHz: hz,
    skewSeconds,
  });
}

function factsOf(
  trace: Element<'trace'>,
  place: TracePlace,
  geometry: TraceGeometry,
  section: CrossSection,
  line: Line,
  impedanceOhms: number,
  model: Model,
): ElementFacts {
  const { impedance, width } = trace.values;
  const pair = isPair(model);
  const ends = geometryEnds(trace, geometry).map((end) => modeImpedances(end).odd * (pair ? 2 : 1));
  const hz = model.nyquistFrequency;
  const { delaySeconds } = line.model === 'declared' ? declaredAt(line, hz) : computedAt(line, 'odd', hz);
  return {
    lengthMeters: trace.values.length?.value,
    impedanceOhms,
    commonImpedanceOhms: pair ? section.even.impedanceOhms / 2 : undefined,
    impedanceRangeOhms:
      ends.length > 0
        ? [Math.min(...ends), Math.max(...ends)]
        : !width && impedance && hasTolerance(impedance)
          ? endsOf(impedance)
          : undefined,
    delaySeconds,
    skewSeconds: line.skewSeconds,
    widthMeters: geometry.widthMeters,
    gapMeters: geometry.gapMeters,
    construction: place.outer ? `${section.construction}, solder mask neglected` : section.construction,
    stubs: [],
  };
}

function geometryNotes(
  trace: Element<'trace'>,
  place: TracePlace,
  section: CrossSection,
  impedanceOhms: number,
): ElementNote[] {
  const notes: ElementNote[] = [];
  const { impedance, width } = trace.values;
  if (place.assumedPlane)
    notes.push(
      rangeNote(
        trace,
        `No plane stands above or below ${trace.layer}: the far side of the board is taken for one.`,
        'layer',
      ),
    );
  if (section.rangeNotes.length > 0)
    notes.push(
      rangeNote(
        trace,
        `The ${section.construction}'s formulas are used beyond their range: ${section.rangeNotes.join('; ')}. Take its figures with care.`,
        width ? 'width' : 'impedance',
      ),
    );
  if (width && impedance) {
    const difference = impedanceOhms - impedance.value;
    const usual = USUAL_TOLERANCE * impedance.value;
    const allowed = hasTolerance(impedance) ? (difference > 0 ? impedance.plus : impedance.minus) : usual;
    if (Math.abs(difference) > allowed)
      notes.push({
        rule: 'impedance-target',
        at: trace.places.impedance ?? trace.place,
        message: `This geometry gives ${show.impedance(impedanceOhms)}, ${show.impedance(Math.abs(difference))} ${
          difference > 0 ? 'above' : 'below'
        } the target of ${show.impedance(impedance.value)}; ${show.impedance(allowed)} is allowed.`,
        value: Math.abs(difference),
        valueText: show.impedance(Math.abs(difference)),
      });
  }
  return notes;
}
