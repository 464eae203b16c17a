import type { EyeDensity } from '../link/types';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { Computed } from './computed';
import type { LimitOutcome } from './types';

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

/** Eye height and width at the target BER, and the rhombus between them, against the least that a limit wants. */
export function eyeOutcome(limit: Limit<'eye'>, { model, link, linkIsStale }: Computed): LimitOutcome | undefined {
  const height = limit.values.height?.value;
  const width = limit.values.width;
  // A width may be written as a time.
  const widthUi = width && (width.dimension === 'time' ? width.value / model.unitInterval : width.value);
  if (!link || (height === undefined && widthUi === undefined)) return undefined;
  const sizes = [
    ...(height ? [{ of: 'height', share: link.eyeHeightVolts / height }] : []),
    ...(widthUi ? [{ of: 'width', share: link.eyeWidthUi / widthUi }] : []),
  ];
  const least = sizes.reduce((a, b) => (b.share < a.share ? b : a), { of: 'height', share: Number.POSITIVE_INFINITY });
  // A rhombus of half the eye's size fits into anything that is called an eye; the contour is computed when it is read.
  const isNear = height && widthUi && least.share >= 1 - 1e-9 && least.share < 2;
  const rhombus = isNear ? { of: 'rhombus', share: rhombusScale(link.density, height, widthUi) } : least;
  const worst = rhombus.share < least.share ? rhombus : least;
  const share = Number.isFinite(worst.share) ? worst.share : 1;
  const byWidth = worst.of === 'width' || height === undefined;
  const mark = linkIsStale ? '~' : '';
  const size = (h: number | undefined, w: number | undefined) =>
    [...(h === undefined ? [] : [show.voltage(h)]), ...(w === undefined ? [] : [show.unitIntervals(w)])].join(' × ');
  const figure = (name: string, title: string, h: number | undefined, w: number | undefined, prefix = '') =>
    ({
      name,
      title,
      value: (byWidth ? w : h) ?? 0,
      unit: byWidth ? 'UI' : 'V',
      text: prefix + size(h, w),
      worse: 'lower',
    }) as const;
  const actual = figure(
    'eye',
    'Eye',
    height === undefined ? undefined : link.eyeHeightVolts,
    widthUi === undefined ? undefined : link.eyeWidthUi,
    mark,
  );
  const wanted = figure('limit', 'Least eye', height, widthUi);
  const corner = worst.of === 'rhombus' && share < 1 ? ', whose corners cut the contour' : '';
  return {
    name: limit.name,
    kind: limit.kind,
    met: share >= 1 - 1e-9,
    limit: wanted,
    actual,
    marginShare: share - 1,
    text: `eye ${actual.text}, at least ${wanted.text}${corner}`,
  };
}
