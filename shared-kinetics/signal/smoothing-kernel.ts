/** Nodes of the midpoint rule over the kernel's width; it is smooth and vanishes at its ends. */
const nodes = 80

const tricube = (u: number): number => {
  const distance = Math.abs(u)
  if (distance >= 1) return 0
  const falling = 1 - distance * distance * distance
  return falling * falling * falling
}

const place = (k: number): number => (2 * (k + 0.5)) / nodes - 1

function moment(power: 0 | 2 | 4): number {
  let sum = 0
  for (let k = 0; k < nodes; k++) sum += place(k) ** power * tricube(place(k))
  return (sum * 2) / nodes
}

const [m0, m2, m4] = [moment(0), moment(2), moment(4)]
const determinant = m0 * m4 - m2 * m2

/** Weight function that a local cubic with tricube weights amounts to on evenly spread points, for its value; u in half-widths. */
const kernel = (u: number): number => ((m4 - m2 * u * u) / determinant) * tricube(u)

const kernelAtNodes = Float64Array.from({ length: nodes }, (_, k) => kernel(place(k)))
const sumOfSquares = kernelAtNodes.reduce((sum, value) => sum + value * value, 0)

/**
 * Correlation between the values of a local cubic with tricube weights at two places of a curve with independent noise: 1 at one place, 0 from two half-widths on.
 *
 * @param distance - between the places, in half-widths
 * @source cleveland-1979
 */
export function smoothedCorrelation(distance: number): number {
  const d = Math.abs(distance)
  if (!(d < 2)) return 0
  let product = 0
  for (let k = 0; k < nodes; k++) {
    const u = place(k) + d
    if (u >= 1) break
    product += (kernelAtNodes[k] as number) * kernel(u)
  }
  return product / sumOfSquares
}
