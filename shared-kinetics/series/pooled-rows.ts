import { column } from '../units/quantity.ts'
import type { UsableRows } from './usable-rows.ts'

/** With more rows than twice this, neighbours are pooled until about so many are left. */
const enoughRows = 4000
/** A step of time so many times the mean one is a gap, over which nothing is pooled. */
const gapStep = 5
/** Nor are rows whose temperatures differ by more: on a fast way up to a hold the mean of exp(-Ea/RT) is not that at the mean T. */
const widest_K = 0.25

/**
 * A long run as means of as many neighbouring rows each as leave about 4,000; a run of fewer than 8,000 rows as it is. A mean keeps what its rows say of a smooth
 * signal, with their noise averaged: on a reaction that fills a fifth of the run, what it takes off the curvature moves conversion by less than 1e-5. The first and the
 * last row stay rows of their own, so that the run begins and ends when it did, and no mean spans a gap or more than 0.25 K.
 */
export function pooledRows(rows: UsableRows): UsableRows {
  const n = rows.time_s.length
  const inEach = Math.floor(n / enoughRows)
  if (inEach < 2) return rows
  const { time_s, temperature_K, signal } = rows
  const most = gapStep * ((time_s[n - 1] as number) / (n - 1))
  const places = new Int32Array(n)
  const pools = place(time_s, temperature_K, inEach, most, places)
  const { behind } = rows.setAside
  return {
    time_s: column(means(time_s, places, pools), 's'),
    temperature_K: column(means(temperature_K, places, pools), 'K'),
    signal: means(signal, places, pools),
    rebuiltFrom: rows.rebuiltFrom,
    setAside: { ...rows.setAside, behind: behind.map((block) => ({ ...block, after: places[block.after] ?? 0 })) },
  }
}

/** Writes the pool of every row; how many there are. The first row after a break stands alone, so that a corner of the programme stays where it is. */
function place(time: Float64Array, temperature: Float64Array, inEach: number, longestStep: number, places: Int32Array): number {
  const last = time.length - 1
  let pool = 0
  let held = 1
  let room = 1
  let from = temperature[0] as number
  for (let i = 1; i <= last; i++) {
    const isBreak = (time[i] as number) - (time[i - 1] as number) > longestStep || Math.abs((temperature[i] as number) - from) > widest_K
    if (isBreak || held === room || i === last) {
      pool++
      held = 0
      room = isBreak ? 1 : inEach
      from = temperature[i] as number
    }
    places[i] = pool
    held++
  }
  return pool + 1
}

function means(values: Float64Array, places: Int32Array, pools: number): Float64Array {
  const out = new Float64Array(pools)
  let i = 0
  for (let pool = 0; pool < pools; pool++) {
    // From the first value of the pool, so that a large offset costs no digits.
    const first = values[i] as number
    let sum = 0
    let count = 0
    for (; i < values.length && places[i] === pool; i++) {
      sum += (values[i] as number) - first
      count++
    }
    out[pool] = first + sum / count
  }
  return out
}
