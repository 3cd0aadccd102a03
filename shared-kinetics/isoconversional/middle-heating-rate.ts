/** Rates that are equally near in one unit are so in another. */
const rounding = 1e-9

/**
 * Position of the run that ASTM E1641 takes Tc and beta' from: the heating rate nearest to half the sum of the lowest and the highest, the slower of two that are equally near,
 * the first of its replicates.
 *
 * @param rates - K/s or K/min
 * @returns -1 without rates
 * @source astm-e1641
 */
export function middleHeatingRate(rates: readonly number[]): number {
  const middle = 0.5 * (Math.min(...rates) + Math.max(...rates))
  const distance = (rate: number): number => Math.abs(rate - middle)
  const nearest = Math.min(...rates.map(distance)) + rounding * middle
  const near = rates.filter((rate) => distance(rate) <= nearest)
  return rates.indexOf(Math.min(...near))
}
