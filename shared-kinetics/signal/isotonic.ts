/**
 * The never-falling sequence nearest to y in the sense of least squares: neighbours that fall are pooled into their mean until none is left.
 *
 * @source barlow-1972
 */
export function isotonic(y: ArrayLike<number>): Float64Array {
  const n = y.length
  const mean = new Float64Array(n)
  const count = new Int32Array(n)
  const out = new Float64Array(n)
  spread(mean, count, pool(y, mean, count), out)
  return out
}

/** Pools into blocks, each with its mean and number of values; how many blocks there are. */
function pool(y: ArrayLike<number>, mean: Float64Array, count: Int32Array): number {
  const n = y.length
  let blocks = 0
  for (let i = 0; i < n; i++) {
    let top = y[i] as number
    let rows = 1
    while (blocks > 0 && (mean[blocks - 1] as number) > top) {
      const before = count[blocks - 1] as number
      top = (before * (mean[blocks - 1] as number) + rows * top) / (before + rows)
      rows += before
      blocks--
    }
    mean[blocks] = top
    count[blocks] = rows
    blocks++
  }
  return blocks
}

function spread(mean: Float64Array, count: Int32Array, blocks: number, out: Float64Array): void {
  let at = 0
  for (let block = 0; block < blocks; block++) {
    const value = mean[block] as number
    for (const end = at + (count[block] as number); at < end; at++) out[at] = value
  }
}
