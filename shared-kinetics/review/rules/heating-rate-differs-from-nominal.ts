import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.03

/** Fires where a measured constant heating rate is more than 3 % off the nominal one; never for holds and general programmes, nor where time was rebuilt. */
export function heatingRateDiffersFromNominal({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result }): Finding[] => {
    const measured = result.heatingRate_K_per_min
    const nominal = result.nominalHeatingRate_K_per_min
    if (result.heatingRateSource !== 'measured' || measured === null || nominal === null) return []
    if (Math.abs(measured - nominal) <= allowed * nominal) return []
    const off = measured / nominal - 1
    return [
      {
        code: 'heating-rate-differs-from-nominal',
        severity: 'caution',
        stage: 'runs',
        title: `${info.label} heated at ${digits(measured, 4)} K/min, nominal ${digits(nominal, 4)}`,
        message:
          `T(t) rises by ${digits(measured, 4)} K/min over the reaction, ${percent(Math.abs(off))} ${off > 0 ? 'faster' : 'slower'} than nominal${quoted(info.nominalHeatingRate?.text)}. ` +
          'Ea is calculated with the measured rate; the nominal one would shift it. Where they are far apart check the time column for a wrong unit.',
        run: info.id,
        level: null,
        evidence: { measured_K_per_min: measured, nominal_K_per_min: nominal, difference_percent: 100 * off },
        basis: 'The heating rate of the sample counts, not the one that was set; 3 % is common practice',
        sources: ['ictac-2011', 'ictac-2014'],
      },
    ]
  })
}

const quoted = (text = ''): string => (text.trim() === '' ? '' : ` (“${text.trim()}”)`)
