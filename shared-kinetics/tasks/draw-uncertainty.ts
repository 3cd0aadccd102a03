import type { IntervalStatus, MethodId, TaskContext } from '../isoconversional/result.ts'
import { drawInterval } from '../uncertainty/draw-interval.ts'
import type { EnergyModel } from '../uncertainty/energy-model.ts'
import type { MeasuredSources } from '../uncertainty/measured-sources.ts'
import { drawEnergies, type DrawRange } from '../uncertainty/monte-carlo.ts'
import { givenOf, leftOut } from './budget-entries.ts'
import { intervalResult } from './interval-result.ts'
import type { IntervalResult } from './study-result.ts'

/** What draws are made from: small plain data, which any worker can be given. */
export interface DrawOrder {
  readonly models: readonly EnergyModel[]
  readonly sources: MeasuredSources
}

/** A share of the draws; shares put together are the same numbers as one whole. */
export const drawShare = ({ models, sources, range }: DrawOrder & { readonly range: DrawRange }, context: TaskContext): Float64Array[] =>
  drawEnergies(models, sources, range, context)

/** Drawn energies that are held at once, over draws, levels and methods: 160 MB. */
export const mostValuesAtOnce = 2e7

/**
 * How draws are made without holding more than `mostValuesAtOnce` energies, and without a single draw that takes long: methods after each other, which does not change a number, and
 * fewer draws only where one method alone is too much to hold.
 */
export function drawPlan({ models, sources }: DrawOrder, draws: number): { readonly draws: number; readonly orders: readonly DrawOrder[] } {
  const levels = Math.max(1, models[0]?.levels ?? 1)
  const taken = Math.max(1, Math.min(draws, Math.floor(mostValuesAtOnce / levels)))
  const methodsAtOnce = Math.max(1, Math.floor(mostValuesAtOnce / (levels * taken)))
  const together: EnergyModel[][] = []
  for (const model of models) {
    const group = together.at(-1)
    if (group === undefined || group.length === methodsAtOnce || workOfAll([...group, model]) > workInSlice) together.push([model])
    else group.push(model)
  }
  return { draws: taken, orders: together.map((group) => ({ models: group, sources })) }
}

/**
 * Draws that take no more than some 40 ms in a thread that has never drawn, for the first slices of a plan: one where even that takes longer. Counted are the runs at each level of each method; where
 * a method's integrals follow measured histories, each costs about ten times as much.
 */
export function drawsToBeginWith({ models }: DrawOrder): number {
  return Math.max(1, Math.floor(workToBeginWith / Math.max(1, workOfAll(models))))
}

const workInSlice = 160_000
/** Code that runs for the first time is some four times as slow. */
const workToBeginWith = 40_000

const workOfAll = (models: readonly EnergyModel[]): number =>
  models.reduce((sum, { levels, runs, form }) => sum + levels * runs * (form.kind === 'integral' && form.table !== null ? 10 : 1), 0)

/** Said beside an interval that rests on fewer draws than were asked for; else empty. */
export const noteOnFewerDraws = (taken: number, asked: number): string =>
  taken === asked
    ? ''
    : ` ${asked} draws were asked for; with so many levels no more than ${taken} are made. Choose fewer levels for more draws.`

/** The interval of each method from all shares, in the order of the shares. @throws Cancelled, by `context` */
export function intervalsOfDraws(
  { models, sources }: DrawOrder,
  shares: readonly (readonly Float64Array[])[],
  seed: number,
  context: Pick<TaskContext, 'checkCancelled'> = { checkCancelled: () => undefined },
): ReadonlyMap<MethodId, IntervalResult> {
  return new Map(
    models.map((model, m) => {
      const parts = shares.map((share) => share[m] ?? new Float64Array(0))
      const { levels } = model
      const draws = parts.reduce((sum, part) => sum + part.length, 0) / levels
      const note = noteOnDraws(sources, draws, seed)
      const missing = (level: number): IntervalStatus => (isKnown(sources, model, level) ? 'draws-without-energy' : 'source-unknown')
      return [
        model.method,
        intervalResult('measured-sources', drawInterval(parts, levels, context.checkCancelled), note, model.Ea, missing, givenOf(sources)),
      ]
    }),
  )
}

/** Whether a level has the errors of all that the method uses there: times, also of the level before where an increment begins there, and reaction rates. */
function isKnown({ noise, baseline }: MeasuredSources, { method, form, runs }: EnergyModel, level: number): boolean {
  const shifts = [noise, ...(baseline === null || baseline.reason !== null ? [] : [baseline])]
  const first = method === 'vyazovkin-incremental' ? Math.max(0, level - 1) : level
  const known = (table: Float64Array, from: number): boolean => !table.subarray(from * runs, (level + 1) * runs).some(Number.isNaN)
  const usesRate = form.kind === 'line' && form.perLnReactionRate !== 0
  return shifts.every((shift) => known(shift.time_s, first) && (!usesRate || known(shift.lnReactionRate, level)))
}

const noteOnDraws = ({ baseline }: MeasuredSources, draws: number, seed: number): string =>
  `${draws} draws with seed ${seed} of the errors of temperature, heating rate and signal${baseline === null || baseline.reason !== null ? '' : ', and of the choice of baseline'}; ` +
  '2.5 and 97.5 % points. Pointwise. Holds what is stated or assumed of the measurement (see the budget), and nothing of the scatter that the runs show.' +
  leftOut(baseline === null ? [] : [{ label: 'Choice of baseline', reason: baseline.reason }])
