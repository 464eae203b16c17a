import type { EyeDensity, Link } from '../link/types';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import type { Figure, LimitOutcome } from './types';

/** Where the rhombus of a limit fits best. */
export interface MaskFit {
  /** By how much it may grow until it touches the contour of the eye; below 1 it does not fit. */
  readonly scale: number;
  /** Its middle from the sampling instant. */
  readonly shiftUi: number;
}

/**
 * The rhombus of height and width in the eye. Its middle voltage is that of each opening at the sampling instant, where the threshold stands.
 * In time it stands where it fits best, at most a quarter of its width from the sampling instant: an eye need not be even about that,
 * but some of the width wanted has to be on either side of it. All eyes of PAM4 share one instant.
 */
export function maskFit(density: EyeDensity, heightVolts: number, widthUi: number): MaskFit {
  const { phases } = density;
  const most = Math.floor((widthUi / 4) * phases + 1e-9);
  let best: MaskFit = { scale: scaleAt(density, heightVolts, widthUi, 0), shiftUi: 0 };
  for (let shift = 1; shift <= most; shift++) {
    for (const shifted of [-shift, shift]) {
      const scale = scaleAt(density, heightVolts, widthUi, shifted);
      if (scale > best.scale + 1e-9) best = { scale, shiftUi: shifted / phases };
    }
  }
  return best;
}

function scaleAt({ phases, openings }: EyeDensity, heightVolts: number, widthUi: number, shift: number): number {
  let scale = Number.POSITIVE_INFINITY;
  const centre = Math.floor(phases / 2);
  for (const { lower, upper } of openings) {
    const middle = (lower[centre] + upper[centre]) / 2;
    for (let i = 0; i < phases; i++) {
      const distanceUi = Math.abs(i - centre - shift) / phases;
      const room = Math.max(0, Math.min(upper[i] - middle, middle - lower[i]));
      scale = Math.min(scale, room / (heightVolts / 2) + distanceUi / (widthUi / 2));
    }
  }
  return scale;
}

interface Wanted {
  readonly heightVolts?: number;
  readonly widthUi?: number;
}

/** A width may be written as a time. */
const wantedOf = ({ values: { height, width } }: Limit<'eye'>, unitInterval: number): Wanted => ({
  heightVolts: height?.value,
  widthUi: width && (width.dimension === 'time' ? width.value / unitInterval : width.value),
});

/** What of the limit has the least in hand, and by what share of it the eye could shrink (above 1) or has to grow (below). */
function tightest({ heightVolts, widthUi }: Wanted, link: Link): { of: 'height' | 'width' | 'corners'; share: number } {
  const height = heightVolts ? link.eyeHeightVolts / heightVolts : Number.POSITIVE_INFINITY;
  const width = widthUi ? link.eyeWidthUi / widthUi : Number.POSITIVE_INFINITY;
  const least = width < height ? ({ of: 'width', share: width } as const) : ({ of: 'height', share: height } as const);
  // A rhombus of half the eye's size fits into anything that is called an eye; the contour is computed when it is read.
  if (!heightVolts || !widthUi || least.share < SAME || least.share >= 2) return least;
  const corners = maskFit(link.density, heightVolts, widthUi).scale;
  return corners < least.share ? { of: 'corners', share: corners } : least;
}

/** Rounding is no failure. */
const SAME = 1 - 1e-9;

const size = ({ heightVolts, widthUi }: Wanted) =>
  [
    ...(heightVolts === undefined ? [] : [show.voltage(heightVolts)]),
    ...(widthUi === undefined ? [] : [show.unitIntervals(widthUi)]),
  ].join(' × ');

/** Eye height and width at the target BER, and the rhombus between them, against the least that a limit wants. */
export function eyeOutcome(limit: Limit<'eye'>, { model, link, linkIsStale }: Computed): LimitOutcome | undefined {
  const wanted = wantedOf(limit, model.unitInterval);
  if (!link || (wanted.heightVolts === undefined && wanted.widthUi === undefined)) return undefined;
  const { of, share } = tightest(wanted, link);
  const marginShare = Number.isFinite(share) ? share - 1 : 0;
  const met = marginShare >= SAME - 1;
  // The figure of the limit is the side that decides; both stand in the text.
  const byWidth = of === 'width' || wanted.heightVolts === undefined;
  const figure = (name: string, title: string, eye: Wanted, mark = ''): Figure => ({
    name,
    title,
    value: (byWidth ? eye.widthUi : eye.heightVolts) ?? 0,
    unit: byWidth ? 'UI' : 'V',
    text: mark + size(eye),
    worse: 'lower',
  });
  const opening = {
    ...(wanted.heightVolts !== undefined && { heightVolts: link.eyeHeightVolts }),
    ...(wanted.widthUi !== undefined && { widthUi: link.eyeWidthUi }),
  };
  const actual = figure('eye', 'Eye', opening, linkIsStale ? '~' : '');
  const least = figure('limit', 'Least eye', wanted);
  const cornersCut = of === 'corners' && !met;
  return {
    name: limit.name,
    kind: limit.kind,
    met,
    limit: least,
    actual,
    marginShare,
    text: `eye ${actual.text}, at least ${least.text}${cornersCut ? ', whose corners cut the contour' : ''}`,
    ...(cornersCut && { cornersCut }),
  };
}
