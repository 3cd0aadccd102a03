/**
 * Natural logarithm of the beta function B(a, b) = Γ(a)Γ(b)/Γ(a + b) for a, b > 0, to a few units in the last place of max(1, |ln B|).
 *
 * Both arguments are raised to 15 or more by B(a, b) = B(a + 1, b)·(a + b)/a; there Stirling's formula is used with its leading parts combined, so that the large
 * logarithms of the three gamma functions never stand alone and nothing cancels between them.
 *
 * @source abramowitz-stegun-1964 6.1.41, 6.2.2
 */
export function lnBeta(a: number, b: number): number {
  let small = Math.min(a, b)
  let large = Math.max(a, b)
  let lnFactor = 0
  let factor = 1
  while (small < 15) {
    factor *= (small + large) / small
    small += 1
    // Either may be far above the other: the product would leave double precision.
    if (factor > 1e200) {
      lnFactor += Math.log(factor)
      factor = 1
    }
  }
  while (large < 15) {
    factor *= (small + large) / large
    large += 1
  }
  const ratio = small / large
  return (
    0.5 * Math.log(2 * Math.PI) -
    0.5 * Math.log(large) +
    stirlingRest(small) +
    stirlingRest(large) -
    stirlingRest(small + large) +
    (small - 0.5) * Math.log(ratio / (1 + ratio)) -
    large * Math.log1p(ratio) +
    Math.log(factor) +
    lnFactor
  )
}

/** ln Γ(z) - [(z - 1/2) ln z - z + ln(2π)/2] for z >= 15. */
function stirlingRest(z: number): number {
  const v = 1 / (z * z)
  return (1 / 12 + v * (-1 / 360 + v * (1 / 1260 + v * (-1 / 1680 + v * (1 / 1188 + v * (-691 / 360360 + v / 156)))))) / z
}
