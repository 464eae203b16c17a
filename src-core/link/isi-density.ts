/** A density that is even about 0: `half[i]` is the probability at i bins, and at -i bins too; `half[0]` counts once. */
export interface EvenDensity {
  readonly half: Float64Array;
  /** Variance in bins² that the bins added; to be taken off the Gaussian that is convolved next. Negative where terms too small to be binned were left to it. */
  readonly excessVariance: number;
}

/** Two buffers that take turns, so that a link allocates them once. */
export interface Workspace {
  front: Float64Array;
  back: Float64Array;
}

/** What lies beyond may be cut off the ends: far below the smallest target bit error ratio, 1e-18. */
const negligible = 1e-26;
/**
 * Amplitudes below this share of a bin are left to the Gaussian: hundreds of them make one. Beside noise of 8 bins or more, a thousand of
 * 0.1 bins move a tail of 1e-15 by 0.4 %, usual ones by far less.
 */
const tooSmall = 0.02;
const tooSmallBesideNoise = 0.1;

/**
 * Density of a sum of terms that are each +a or -a with equal chance: intersymbol interference of NRZ, and of PAM4 as two such terms a cursor.
 *
 * Each term adds two shifted copies, all terms non-negative, so that tails keep their relative precision to any depth. An amplitude
 * between two bins is, with `noisy`, shared out among them linearly; the variance that this adds, f (1 - f) a term, is returned, and taking
 * it off the noise leaves errors of third order. Without noise to take it off it is rounded, what rounding left handed on to the next: the
 * worst pattern stays where it is to half a bin. Smallest first: most terms meet a narrow density.
 * @param amplitudes bins, in any order, all at least 0
 */
export function evenDensity(amplitudes: Float64Array, noisy: boolean, space: Workspace): EvenDensity {
  const smallest = noisy ? tooSmallBesideNoise : tooSmall;
  let excess = 0;
  for (const a of amplitudes) if (a < smallest) excess -= a * a;
  const terms = amplitudes.filter((a) => a >= smallest).sort();
  let reach = 0;
  for (const a of terms) reach += Math.floor(a) + 1;
  ensure(space, 2 * reach + 4);
  let size = 1;
  space.front[0] = 1;
  let carried = 0;
  for (const a of terms) {
    // below one bin: to 0 and to ±1, variance exact
    let n = 0;
    let far = a * a;
    if (a >= 1 && noisy) {
      n = Math.floor(a);
      far = a - n;
      excess += far * (1 - far);
    } else if (a >= 1) {
      n = Math.round(a + carried);
      far = 0;
      carried += a - n;
    }
    addShifted(space.front, space.back, size, n, far / 2);
    const kept = space.front;
    space.front = space.back;
    space.back = kept;
    size = trimmed(space.front, size + n + 1);
  }
  return { half: space.front.slice(0, size), excessVariance: excess };
}

/** Room for all, and nothing left of the column before. */
function ensure(space: Workspace, length: number): void {
  if (space.front.length < length) {
    space.front = new Float64Array(length);
    space.back = new Float64Array(length);
  } else {
    space.front.fill(0);
    space.back.fill(0);
  }
}

/** out[i] = near (p[i - n] + p[i + n]) + far (p[i - n - 1] + p[i + n + 1]), near + far = 1/2, for an even p of `size` bins, zero beyond. */
function addShifted(p: Float64Array, out: Float64Array, size: number, n: number, far: number): void {
  const near = 0.5 - far;
  const m = n + 1;
  const end = size + m;
  for (let i = 0; i < m && i < end; i++) out[i] = near * (p[n - i] + p[i + n]) + far * (p[m - i] + p[i + m]);
  const both = Math.min(end, Math.max(m, size - n));
  for (let i = m; i < both; i++) out[i] = near * (p[i - n] + p[i + n]) + far * (p[i - m] + p[i + m]);
  for (let i = Math.max(m, both); i < end; i++) out[i] = near * p[i - n] + far * p[i - m];
}

/** Cuts the end off that holds next to nothing; the cells are zero again. */
function trimmed(p: Float64Array, size: number): number {
  let end = size;
  let sum = 0;
  while (end > 1 && (sum += p[end - 1]) < negligible) {
    p[end - 1] = 0;
    end--;
  }
  return end;
}
