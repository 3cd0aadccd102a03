/** Integral of y over x from the first sample to each, by the trapezoidal rule; the first entry is 0. */
export function cumulativeIntegral(x: Float64Array, y: Float64Array): Float64Array {
  const out = new Float64Array(x.length)
  for (let i = 1; i < x.length; i++) {
    out[i] = (out[i - 1] ?? 0) + 0.5 * ((y[i] ?? Number.NaN) + (y[i - 1] ?? Number.NaN)) * ((x[i] ?? Number.NaN) - (x[i - 1] ?? Number.NaN))
  }
  return out
}
