import erfc from '@stdlib/math-base-special-erfc';
import erfcinv from '@stdlib/math-base-special-erfcinv';

/** Probability that a normal variable of mean 0 and sigma 1 exceeds x. Source: exact; check values D-09, D-10. */
export const gaussianTail = (x: number) => 0.5 * erfc(x / Math.SQRT2);

/** The x that a normal variable exceeds with this probability. Check value D-09. */
export const gaussianTailInverse = (probability: number) => Math.SQRT2 * erfcinv(2 * probability);
