/**
 * The way from a number as a file writes it to another unit: (value − zero)·factor/divisor + offset. A divisor stands where a factor would
 * not be exact, so that the result is rounded once; what does not apply is 0, 1, 1 and −0, which leave every number as it is.
 */
export interface LinearScale {
  readonly zero: number
  readonly factor: number
  readonly divisor: number
  readonly offset: number
}

/** Leaves every number as it is, −0 too. */
export const unscaled: LinearScale = { zero: 0, factor: 1, divisor: 1, offset: -0 }

export const applyScale = ({ zero, factor, divisor, offset }: LinearScale, value: number): number =>
  ((value - zero) * factor) / divisor + offset
