import type { TaskContext } from '../isoconversional/result.ts'
import { randomStream } from '../numerics/random.ts'
import { disturbedEnergy, roomFor, type Disturbance } from './disturbed-energy.ts'
import type { EnergyModel } from './energy-model.ts'
import type { MeasuredSources } from './measured-sources.ts'
import { sharedZeros } from './shared-memory.ts'

/** Which draws of which seed; work is shared out by ranges of draws. */
export interface DrawRange {
  /** Whole, 0 to 2⁵³ - 1. */
  readonly seed: number
  readonly from: number
  /** Not included. */
  readonly to: number
}

/** Draws between two reports of progress: a few milliseconds with a hundred levels. */
const drawsBetweenReports = 10

/** Of hundreds of runs whose lowest minimum is sought anew, a level takes some milliseconds. */
const levelsBetweenLooks = 8

/**
 * Ea of every model at every level for draws of the errors that `sources` describes: one array a model, in J/mol, [(draw - from) · levels + level]; NaN where the level
 * has no Ea, or a draw has no minimum. They lie on memory that threads share.
 *
 * All errors are normal with the standard uncertainties given, but the choice of baseline, which moves every run between one baseline and the mirror image of the other,
 * evenly; where no other can be drawn under some run, no draw holds the choice. Every draw has a random stream of its own, so that the numbers are the same however the draws are shared out.
 *
 * @param models - of one series
 * @throws Cancelled, by `context`
 * @source jcgm-101-2008
 */
export function drawEnergies(
  models: readonly EnergyModel[],
  sources: MeasuredSources,
  { seed, from, to }: DrawRange,
  context: TaskContext,
): Float64Array[] {
  const [first] = models
  if (first === undefined) return []
  const { runs, levels } = first
  const energies = models.map(() => sharedZeros((to - from) * levels))
  const disturbance: Disturbance = {
    temperature_K: new Float64Array(runs),
    lnHeatingRate: new Float64Array(runs),
    lag_s: 0,
    time_s: new Float64Array(runs * levels),
    lnReactionRate: new Float64Array(runs * levels),
  }
  const room = roomFor(runs)
  for (let draw = from; draw < to; draw++) {
    context.checkCancelled()
    if ((draw - from) % drawsBetweenReports === 0) context.progress(draw - from, to - from)
    disturb(disturbance, sources, runs, levels, seed, draw, context.checkCancelled)
    models.forEach((model, m) => {
      const values = energies[m] as Float64Array
      for (let level = 0; level < levels; level++) {
        if (level % levelsBetweenLooks === 0) context.checkCancelled()
        values[(draw - from) * levels + level] = disturbedEnergy(model, level, disturbance, room)
      }
    })
  }
  return energies
}

function disturb(
  disturbance: Disturbance,
  { stated, heatingRate_share, noise, baseline }: MeasuredSources,
  runs: number,
  levels: number,
  seed: number,
  draw: number,
  checkCancelled: () => void,
): void {
  const random = randomStream(seed, draw)
  const common = stated.temperatureCommon_K * random.normal()
  disturbance.lag_s = stated.lag_s * random.normal()
  const choice = 2 * random.uniform() - 1
  for (let i = 0; i < runs; i++) {
    disturbance.temperature_K[i] = common + stated.temperatureRun_K * random.normal()
    disturbance.lnHeatingRate[i] = (heatingRate_share[i] as number) * random.normal()
  }
  for (let i = 0; i < runs; i++) {
    let before = 0
    for (let level = 0; level < levels; level++) {
      if (level % levelsBetweenLooks === 0) checkCancelled()
      const k = level * runs + i
      const correlation = noise.correlationWithBefore[k] as number
      before = correlation * before + Math.sqrt(Math.max(0, 1 - correlation * correlation)) * random.normal()
      disturbance.time_s[k] = (noise.time_s[k] as number) * before
      disturbance.lnReactionRate[k] =
        (noise.lnReactionRate[k] as number) * random.normal() +
        (noise.lnReactionRateSlope_per_s[k] as number) * (disturbance.time_s[k] ?? Number.NaN)
    }
  }
  if (baseline === null || baseline.reason !== null) return
  for (let k = 0; k < runs * levels; k++) {
    disturbance.time_s[k] = (disturbance.time_s[k] as number) + choice * (baseline.time_s[k] as number)
    disturbance.lnReactionRate[k] = (disturbance.lnReactionRate[k] as number) + choice * (baseline.lnReactionRate[k] as number)
  }
}
