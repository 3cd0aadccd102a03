import { gate, gates } from './design.ts'
import type { Cell } from './tally.ts'

/** Share of the replicates whose interval holds the method's own value. */
export const coverageOf = (cell: Cell): number => cell.covered / cell.replicates

export const isGated = ({ interval, error }: Cell): boolean => gates[interval]?.includes(error) ?? false

/** Standard error of a share of 0.95 of so many replicates. */
export const errorOfShare = (replicates: number): number => Math.sqrt((0.95 * 0.05) / replicates)

/** Bounds of the gate. With fewer replicates than the whole study has they are wider by three times what the standard error of the share is larger by. */
export function boundsFor(replicates: number): { readonly least: number; readonly most: number } {
  const widened = 3 * Math.max(0, errorOfShare(replicates) - errorOfShare(gate.replicates))
  return { least: gate.least - widened, most: Math.min(1, gate.most + widened) }
}

/** Gated cells whose coverage lies outside the bounds. */
export const outsideGate = (cells: readonly Cell[]): Cell[] =>
  cells.filter((cell) => {
    const { least, most } = boundsFor(cell.replicates)
    return isGated(cell) && !(coverageOf(cell) >= least && coverageOf(cell) <= most)
  })
