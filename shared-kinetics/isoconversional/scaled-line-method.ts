import { heatingRateOf, lineMethod, temperatureAtLevel } from './line-method.ts'
import type { IsoconversionalMethod, MethodInfo } from './result.ts'
import type { ApproximateIntegral } from './systematic-error.ts'

/** Makes a method that fits ln(beta/Tˢ) against 1/T at each level and takes Ea = -R·slope/B; s and B say what it takes for the temperature integral. */
export const scaledLineMethod = (info: MethodInfo, integral: ApproximateIntegral): IsoconversionalMethod =>
  lineMethod({
    info,
    temperature: temperatureAtLevel,
    ordinate: (run, level) => Math.log(heatingRateOf(run)) - integral.temperatureExponent * Math.log(temperatureAtLevel(run, level)),
    withoutOrdinate: 'line-not-determined',
    slopeFactor: -integral.divisor,
    interceptIsLnAf: false,
    integral,
  })
