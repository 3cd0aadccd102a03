import type { Column, Quantity } from '../units/quantity.ts'

/** Measured temperature history of one run inside its window, time ascending. */
export interface TemperatureHistory {
  readonly time_s: Column<'s'>
  readonly temperature_K: Column<'K'>
}

/** The temperature programme a run really followed, told from T(t) and not from a label. */
export type Programme =
  | {
      readonly kind: 'constant-heating-rate'
      /** dT/dt fitted over the reaction. */
      readonly heatingRate: Quantity<'K/s'>
      /** NaN where the rate was stated and not measured. */
      readonly standardError: Quantity<'K/s'>
      readonly source: 'measured' | 'option' | 'nominal'
    }
  | { readonly kind: 'isothermal'; readonly temperature: Quantity<'K'> }
  | { readonly kind: 'general' }
