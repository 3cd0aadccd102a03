/** First index of an ascending array whose value is not below `target`; its length where all are below. */
export function lowerBound(ascending: ArrayLike<number>, target: number): number {
  let from = 0
  let to = ascending.length
  while (from < to) {
    const middle = (from + to) >>> 1
    if ((ascending[middle] ?? Number.NaN) < target) from = middle + 1
    else to = middle
  }
  return from
}
