import { naturalOrder } from '../../../shared-kinetics/contract/natural-order.ts'
import type { RunColumns } from '../../../shared-kinetics/series/run.ts'
import type { ImportedRun } from '../host-tasks.ts'

/**
 * Runs from slow to fast (as measured, else as stated), holds first, then by file name as a person counts. The heating rate taken
 * here only orders the list: rates within about 2 % stand as one, so that replicates keep the order of their names.
 */
export function inOrderOfHeatingRate(runs: readonly ImportedRun[]): readonly ImportedRun[] {
  return runs
    .map((run) => ({ run, step: stepOf(heatingRate_K_per_s(run)) }))
    .toSorted((a, b) => a.step - b.step || naturalOrder(a.run.info.file.name, b.run.info.file.name))
    .map(({ run }) => run)
}

/** Steps of 2 %: comparing with a tolerance would not be an ordering. Below 0.05 K/min a run is a hold. */
function stepOf(rate_K_per_s: number): number {
  if (!(rate_K_per_s > 0.05 / 60)) return Number.NEGATIVE_INFINITY
  return Math.round(Math.log(rate_K_per_s) / Math.log(1.02))
}

function heatingRate_K_per_s({ info, columns }: ImportedRun): number {
  return measured(columns) ?? info.nominalHeatingRate?.heatingRate_K_per_s ?? 0
}

/** Median slope between rows a tenth of the run apart: neither end effects nor a splice move it. */
function measured({ time_s, temperature_K }: RunColumns): number | null {
  if (time_s === null) return null
  const rows = temperature_K.length
  const stride = Math.max(1, Math.floor(rows / 10))
  const slopes: number[] = []
  for (let i = 0; i + stride < rows; i += Math.max(1, Math.floor(stride / 10))) {
    const slope = (at(temperature_K, i + stride) - at(temperature_K, i)) / (at(time_s, i + stride) - at(time_s, i))
    if (Number.isFinite(slope)) slopes.push(slope)
  }
  return slopes.toSorted((a, b) => a - b)[Math.floor(slopes.length / 2)] ?? null
}

const at = (values: Float64Array, index: number): number => values[index] ?? Number.NaN
