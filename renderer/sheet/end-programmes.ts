import type { Maybe, RunResult, StudyResult } from '../../shared-kinetics/contract/study-result.ts'
import { runNames } from '../../shared-kinetics/figure/run-place.ts'
import { atLevel, type LevelQuantity } from './at-level.ts'

/** A programme with the runs that followed it. */
export interface EndProgramme {
  /** Its heating rate or hold with unit, the mean over its replicates; the first run's label where it has no single number. */
  readonly name: string
  readonly runs: readonly RunResult[]
}

/** The slowest and the fastest programme of a series; one where there is no other, none without runs. */
export function endProgrammes({ runs }: Pick<StudyResult, 'runs'>): readonly EndProgramme[] {
  const groups = new Set([runs[0]?.programmeGroup, runs.at(-1)?.programmeGroup])
  return [...groups].flatMap((group) => {
    const replicates = runs.filter((run) => run.programmeGroup === group)
    const [first] = replicates
    return first === undefined ? [] : [{ name: programmeName(first, replicates), runs: replicates }]
  })
}

/** Where the replicates of a programme reach a level, as a mean over those that do; null where none does. */
export function meanAtLevel(runs: readonly RunResult[], levelIndex: number, quantity: LevelQuantity): Maybe {
  return meanOf(runs.map((run) => atLevel(run, levelIndex, quantity)))
}

/** One run that stands for all replicates has the name of its programme, without a number. */
function programmeName(first: RunResult, replicates: readonly RunResult[]): string {
  const stand: RunResult = {
    ...first,
    heatingRate_K_per_min: meanOf(replicates.map((run) => run.heatingRate_K_per_min)),
    holdTemperature_K: meanOf(replicates.map((run) => run.holdTemperature_K)),
  }
  return runNames([stand])[0] ?? first.label
}

function meanOf(values: readonly Maybe[]): Maybe {
  const known = values.filter((value) => value !== null)
  return known.length === 0 ? null : known.reduce((sum, value) => sum + value, 0) / known.length
}

/** The names of two programmes as a range that says a shared unit once: `3.06 … 32.2 K/min`. */
export function programmeRange(names: readonly string[]): string {
  const [first, last] = names
  if (first === undefined || last === undefined) return first ?? ''
  const unit = / (\S+)$/.exec(last)?.[0] ?? ''
  const shared = unit !== '' && first.endsWith(unit) ? first.slice(0, -unit.length) : first
  return `${shared} … ${last}`
}
