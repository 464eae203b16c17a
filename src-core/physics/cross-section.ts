import { SPEED_OF_LIGHT } from './constants';
import { wallFactor } from './incremental-inductance';
import { coverShare, microstrip, thickCoupledMicrostrip } from './microstrip';
import { findRoot } from './root';
import { thickCoupledStripline, thickStripline, thinStripline } from './stripline';

/** What lies between the strip and a plane. `dk` is the real part at the frequency that the impedances are wanted at. */
export interface Side {
  readonly heightMeters: number;
  readonly dk: number;
}

/** A strip, or a pair of equal ones side by side, over one plane or between two. */
export interface TraceGeometry {
  readonly widthMeters: number;
  /** Edge to edge; absent for a single strip. */
  readonly gapMeters?: number;
  readonly thicknessMeters: number;
  /** Towards the plane that is surely there. */
  readonly lower: Side;
  /** Towards the second plane: a stripline. */
  readonly upper?: Side;
  /** Dielectric above a strip that has no second plane. */
  readonly cover?: Side;
}

/** One mode of the cross-section, per leg: a strip against the planes with its neighbour at −V (odd) or at +V (even). */
export interface ModeSection {
  readonly impedanceOhms: number;
  readonly effectiveDk: number;
  /** The same with air all around: external inductance is airImpedance/c. */
  readonly airImpedanceOhms: number;
  /** ε = 1 + lower (ε of the lower side − 1) + upper (ε of the upper side or cover − 1): holds for complex ε too. */
  readonly lowerShare: number;
  readonly upperShare: number;
  /** Wall factors, 1/m: times a surface impedance they give series impedance per metre. See `wallFactor`. */
  readonly stripPerMeter: number;
  readonly lowerPlanePerMeter: number;
  readonly upperPlanePerMeter: number;
}

export interface CrossSection {
  readonly construction: 'microstrip' | 'buried microstrip' | 'stripline';
  readonly odd: ModeSection;
  /** The same object as `odd` for a single strip. */
  readonly even: ModeSection;
  /** Where the formulas are asked outside the range that their authors give; plain words. */
  readonly rangeNotes: readonly string[];
}

interface Modes {
  readonly odd: number;
  readonly even: number;
}

const bothModes = (value: number): Modes => ({ odd: value, even: value });

/** Impedances in air of a strip (pair) midway between planes `b` apart. */
function symmetricStripline({ widthMeters: w, gapMeters: s, thicknessMeters: t }: TraceGeometry, b: number): Modes {
  if (s !== undefined) return thickCoupledStripline(w / b, s / b, t / b);
  return bothModes(t > 0 ? thickStripline(w / b, t / b) : thinStripline(w / b));
}

/**
 * A strip off the middle by e counts as centred between planes b·cos(πe/b) apart. That is exact for a thin wire, by its images.
 * Source: Frankel, Proc. IRE 30, 1942, 182-190, for the wire. Measured against boundary elements, e/b up to 0.2: strips
 * up to w/b 0.5 within 0.6 %, w/b 1 within 1.7 %; pairs within 2 %. Check value T-30.
 */
function equivalentDistance(thicknessMeters: number, lower: Side, upper: Side): number {
  const b = lower.heightMeters + upper.heightMeters + thicknessMeters;
  return b * Math.cos((Math.PI * (upper.heightMeters - lower.heightMeters)) / (2 * b));
}

/** Impedances in air, ohm a leg. */
function airImpedances(geometry: TraceGeometry): Modes {
  const { widthMeters: w, gapMeters: s, thicknessMeters: t, lower, upper } = geometry;
  const h = lower.heightMeters;
  if (upper) return symmetricStripline(geometry, equivalentDistance(t, lower, upper));
  if (s === undefined) return bothModes(microstrip(w / h, 1, t / h).impedance);
  const pair = thickCoupledMicrostrip(w / h, s / h, 1, t / h);
  return { odd: pair.odd.impedance, even: pair.even.impedance };
}

/** Effective dielectric constants of a strip over one plane in dielectric `dk`, from the same formulas. */
function microstripDks({
  widthMeters: w,
  gapMeters: s,
  thicknessMeters: t,
  lower: { heightMeters: h, dk },
}: TraceGeometry): Modes {
  if (s === undefined) return bothModes(microstrip(w / h, dk, t / h).effectiveDk);
  const pair = thickCoupledMicrostrip(w / h, s / h, dk, t / h);
  return { odd: pair.odd.effectiveDk, even: pair.even.effectiveDk };
}

