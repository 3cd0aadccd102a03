import type { Column } from '../units/quantity.ts'
import type { Converted } from './converted.ts'
import { fromPartialArea } from './partial-area.ts'

/**
 * Conversion from a heat-release rate, which is made with its own zero: α = ∫q dt / ∫q dt over the window, without a baseline. Integrated over time, never over
 * temperature.
 *
 * @throws KineticsError `empty-window` where nothing is released inside the window
 */
export const fromHeatRelease = (time_s: Column<'s'>, temperature_K: Column<'K'>, heatRelease: Float64Array, label: string): Converted =>
  fromPartialArea(time_s, temperature_K, heatRelease, null, label)
