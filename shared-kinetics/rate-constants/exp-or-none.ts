/** exp(x), and NaN where it leaves double precision: a rate constant is never 0 or infinite, and its logarithm says what it is. */
export function expOrNone(x: number): number {
  const power = Math.exp(x)
  return power > 0 && Number.isFinite(power) ? power : Number.NaN
}
