import type { EyeDensity, Link } from '../link/types';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import type { Figure, LimitOutcome } from './types';

/**
 * By how much the rhombus of height and width may grow until it touches the contour of the eye (below 1: it does not fit).
 * It stands on the sampling instant, in the middle of each opening.
 */
function rhombusScale({ phases, openings }: EyeDensity, heightVolts: number, widthUi: number): number {
  let scale = Number.POSITIVE_INFINITY;
  const centre = Math.floor(phases / 2);
  for (const { lower, upper } of openings) {
    const middle = (lower[centre] + upper[centre]) / 2;
    for (let i = 0; i < phases; i++) {
      const distanceUi = Math.abs(i - centre) / phases;
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
  const corners = rhombusScale(link.density, heightVolts, widthUi);
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
