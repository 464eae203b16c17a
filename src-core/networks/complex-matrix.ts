/** Small square complex matrices, row by row, re and im in turn: 2n² numbers. */
export type ComplexMatrix = Float64Array;

/** out = a · b. */
export function multiply(
  a: ComplexMatrix,
  b: ComplexMatrix,
  n: number,
  out: ComplexMatrix = new Float64Array(2 * n * n),
): ComplexMatrix {
  for (let row = 0; row < n; row++) {
    for (let column = 0; column < n; column++) {
      let re = 0;
      let im = 0;
      for (let k = 0; k < n; k++) {
        const i = 2 * (row * n + k);
        const j = 2 * (k * n + column);
        re += a[i] * b[j] - a[i + 1] * b[j + 1];
        im += a[i] * b[j + 1] + a[i + 1] * b[j];
      }
      out[2 * (row * n + column)] = re;
      out[2 * (row * n + column) + 1] = im;
    }
  }
  return out;
}

/** a⁻¹ by Gauss and Jordan with the largest pivot of the column; entries are not finite where `a` is singular. */
export function invert(a: ComplexMatrix, n: number): ComplexMatrix {
  const m = a.slice();
  const out = identity(n);
  for (let column = 0; column < n; column++) {
    const pivot = largestBelow(m, n, column);
    swapRows(m, n, column, pivot);
    swapRows(out, n, column, pivot);
    const at = 2 * (column * n + column);
    const square = m[at] ** 2 + m[at + 1] ** 2;
    scaleRow(m, n, column, m[at] / square, -m[at + 1] / square, out);
    for (let row = 0; row < n; row++) {
      if (row === column) continue;
      const factor = 2 * (row * n + column);
      subtractRow(m, out, n, row, column, m[factor], m[factor + 1]);
    }
  }
  return out;
}

export function identity(n: number): ComplexMatrix {
  const out = new Float64Array(2 * n * n);
  for (let i = 0; i < n; i++) out[2 * (i * n + i)] = 1;
  return out;
}

function largestBelow(m: ComplexMatrix, n: number, column: number): number {
  let pivot = column;
  const size = (row: number) => m[2 * (row * n + column)] ** 2 + m[2 * (row * n + column) + 1] ** 2;
  for (let row = column + 1; row < n; row++) if (size(row) > size(pivot)) pivot = row;
  return pivot;
}

function swapRows(m: ComplexMatrix, n: number, a: number, b: number): void {
  if (a === b) return;
  for (let i = 0; i < 2 * n; i++) {
    const kept = m[2 * n * a + i];
    m[2 * n * a + i] = m[2 * n * b + i];
    m[2 * n * b + i] = kept;
  }
}

function scaleRow(m: ComplexMatrix, n: number, row: number, re: number, im: number, beside: ComplexMatrix): void {
  for (const matrix of [m, beside]) {
    for (let i = 2 * n * row; i < 2 * n * (row + 1); i += 2) {
      const x = matrix[i];
      matrix[i] = x * re - matrix[i + 1] * im;
      matrix[i + 1] = x * im + matrix[i + 1] * re;
    }
  }
}

function subtractRow(
  m: ComplexMatrix,
  beside: ComplexMatrix,
  n: number,
  row: number,
  from: number,
  re: number,
  im: number,
): void {
  for (const matrix of [m, beside]) {
    for (let i = 0; i < 2 * n; i += 2) {
      const x = matrix[2 * n * from + i];
      const y = matrix[2 * n * from + i + 1];
      matrix[2 * n * row + i] -= x * re - y * im;
      matrix[2 * n * row + i + 1] -= x * im + y * re;
    }
  }
}