/** How much of each side's dielectric a mode feels. */
function shares(geometry: TraceGeometry, mode: keyof Modes): { lowerShare: number; upperShare: number } {
  const { lower, upper, cover } = geometry;
  if (upper) {
    // each side holds about half the capacitance of a centred strip at its height: enough to weigh dielectrics that differ little
    const distance = (side: Side) => 2 * side.heightMeters + geometry.thicknessMeters;
    const below = 1 / symmetricStripline(geometry, distance(lower))[mode];
    const above = 1 / symmetricStripline(geometry, distance(upper))[mode];
    return { lowerShare: below / (below + above), upperShare: above / (below + above) };
  }
  if (lower.dk <= 1 + 1e-9) return { lowerShare: 1, upperShare: 0 };
  const lowerShare = (microstripDks(geometry)[mode] - 1) / (lower.dk - 1);
  return { lowerShare, upperShare: cover ? (1 - lowerShare) * coverShare(cover.heightMeters / lower.heightMeters) : 0 };
}

/** Strip walls recede by n; planes by nothing. */
const strippedBy = (geometry: TraceGeometry, n: number): TraceGeometry => ({
  ...geometry,
  widthMeters: geometry.widthMeters - 2 * n,
  thicknessMeters: geometry.thicknessMeters - 2 * n,
  ...(geometry.gapMeters !== undefined && { gapMeters: geometry.gapMeters + 2 * n }),
  lower: { ...geometry.lower, heightMeters: geometry.lower.heightMeters + n },
  ...(geometry.upper && { upper: { ...geometry.upper, heightMeters: geometry.upper.heightMeters + n } }),
});

const raised = (side: Side, n: number): Side => ({ ...side, heightMeters: side.heightMeters + n });

type Walls = Pick<ModeSection, 'stripPerMeter' | 'lowerPlanePerMeter' | 'upperPlanePerMeter'>;

/** Wheeler's rule on the closed forms: what each conductor's walls bring in, by numerical differentiation. */
function walls(geometry: TraceGeometry, mode: keyof Modes): Walls {
  const { widthMeters, gapMeters = widthMeters, thicknessMeters, lower, upper } = geometry;
  const smallest = Math.min(widthMeters, gapMeters, lower.heightMeters, upper?.heightMeters ?? widthMeters);
  const step = 1e-3 * (thicknessMeters > 0 ? Math.min(smallest, thicknessMeters) : smallest);
  const inductance = (changed: TraceGeometry) => airImpedances(changed)[mode] / SPEED_OF_LIGHT;
  const factor = (change: (n: number) => TraceGeometry) => wallFactor((n) => inductance(change(n)), step);
  return {
    stripPerMeter: thicknessMeters > 0 ? factor((n) => strippedBy(geometry, n)) : 0,
    lowerPlanePerMeter: factor((n) => ({ ...geometry, lower: raised(lower, n) })),
    upperPlanePerMeter: upper ? factor((n) => ({ ...geometry, upper: raised(upper, n) })) : 0,
  };
}

/** Impedance and effective dielectric constant of both modes, without the conductors' walls: cheap, for root finding. */
export function modeImpedances(geometry: TraceGeometry): { odd: number; even: number; oddDk: number; evenDk: number } {
  const air = airImpedances(geometry);
  const dkOf = (mode: keyof Modes) => {
    const { lowerShare, upperShare } = shares(geometry, mode);
    const above = geometry.upper ?? geometry.cover;
    return 1 + lowerShare * (geometry.lower.dk - 1) + upperShare * ((above?.dk ?? 1) - 1);
  };
  const oddDk = dkOf('odd');
  const evenDk = geometry.gapMeters === undefined ? oddDk : dkOf('even');
  return { odd: air.odd / Math.sqrt(oddDk), even: air.even / Math.sqrt(evenDk), oddDk, evenDk };
}

