/** Nodes of the midpoint rule over the kernel's width; it is smooth and vanishes at its ends. */
const nodes = 80

const tricube = (u: number): number => {
  const distance = Math.abs(u)
  return distance < 1 ? (1 - distance ** 3) ** 3 : 0
}

function moment(power: number): number {
  let sum = 0
  for (let k = 0; k < nodes; k++) {
    const u = (2 * (k + 0.5)) / nodes - 1
    sum += u ** power * tricube(u)
  }
  return (sum * 2) / nodes
}

const [m0, m2, m4] = [moment(0), moment(2), moment(4)]
const determinant = m0 * m4 - m2 * m2

/** Weight function that a local cubic with tricube weights amounts to on evenly spread points, for its value; u in half-widths. */
const kernel = (u: number): number => ((m4 - m2 * u * u) / determinant) * tricube(u)

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
  let square = 0
  for (let k = 0; k < nodes; k++) {
    const u = (2 * (k + 0.5)) / nodes - 1
    const value = kernel(u)
    product += value * kernel(u + d)
    square += value * value
  }
  return product / square
}
