import { allocateColumn } from '../../shared-kinetics/series/shared-column.ts'
import { type Column, column as tagged, type Unit } from '../../shared-kinetics/units/quantity.ts'
import type { LinearScale } from './linear-scale.ts'

/** A column in its SI unit, and what its checks ask about it. */
export interface ConvertedColumn<U extends Unit> {
  readonly values: Column<U>
  readonly least: number
  readonly greatest: number
  /** First row whose value is below that of the row before; null where there is none. */
  readonly firstFall: number | null
}

/** Converts a column that holds no NaN to an SI unit, on shared memory. One loop does it all: a file's columns are long and read once. */
export function convertColumn<U extends Unit>(values: Float64Array, unit: U, scale: LinearScale): ConvertedColumn<U> {
  const column = allocateColumn(values.length, unit)
  const { zero, factor, divisor, offset } = scale
  let least = Number.POSITIVE_INFINITY
  let greatest = Number.NEGATIVE_INFINITY
  let previous = Number.NEGATIVE_INFINITY
  let firstFall = -1
  for (let i = 0; i < values.length; i++) {
    const value = (((values[i] ?? 0) - zero) * factor) / divisor + offset
    column[i] = value
    if (value < least) least = value
    if (value > greatest) greatest = value
    if (value < previous && firstFall < 0) firstFall = i
    previous = value
  }
  return { values: tagged(column, unit), least, greatest, firstFall: firstFall < 0 ? null : firstFall }
}