/** Where the closed forms are asked beyond what their authors claim. */
function rangeNotes({ widthMeters: w, gapMeters: s, thicknessMeters: t, lower, upper }: TraceGeometry): string[] {
  const notes: string[] = [];
  const outside = (what: string, ratio: number, from: number, to: number) => {
    if (ratio < from || ratio > to) notes.push(`${what} is ${ratio.toPrecision(3)}, outside ${from} to ${to}`);
  };
  if (upper) {
    const b = lower.heightMeters + upper.heightMeters + t;
    outside('thickness over the distance of the planes', t / b, 0, 0.25);
    outside('width over the distance of the planes', w / b, 0.1, 50);
    const nearer = Math.min(lower.heightMeters, upper.heightMeters) / Math.max(lower.heightMeters, upper.heightMeters);
    outside('the smaller over the larger height to the planes', nearer, 0.2, 1);
  } else {
    const h = lower.heightMeters;
    outside('width over height', w / h, 0.1, 10);
    if (s !== undefined) outside('gap over height', s / h, 0.1, 10);
    outside('the dielectric constant', lower.dk, 1, 18);
  }
  if (s !== undefined && t > 0) outside('gap over thickness', s / t, 2, Number.POSITIVE_INFINITY);
  return notes;
}

/**
 * Everything that a trace's cross-section contributes to a line, both modes, from published closed forms.
 * This is the seam at which a field solution takes over: nothing else in the code knows how these numbers were found.
 * @param geometry all lengths above 0 (thickness may be 0), dk at least 1
 * @throws RangeError on a length that is not above 0
 */
export function crossSection(geometry: TraceGeometry): CrossSection {
  const { widthMeters, gapMeters, lower, upper, cover } = geometry;
  for (const length of [widthMeters, gapMeters ?? 1, lower.heightMeters, upper?.heightMeters ?? 1])
    if (!(length > 0)) throw new RangeError('A cross-section needs lengths above 0');
  const air = airImpedances(geometry);
  const impedances = modeImpedances(geometry);
  const section = (mode: keyof Modes): ModeSection => ({
    impedanceOhms: impedances[mode],
    effectiveDk: mode === 'odd' ? impedances.oddDk : impedances.evenDk,
    airImpedanceOhms: air[mode],
    ...shares(geometry, mode),
    ...walls(geometry, mode),
  });
  const odd = section('odd');
  return {
    construction: upper ? 'stripline' : cover ? 'buried microstrip' : 'microstrip',
    odd,
    even: gapMeters === undefined ? odd : section('even'),
    rangeNotes: rangeNotes(geometry),
  };
}

/** Gap of a pair whose impedance alone is declared, in widths. */
export const GAP_IN_WIDTHS = 1.5;

/** Of ln(width): fine enough not to step over the widths at which a pair of thick copper has its largest impedance. */
const WIDTH_STEP = 0.1;

/**
 * The width that gives an impedance, with a gap of 1.5 widths in a pair. From the widest on downwards the impedance rises, so the root
 * is bracketed from there.
 * @param geometry without width and gap
 * @param ohms of the pair (twice the odd mode's), or of the single strip
 * @returns the width, and the impedance that it gives: not `ohms` only where no width from a fiftieth to fifty times the nearest
 * plane's distance gives those; then the nearest
 */
export function widthForImpedance(
  geometry: Omit<TraceGeometry, 'widthMeters' | 'gapMeters'>,
  pair: boolean,
  ohms: number,
): { readonly widthMeters: number; readonly impedanceOhms: number } {
  const legOhms = pair ? ohms / 2 : ohms;
  const height = Math.min(geometry.lower.heightMeters, geometry.upper?.heightMeters ?? Number.POSITIVE_INFINITY);
  const excess = (logWidth: number) => {
    const widthMeters = height * Math.exp(logWidth);
    return (
      modeImpedances({ ...geometry, widthMeters, ...(pair && { gapMeters: GAP_IN_WIDTHS * widthMeters }) }).odd -
      legOhms
    );
  };
  // Of a pair narrower than its copper is thick the flanks face each other and the impedance falls again: the wider root is meant.
  const result = (logWidth: number, off: number) => ({
    widthMeters: height * Math.exp(logWidth),
    impedanceOhms: (pair ? 2 : 1) * (legOhms + off),
  });
  const narrowest = Math.log(0.02);
  let wide = Math.log(50);
  let atWide = excess(wide);
  if (!(atWide < 0)) return result(wide, atWide);
  let narrow = 0; // as wide as high: most roots lie close below
  let atNarrow = excess(narrow);
  while (!(atNarrow > 0)) {
    const next = Math.max(narrowest, narrow - WIDTH_STEP);
    const atNext = excess(next);
    if (next === narrow || !(atNext > atNarrow)) return result(narrow, atNarrow);
    [wide, atWide, narrow, atNarrow] = [narrow, atNarrow, next, atNext];
  }
  return result(findRoot(excess, narrow, wide, atNarrow, atWide), 0);
}
