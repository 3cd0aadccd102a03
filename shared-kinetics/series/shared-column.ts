import type { Column, Unit } from '../units/quantity.ts'

/**
 * A column of zeros on memory that threads share, so that workers read it without a copy.
 * @param length - number of rows
 * @param _unit - SI unit the numbers will be in; tags the type only
 */
export function allocateColumn<U extends Unit>(length: number, _unit: U): Column<U> {
  return new Float64Array(new SharedArrayBuffer(length * Float64Array.BYTES_PER_ELEMENT)) as Float64Array as Column<U>
}
