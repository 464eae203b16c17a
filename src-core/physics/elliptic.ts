/** Arithmetic-geometric mean of two numbers ≥ 0. Source: Gauss; Abramowitz and Stegun 17.6. */
export function arithmeticGeometricMean(first: number, second: number): number {
  let a = first;
  let b = second;
  for (let i = 0; i < 64 && Math.abs(a - b) > 1e-16 * a; i++) {
    const mean = (a + b) / 2;
    b = Math.sqrt(a * b);
    a = mean;
  }
  return a;
}

/** Complete elliptic integral of the first kind, K(k), of the modulus k (not m = k²), 0 ≤ k < 1. A&S 17.6.3. */
export function ellipticK(modulus: number): number {
  return Math.PI / 2 / arithmeticGeometricMean(1, Math.sqrt((1 - modulus) * (1 + modulus)));
}

/**
 * K(k)/K(k') from both moduli: given apart, so that neither loses its digits near 1.
 * @param modulus k
 * @param complement k' = √(1 − k²)
 */
export function ellipticRatio(modulus: number, complement: number): number {
  return arithmeticGeometricMean(1, modulus) / arithmeticGeometricMean(1, complement);
}
