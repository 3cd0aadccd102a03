/** y at one x by the straight line between the samples on either side; NaN outside them. x ascends. */
export function valueAt(x: Float64Array, y: Float64Array, at: number): number {
  const last = x.length - 1
  if (!(at >= (x[0] ?? Number.NaN)) || !(at <= (x[last] ?? Number.NaN))) return Number.NaN
  let from = 0
  let to = last
  while (to - from > 1) {
    const middle = (from + to) >> 1
    if ((x[middle] ?? 0) <= at) from = middle
    else to = middle
  }
  const x0 = x[from] ?? Number.NaN
  const y0 = y[from] ?? Number.NaN
  const step = (x[to] ?? Number.NaN) - x0
  return step > 0 ? y0 + (((y[to] ?? Number.NaN) - y0) * (at - x0)) / step : y0
}
