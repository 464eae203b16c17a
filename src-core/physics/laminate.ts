/** Dielectric constant and loss tangent with the frequency at which both hold. */
export interface DielectricPoint {
  readonly dk: number;
  readonly df: number;
  readonly atHz: number;
}

/** Ends of the continuum of poles for laminates, Hz. */
export const LAMINATE_BAND: readonly [number, number] = [1e4, 1e12];

/**
 * ln((f2 + jf)/(f1 + jf)) over frequency, the shape of a continuum of relaxations even in log f from f1 to f2.
 * @returns 2n numbers: re and im; im from −π/2 to 0
 */
export function wideBandLogarithm(
  frequencies: ArrayLike<number>,
  [f1, f2]: readonly [number, number] = LAMINATE_BAND,
): Float64Array {
  const out = new Float64Array(2 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) {
    const f = frequencies[i];
    out[2 * i] = 0.5 * Math.log((f2 * f2 + f * f) / (f1 * f1 + f * f));
    out[2 * i + 1] = Math.atan(f / f2) - Math.atan(f / f1);
  }
  return out;
}

/**
 * The two numbers of the wideband Debye form ε = infinite + slope · ln((f2+jf)/(f1+jf)) that pass through a point.
 * @throws RangeError if dk < 1, df is outside 0 … 0.2 or atHz outside the band
 * Check value M-15 (its D is slope · ln 10).
 */
export function debyeThrough(
  { dk, df, atHz }: DielectricPoint,
  band: readonly [number, number] = LAMINATE_BAND,
): { infinite: number; slope: number } {
  if (!(dk >= 1) || !(df >= 0 && df <= 0.2) || !(atHz >= band[0] && atHz <= band[1]))
    throw new RangeError(`dk ${dk}, df ${df} at ${atHz} Hz is outside the laminate model's range`);
  const [re, im] = wideBandLogarithm([atHz], band);
  const slope = (-dk * df) / im;
  return { infinite: dk - slope * re, slope };
}

/**
 * One point of the wideband Debye form for a material whose dk and df are known at two frequencies, brought into the
 * model's range.
 * @returns dk where it was given and the df there that leads to the given one
 */
export function jointPoint(dk: number, dkHz: number, df: number, dfHz: number): DielectricPoint {
  const within = (hz: number) => Math.min(Math.max(hz, LAMINATE_BAND[0]), LAMINATE_BAND[1]);
  const atHz = within(dkHz);
  const held = { dk: Math.max(1, dk), atHz };
  const [reDk, imDk, reDf, imDf] = wideBandLogarithm([atHz, within(dfHz)]);
  if (dkHz === dfHz) return { ...held, df: Math.min(Math.max(df, 0), 0.2) };
  // df = −D im(f_df)/(dk + D (re(f_df) − re(f_dk))), solved for the slope D
  const slope = (df * held.dk) / (-imDf - df * (reDf - reDk));
  return { ...held, df: Math.min(Math.max((-slope * imDk) / held.dk, 0), 0.2) };
}

/**
 * Complex permittivity of a laminate whose loss tangent is nearly flat; causal by construction.
 * A continuum of Debye poles, even in log f from `lowHz` to `highHz`, scaled to pass through (dk, df) at `atHz`.
 * @param point dk at least 1, df from 0 to 0.2, atHz between lowHz and highHz
 * @param frequencies Hz, n of them, in any order, 0 allowed
 * @param band lowHz and highHz
 * @returns 2n numbers: re and im of ε/ε0 in turn; im ≤ 0 (time runs as e^{+jωt})
 * @throws RangeError if the point is outside those ranges. Holds from lowHz to highHz; beyond, the loss falls away.
 * Source: Djordjević, Biljić, Likar-Smiljanić, Sarkar, IEEE Trans. EMC 43(4), 2001, 662-667. Check values M-15 to M-18.
 * @example permittivity({ dk: 4.2, df: 0.02, atHz: 1e9 }, [1e10])   // [4.0768, -0.0835]
 */
export function permittivity(
  point: DielectricPoint,
  frequencies: ArrayLike<number>,
  band: readonly [number, number] = LAMINATE_BAND,
): Float64Array {
  const { infinite, slope } = debyeThrough(point, band);
  const out = wideBandLogarithm(frequencies, band);
  for (let i = 0; i < out.length; i += 2) {
    out[i] = infinite + slope * out[i];
    out[i + 1] = slope * out[i + 1];
  }
  return out;
}
