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
import { declaredFacts, declaredLine, declaredSegment, skewOf } from './declared-segment';
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
  const { values } = trace;
  const pair = isPair(model);
  const legs = legsOf(trace, section, pair);
  const computed = asWritten(computedLine(trace, place, geometry, section, model), trace, section, legs);
  const at = computedAt(computed, 'odd', model.nyquistFrequency);
  const lengthMeters = values.length?.value ?? 0;
  const skewSeconds = pair ? skewOf(values, at.delaySeconds / (lengthMeters || 1)) : 0;
  const line: Line = values.loss
    ? declaredLoss(trace, legs, computed, skewSeconds, model)
    : { ...computed, skewSeconds };
  notes.push(...geometryNotes(trace, place, section, pair ? 2 * legs.odd : legs.odd));
  return { parameters: line, facts: factsOf(trace, place, geometry, section, line, legs, model), notes };
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

/** One leg's impedances: the geometry's, or those that are written: without a width, `impedance`; `common-impedance` always. */
function legsOf(
  { values }: Element<'trace'>,
  { odd, even }: CrossSection,
  pair: boolean,
): { odd: number; even: number } {
  const { impedance, width, 'common-impedance': common } = values;
  const declared = impedance && !width ? impedance.value / (pair ? 2 : 1) : odd.impedanceOhms;
  return { odd: declared, even: !pair ? declared : common ? 2 * common.value : even.impedanceOhms };
}

/** The same line as fast as `delay`, `velocity` or `dk` say, where they do, and with the legs' impedances: copper stays as it is. */
function asWritten(
  line: ComputedLine,
  { values }: Element<'trace'>,
  section: CrossSection,
  legs: { odd: number; even: number },
): ComputedLine {
  const written = values.loss ? undefined : writtenDelay(values);
  const slower = written === undefined ? 1 : (written * SPEED_OF_LIGHT) / Math.sqrt(section.odd.effectiveDk);
  const mode = (which: 'odd' | 'even') => {
    const higher = legs[which] / section[which].impedanceOhms;
    const { inductance, capacitance } = line[which];
    return { ...line[which], inductance: inductance * slower * higher, capacitance: (capacitance * slower) / higher };
  };
  return { ...line, odd: mode('odd'), even: mode('even') };
}

/** A declared loss in place of copper and laminate; impedances and, where none is written, delay stay the geometry's. */
function declaredLoss(
  { values }: Element<'trace'>,
  legs: { odd: number; even: number },
  computed: ComputedLine,
  skewSeconds: number,
  model: Model,
): Line {
  const points = lossPoints(values.loss ?? [], model, computed.lengthMeters);
  const written = writtenDelay(values);
  const hz = frequencyOf(values.dk) ?? Math.max(...points.map((point) => point.hz));
  return declaredLine({
    oddOhms: legs.odd,
    evenOhms: legs.even,
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
  legs: { odd: number; even: number },
  model: Model,
): ElementFacts {
  const { impedance, width } = trace.values;
  const pair = isPair(model);
  const ends = geometryEnds(trace, geometry).map((end) => modeImpedances(end).odd * (pair ? 2 : 1));
  const hz = model.nyquistFrequency;
  const { delaySeconds } = line.model === 'declared' ? declaredAt(line, hz) : computedAt(line, 'odd', hz);
  return {
    lengthMeters: trace.values.length?.value,
    impedanceOhms: pair ? 2 * legs.odd : legs.odd,
    commonImpedanceOhms: pair ? legs.even / 2 : undefined,
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
