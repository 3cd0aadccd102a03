/**
 * Γ(z + 1/2)/Γ(z) for z > 0, relative error below 1e-14.
 *
 * The ratio is formed directly: as a difference of two ln Γ it would lose a digit for each power of ten of z. Recurrence up to z >= 30, then the asymptotic
 * series √z·(1 - 1/8z + 1/128z² + 5/1024z³ - 21/32768z⁴ - 399/262144z⁵ + 869/4194304z⁶ + …).
 *
 * @source abramowitz-stegun-1964 6.1.47
 */
export function gammaRatio(z: number): number {
  let factor = 1
  let w = z
  while (w < 30) {
    factor *= w / (w + 0.5)
    w += 1
  }
  const v = 1 / w
  const series =
    1 +
    v * (-1 / 8 + v * (1 / 128 + v * (5 / 1024 + v * (-21 / 32768 + v * (-399 / 262144 + v * (869 / 4194304 + (v * 39325) / 33554432))))))
  return factor * Math.sqrt(w) * series
}
