import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, percent } from '../words.ts'

const allowed = 0.03
/** Minutes taken for seconds, or the other way round: a factor of 60, give or take what a heating rate may be off. */
const unitSlip = 60
const slipTolerance = 0.1

/** From more runs than this one finding speaks for all of them. */
const mostApart = 2

/**
 * Fires where a measured constant heating rate is more than 3 % off the nominal one; never for holds and general programmes, nor where time was rebuilt. More than two such
 * runs share one finding; a slipped unit of time always has its own.
 */
export function heatingRateDiffersFromNominal({ runs }: ReviewInput): Finding[] {
  const found = runs.flatMap(({ info, result }): Finding[] => {
    const measured = result.heatingRate_K_per_min
    const nominal = result.nominalHeatingRate_K_per_min
    if (result.heatingRateSource !== 'measured' || measured === null || nominal === null) return []
    if (Math.abs(measured - nominal) <= allowed * nominal) return []
    const off = measured / nominal - 1
    const slip = slippedUnit(measured / nominal)
    return [
      {
        code: 'heating-rate-differs-from-nominal',
        severity: slip === null ? 'caution' : 'stop',
        stage: 'runs',
        title: `${info.label} heated at ${digits(measured, 4)} K/min, nominal ${digits(nominal, 4)}`,
        message:
          slip === null
            ? `Over the reaction T(t) rises by ${digits(measured, 4)} K/min, ${percent(Math.abs(off))} ${off > 0 ? 'faster' : 'slower'} than the nominal heating rate of ` +
              `${digits(nominal, 4)} K/min${quoted(info.nominalHeatingRate?.text)}. Ea is calculated with the measured one; the nominal one would shift it.`
            : `Measured and nominal heating rate${quoted(info.nominalHeatingRate?.text)} are a factor of 60 apart: the time column is ${slip}. Mend the unit in its heading and add the file again.`,
        run: info.id,
        level: null,
        evidence: { measured_K_per_min: measured, nominal_K_per_min: nominal, difference_percent: 100 * off },
        basis: 'The heating rate of the sample counts, not the one that was set; 3 % is common practice',
        sources: ['ictac-2011', 'ictac-2014'],
      },
    ]
  })
  const off = found.filter(({ severity }) => severity === 'caution')
  const [first] = off
  if (first === undefined || off.length <= mostApart) return found
  const isLabelUnique = new Set(runs.map(({ info }) => info.label)).size === runs.length
  const label = (run: string | null): string => (isLabelUnique ? runs.find(({ info }) => info.id === run)?.info.label : run) ?? ''
  const each = off.map((one) => `${label(one.run)} ${of('measured_K_per_min', one)} (nominal ${of('nominal_K_per_min', one)})`)
  const most = Math.max(...off.map(({ evidence }) => Math.abs(Number(evidence['difference_percent']))))
  return [
    ...found.filter((one) => !off.includes(one)),
    {
      ...first,
      title: `${off.length} runs heated at another rate than the nominal one, by up to ${percent(most / 100)}`,
      message: `Over the reaction T(t) rises, in K/min, by: ${each.join('; ')}. Ea is calculated with the measured rates; the nominal ones would shift it.`,
      run: null,
      evidence: Object.fromEntries([
        ['runs', off.length],
        ...off.flatMap(({ run, evidence }) => Object.entries(evidence).map(([key, value]) => [`${label(run)}: ${key}`, value])),
      ]) as Finding['evidence'],
    },
  ]
}

const of = (key: string, { evidence }: Finding): string => digits(Number(evidence[key]), 4)

const quoted = (text = ''): string => (text.trim() === '' ? '' : ` (“${text.trim()}”)`)

const isSlip = (ratio: number): boolean => Math.abs(ratio / unitSlip - 1) <= slipTolerance

function slippedUnit(ratio: number): string | null {
  if (isSlip(1 / ratio)) return 'most likely in minutes where its heading says hours, or in seconds where it says minutes'
  if (isSlip(ratio)) return 'most likely in minutes where its heading says seconds, or in hours where it says minutes'
  return null
}
