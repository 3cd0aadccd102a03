import type { SourceKey } from '../sources.ts'

/** A published approximation of the temperature integral p(x) = ∫ₓ^∞ e⁻ᵘ/u² du, x = Ea/(RT). The program itself integrates exactly (`p-of-x.ts`). */
export interface TemperatureIntegralForm {
  readonly label: string
  /** The formula, as it is to be read. */
  readonly equation: string
  /**
   * ln p(x) by this form: neither overflows nor underflows. NaN where the form gives no positive p; throws `bad-option` where x is not a positive finite number.
   */
  readonly lnP: (x: number) => number
  /** The largest |p_form/p - 1| for from <= x <= to, rounded up in its third digit; found against the exact integral. */
  readonly accuracy: readonly { readonly from: number; readonly to: number; readonly largestError: number }[]
  readonly sources: readonly SourceKey[]
}
