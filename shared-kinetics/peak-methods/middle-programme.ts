import type { RatePeak } from './peak-line.ts'

/** The peaks of one programme taken together. */
export interface MiddleProgramme {
  /** Mean ln of the heating rate in K/s, and mean 1/Tp in 1/K. */
  readonly lnHeatingRate: number
  readonly inverseTemperature: number
  readonly count: number
}

/**
 * The programme whose heating rate is nearest the geometric mean of the slowest and the fastest, the slower of two that are equally near; its replicates are
 * averaged. NaN without peaks.
 */
export function middleProgramme(peaks: readonly RatePeak[]): MiddleProgramme {
  const groups = [...new Set(peaks.map((peak) => peak.programmeGroup))]
    .map((group) => {
      const members = peaks.filter((peak) => peak.programmeGroup === group)
      const mean = (of: (peak: RatePeak) => number): number => members.reduce((sum, peak) => sum + of(peak), 0) / members.length
      return {
        lnHeatingRate: mean((peak) => Math.log(peak.heatingRate)),
        inverseTemperature: mean((peak) => 1 / peak.temperature),
        count: members.length,
      }
    })
    .sort((a, b) => a.lnHeatingRate - b.lnHeatingRate)
  const middle = 0.5 * ((groups[0]?.lnHeatingRate ?? Number.NaN) + (groups.at(-1)?.lnHeatingRate ?? Number.NaN))
  const away = (group: MiddleProgramme): number => Math.abs(group.lnHeatingRate - middle)
  const none = { lnHeatingRate: Number.NaN, inverseTemperature: Number.NaN, count: 0 }
  // Equally near within rounding: two programmes always are.
  return groups.reduce<MiddleProgramme>((best, group) => (best.count === 0 || away(group) < away(best) - 1e-9 ? group : best), none)
}
