/**
 * Taps of a decision-feedback equaliser in volts: each takes away its postcursor, as far as the limit lets it.
 * @param postcursors volts, at 1, 2, … UI after the main cursor
 * @param limit most of each tap as a share of the main cursor
 * Source: exact. Check values E-06, E-07.
 */
export function solveDfe(
  mainCursor: number,
  postcursors: ArrayLike<number>,
  taps: number,
  limit: number,
): readonly number[] {
  const most = limit * Math.abs(mainCursor);
  return Array.from({ length: Math.min(taps, postcursors.length) }, (_, i) =>
    Math.max(-most, Math.min(most, postcursors[i])),
  );
}
