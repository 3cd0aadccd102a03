/**
 * Householder QR of a tall matrix with column pivoting, the transformation applied to a right-hand side at once; Q itself is not kept.
 * Matrices are column-major: element (i, j) of an m × n matrix stands at j·m + i.
 *
 * With pivoting the diagonal of R falls in size, so that |R_kk|/|R_11| shows how near the columns are to being dependent.
 *
 * @param a - m × n, m >= n; overwritten, R in its upper triangle
 * @param b - m long; overwritten by Qᵀb
 * @param pivoting - false keeps the order of the columns
 * @returns the order: column k of R belongs to column `order[k]` of the matrix given
 * @source golub-van-loan-1996 5.2, 5.4
 */
export function qrInPlace(a: Float64Array, b: Float64Array, m: number, n: number, pivoting: boolean): Int32Array {
  const order = Int32Array.from({ length: n }, (_, j) => j)
  for (let k = 0; k < n; k++) {
    if (pivoting) bringLargestForward(a, m, n, k, order)
    const largest = largestOf(a, k * m + k, m - k)
    if (largest === 0) continue
    // Divided by a power of two first, which costs no digit: the norm of a column of subnormal numbers is too coarse to make a unit vector of it.
    const scale = 2 ** Math.floor(Math.log2(largest))
    for (let i = k; i < m; i++) a[k * m + i] = at(a, k * m + i) / scale
    const norm = normOf(a, k * m + k, m - k)
    const head = at(a, k * m + k)
    const diagonal = head > 0 ? -norm : norm
    // The reflection is I - v vᵀ/|v_k| with v = (column - diagonal·e_k)/norm; v stands below the diagonal until it is used up.
    for (let i = k; i < m; i++) a[k * m + i] = at(a, k * m + i) / norm
    const vk = (head - diagonal) / norm
    a[k * m + k] = vk
    for (let j = k + 1; j < n; j++) reflect(a, k * m + k, a, j * m + k, m - k, 1 / Math.abs(vk))
    reflect(a, k * m + k, b, k, m - k, 1 / Math.abs(vk))
    a[k * m + k] = diagonal * scale
  }
  return order
}

/** Solves R x = b for the upper triangle R (n × n) of a column-major matrix with `stride` rows; no diagonal element may be 0. */
export function solveUpper(r: Float64Array, stride: number, n: number, b: ArrayLike<number>): Float64Array {
  const x = new Float64Array(n)
  for (let i = n - 1; i >= 0; i--) {
    let sum = at(b, i)
    for (let j = i + 1; j < n; j++) sum -= at(r, j * stride + i) * at(x, j)
    x[i] = sum / at(r, i * stride + i)
  }
  return x
}

/** Solves Rᵀ x = b for the same R. */
export function solveUpperTransposed(r: Float64Array, stride: number, n: number, b: ArrayLike<number>): Float64Array {
  const x = new Float64Array(n)
  for (let i = 0; i < n; i++) {
    let sum = at(b, i)
    for (let j = 0; j < i; j++) sum -= at(r, i * stride + j) * at(x, j)
    x[i] = sum / at(r, i * stride + i)
  }
  return x
}

/** Euclidean norm of `length` elements from `from` on, safe against overflow and underflow of the squares. */
export function normOf(values: ArrayLike<number>, from = 0, length = values.length - from): number {
  const largest = largestOf(values, from, length)
  if (largest === 0 || !Number.isFinite(largest)) return largest
  let sum = 0
  for (let i = 0; i < length; i++) sum += (at(values, from + i) / largest) ** 2
  return largest * Math.sqrt(sum)
}

function largestOf(values: ArrayLike<number>, from: number, length: number): number {
  let largest = 0
  for (let i = 0; i < length; i++) largest = Math.max(largest, Math.abs(at(values, from + i)))
  return largest
}

function bringLargestForward(a: Float64Array, m: number, n: number, k: number, order: Int32Array): void {
  let best = k
  let bestNorm = -1
  for (let j = k; j < n; j++) {
    const norm = normOf(a, j * m + k, m - k)
    if (norm > bestNorm) {
      best = j
      bestNorm = norm
    }
  }
  if (best === k) return
  for (let i = 0; i < m; i++) {
    const kept = at(a, k * m + i)
    a[k * m + i] = at(a, best * m + i)
    a[best * m + i] = kept
  }
  const kept = at(order, k)
  order[k] = at(order, best)
  order[best] = kept
}

/** y - v (vᵀy)·scale for `length` elements of y. */
function reflect(v: Float64Array, vFrom: number, y: Float64Array, yFrom: number, length: number, scale: number): void {
  let dot = 0
  for (let i = 0; i < length; i++) dot += at(v, vFrom + i) * at(y, yFrom + i)
  const factor = dot * scale
  for (let i = 0; i < length; i++) y[yFrom + i] = at(y, yFrom + i) - factor * at(v, vFrom + i)
}

const at = (values: ArrayLike<number>, i: number): number => values[i] ?? Number.NaN
