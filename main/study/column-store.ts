import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { shareColumns } from './share-columns.ts'

/** The raw columns of the open study, on shared memory, by `columnsKey`: every worker reads them without a copy. */
export interface ColumnStore {
  put(columnsKey: string, columns: RunColumns): void
  /** @throws KineticsError `unknown-run` for a key that is not held */
  get(columnsKey: string): RunColumns
  /** Lets go of every column that is not named. */
  retain(columnsKeys: ReadonlySet<string>): void
  readonly size: number
}

export function createColumnStore(): ColumnStore {
  const held = new Map<string, RunColumns>()
  return {
    put: (columnsKey, columns) => {
      if (!held.has(columnsKey)) held.set(columnsKey, shareColumns(columns))
    },
    get: (columnsKey) => {
      const columns = held.get(columnsKey)
      if (columns === undefined) {
        throw new KineticsError('unknown-run', 'The measured columns of a run are missing. Remove the run and add its file again.', {
          columnsKey,
        })
      }
      return columns
    },
    retain: (columnsKeys) => {
      for (const key of held.keys()) if (!columnsKeys.has(key)) held.delete(key)
    },
    get size() {
      return held.size
    },
  }
}
