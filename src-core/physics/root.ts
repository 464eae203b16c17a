/**
 * Where a continuous function passes from below 0 to above, or the other way, between two ends of unlike sign: false position with
 * the Illinois rule, some ten evaluations where the function is nearly straight.
 * @param atLow f(low), atHigh f(high): of unlike sign, or one of them 0
 * @param tolerance relative to the distance of the ends
 * Source: Dowell and Jarratt, BIT 11, 1971, 168-174.
 */
export function findRoot(
  f: (x: number) => number,
  low: number,
  high: number,
  atLow: number,
  atHigh: number,
  tolerance = 1e-12,
): number {
  let [a, fa, b, fb] = [low, atLow, high, atHigh];
  for (let i = 0; i < 100; i++) {
    const x = Math.abs(fb - fa) > 0 ? b - (fb * (b - a)) / (fb - fa) : (a + b) / 2;
    const fx = f(x);
    if (fx === 0 || Math.abs(x - b) <= tolerance * Math.abs(high - low)) return x;
    if (fx * fb < 0) [a, fa] = [b, fb];
    else fa /= 2;
    [b, fb] = [x, fx];
  }
  return b;
}
