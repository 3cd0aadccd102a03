import { KineticsError } from '../errors.ts'
import type { Programme } from '../series/programme.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import type { MethodInfo } from './result.ts'

/**
 * Checks that a method can be called on a series: its programmes are ones the method is made for, heating rates are positive, columns are whole.
 *
 * @throws KineticsError `bad-option` where a run followed a programme the method does not apply to; `no-heating-rate`; `column-length`
 */
export function checkSeries(info: MethodInfo, series: SeriesAtLevels): void {
  series.runs.forEach((run, i) => {
    const { kind } = run.programme
    const where = { method: info.id, run: i, programme: kind }
    if (!info.appliesTo.includes(kind)) {
      throw new KineticsError(
        'bad-option',
        `${info.label} applies to ${info.appliesTo.map((k) => programmeNames[k]).join(', ')}; run ${i + 1} followed ${programmeNames[kind]}. Leave the run or the method out.`,
        where,
      )
    }
    if (run.programme.kind === 'constant-heating-rate' && !(run.programme.heatingRate > 0)) {
      throw new KineticsError(
        'no-heating-rate',
        `${info.label} needs a positive heating rate; run ${i + 1} has ${run.programme.heatingRate} K/s. Give its heating rate or leave it out.`,
        { ...where, heatingRate_K_per_s: run.programme.heatingRate },
      )
    }
    for (const column of ['time_s', 'temperature_K', 'reactionRate_per_s'] as const) {
      if (run[column].length !== series.levels.length) {
        throw new KineticsError(
          'column-length',
          `Column ${column} of run ${i + 1} has ${run[column].length} values for ${series.levels.length} levels.`,
          {
            ...where,
            column,
          },
        )
      }
    }
  })
}

/** Temperature programmes as sentences name them. */
export const programmeNames: Readonly<Record<Programme['kind'], string>> = {
  'constant-heating-rate': 'a constant heating rate',
  isothermal: 'a hold at one temperature',
  general: 'a programme that is neither a constant heating rate nor a hold',
}

/** Number of distinct programmes; replicates count once. */
export const countProgrammes = (series: SeriesAtLevels): number => new Set(series.runs.map((run) => run.programmeGroup)).size
