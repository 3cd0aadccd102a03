/**
 * The never-falling sequence nearest to y in the sense of least squares: neighbours that fall are pooled into their mean until none is left.
 *
 * @source barlow-1972
 */
export function isotonic(y: ArrayLike<number>): Float64Array {
  const n = y.length
  const mean = new Float64Array(n)
  const count = new Int32Array(n)
  let blocks = 0
  for (let i = 0; i < n; i++) {
    mean[blocks] = y[i] ?? Number.NaN
    count[blocks] = 1
    blocks++
    while (blocks > 1 && (mean[blocks - 2] ?? 0) > (mean[blocks - 1] ?? 0)) {
      const a = count[blocks - 2] ?? 0
      const b = count[blocks - 1] ?? 0
      mean[blocks - 2] = (a * (mean[blocks - 2] ?? 0) + b * (mean[blocks - 1] ?? 0)) / (a + b)
      count[blocks - 2] = a + b
      blocks--
    }
  }
  const out = new Float64Array(n)
  let at = 0
  for (let block = 0; block < blocks; block++) {
    out.fill(mean[block] ?? Number.NaN, at, at + (count[block] ?? 0))
    at += count[block] ?? 0
  }
  return out
}
