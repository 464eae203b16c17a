export type Range = readonly [number, number];
export interface Zoom {
  readonly x?: Range;
  readonly y?: Range;
}

/** No closer than a ten-thousandth of the whole. */
const closest = 1e-4;

/** A part of `whole` around `centre`, `factor` times as wide as `shown`; undefined once it is all of it. */
export function zoomed(whole: Range, shown: Range | undefined, factor: number, centre: number): Range | undefined {
  const [from, to] = shown ?? whole;
  const span = whole[1] - whole[0];
  const width = Math.max(closest * span, (to - from) * factor);
  if (!(width < span * (1 - 1e-9))) return undefined;
  const share = Math.min(1, Math.max(0, (centre - from) / (to - from)));
  return within(whole, centre - share * width, width);
}

/** The shown part moved by a share of its width, kept inside the whole. */
export function panned(whole: Range, shown: Range | undefined, share: number): Range | undefined {
  if (!shown) return undefined;
  const width = shown[1] - shown[0];
  return within(whole, shown[0] + share * width, width);
}

/** The part between two values in any order; undefined where it is too narrow to have been meant. */
export function between(whole: Range, a: number, b: number): Range | undefined {
  const from = Math.max(whole[0], Math.min(a, b));
  const to = Math.min(whole[1], Math.max(a, b));
  return to - from >= closest * (whole[1] - whole[0]) ? [from, to] : undefined;
}

/** A kept zoom on a domain that may have changed since: cut to it, dropped where nothing is left. */
export function fitted(whole: Range, shown: Range | undefined): Range | undefined {
  if (!shown || !Number.isFinite(shown[0]) || !Number.isFinite(shown[1]) || !(shown[1] > shown[0])) return undefined;
  if (shown[0] <= whole[0] && shown[1] >= whole[1]) return undefined;
  return between(whole, shown[0], shown[1]);
}

function within(whole: Range, from: number, width: number): Range {
  const start = Math.min(whole[1] - width, Math.max(whole[0], from));
  return [start, start + width];
}
