import type { MethodId } from '../../isoconversional/result.ts'
import type { ReactionModelCode } from '../../reaction-models/registry.ts'
import { levels, studiedIntervals, studiedMethods, type ErrorKind, type RunCount, type StudiedInterval } from './design.ts'
import type { Intervals } from './intervals-of.ts'

/** One cell of the study. */
export interface Cell {
  readonly error: ErrorKind
  readonly model: ReactionModelCode
  readonly runs: RunCount
  readonly method: MethodId
  readonly level: number
  readonly interval: StudiedInterval
  /** The method's value on the series without errors, in J/mol. */
  readonly own_J_per_mol: number
  replicates: number
  /** Of these, those whose interval holds the method's own value; one without an interval does not. */
  covered: number
  withoutInterval: number
  /** Half the interval in J/mol, added up over those that have one. */
  halfWidths_J_per_mol: number
}

/** Counts of some replicates of one error, model and number of runs. */
export interface Tally {
  readonly cells: readonly Cell[]
  readonly add: (intervals: Intervals) => void
}

/** @param own - [method][level], in J/mol */
export function newTally(
  where: { readonly error: ErrorKind; readonly model: ReactionModelCode; readonly runs: RunCount },
  own: readonly ArrayLike<number>[],
): Tally {
  const cells: Cell[] = []
  const places = studiedMethods.map((method, m) =>
    Object.fromEntries(
      studiedIntervals.map((interval) => [
        interval,
        levels.map((level, l) => {
          const cell: Cell = {
            ...where,
            method,
            level,
            interval,
            own_J_per_mol: own[m]?.[l] ?? Number.NaN,
            replicates: 0,
            covered: 0,
            withoutInterval: 0,
            halfWidths_J_per_mol: 0,
          }
          cells.push(cell)
          return cell
        }),
      ]),
    ),
  )
  return {
    get cells() {
      return cells.filter((cell) => cell.replicates > 0)
    },
    add(intervals) {
      intervals.forEach((ofMethod, m) => {
        for (const interval of studiedIntervals) {
          const ends = ofMethod[interval]
          if (ends === undefined) continue
          places[m]?.[interval]?.forEach((cell, l) => {
            count(cell, ends.lower[l] ?? Number.NaN, ends.upper[l] ?? Number.NaN)
          })
        }
      })
    },
  }
}

function count(cell: Cell, lower: number, upper: number): void {
  cell.replicates++
  if (!(lower <= upper)) {
    cell.withoutInterval++
    return
  }
  if (lower <= cell.own_J_per_mol && cell.own_J_per_mol <= upper) cell.covered++
  cell.halfWidths_J_per_mol += 0.5 * (upper - lower)
}

/** Cells of several shares as one, in the order in which the first of each came. */
export function merged(shares: readonly (readonly Cell[])[]): Cell[] {
  const found = new Map<string, Cell>()
  for (const cell of shares.flat()) {
    const key = [cell.error, cell.model, cell.runs, cell.method, cell.level, cell.interval].join(' ')
    const known = found.get(key)
    if (known === undefined) {
      found.set(key, { ...cell })
      continue
    }
    known.replicates += cell.replicates
    known.covered += cell.covered
    known.withoutInterval += cell.withoutInterval
    known.halfWidths_J_per_mol += cell.halfWidths_J_per_mol
  }
  return [...found.values()]
}
