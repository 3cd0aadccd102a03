/** A curve as means over equal cells of x: evenly spaced and with little noise, for questions about its shape. */
export interface CellMeans {
  /** Middle of each cell. */
  readonly x: Float64Array
  readonly y: Float64Array
  readonly step: number
  /** Mean number of samples in a cell. */
  readonly samplesPerCell: number
}

/**
 * Means of y over `cells` equal cells of [x first, x last]. A cell without a sample takes the straight line between the samples on either side.
 *
 * @param x - ascending
 */
export function cellMeans(x: Float64Array, y: Float64Array, first: number, last: number, cells: number): CellMeans {
  const start = x[first] ?? Number.NaN
  const end = x[last] ?? Number.NaN
  const step = (end - start) / cells
  const middles = new Float64Array(cells)
  const means = new Float64Array(cells)
  let row = first
  for (let cell = 0; cell < cells; cell++) {
    const middle = start + (cell + 0.5) * step
    const to = cell === cells - 1 ? Infinity : start + (cell + 1) * step
    let count = 0
    let sumX = 0
    let sumY = 0
    while (row <= last && (x[row] as number) < to) {
      sumX += (x[row] as number) - middle
      sumY += y[row] as number
      count++
      row++
    }
    // The mean belongs to the mean x of its samples, so that few samples to a cell do not make stairs of a slope.
    middles[cell] = count > 0 ? middle + sumX / count : middle
    means[cell] = count > 0 ? sumY / count : between(x, y, Math.max(first, row - 1), Math.min(last, row), middle)
  }
  return { x: middles, y: means, step, samplesPerCell: (last - first + 1) / cells }
}

function between(x: Float64Array, y: Float64Array, before: number, after: number, at: number): number {
  const x0 = x[before] ?? Number.NaN
  const y0 = y[before] ?? Number.NaN
  const width = (x[after] ?? Number.NaN) - x0
  return width > 0 ? y0 + (((y[after] ?? Number.NaN) - y0) * (at - x0)) / width : y0
}
