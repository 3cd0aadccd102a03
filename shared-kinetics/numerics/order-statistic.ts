/**
 * The value that would stand at index `k` if `values` were sorted in ascending order, in a time that grows with their number alone (Hoare's selection). Reorders `values`: none
 * before `k` is then larger, none behind it smaller.
 *
 * @param values - without NaN, which has no order
 * @param k - whole number, 0 to length - 1
 * @returns NaN where there is no such index
 */
export function orderStatistic(values: Float64Array, k: number): number {
  let left = 0
  let right = values.length - 1
  // Each round halves the part looked at or nearly so; an order of values that defeats this is sorted instead.
  for (let rounds = 2 * Math.ceil(Math.log2(values.length + 1)) + 8; left < right; rounds--) {
    if (rounds === 0) {
      values.subarray(left, right + 1).sort()
      break
    }
    const pivot = medianOfThree(values[left] as number, values[(left + right) >> 1] as number, values[right] as number)
    let i = left
    let j = right
    while (i <= j) {
      while ((values[i] as number) < pivot) i++
      while (pivot < (values[j] as number)) j--
      if (i > j) break
      const kept = values[i] as number
      values[i] = values[j] as number
      values[j] = kept
      i++
      j--
    }
    if (j < k) left = i
    if (k < i) right = j
  }
  return values[k] ?? Number.NaN
}

function medianOfThree(a: number, b: number, c: number): number {
  if (a > b) return c > a ? a : c > b ? c : b
  return c > b ? b : c > a ? c : a
}
