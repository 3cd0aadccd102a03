import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import { readExport } from '../import/read-export.ts'
import { refusedFile } from '../import/import-refusal.ts'
import { reactionModels } from '../../shared-kinetics/reaction-models/registry.ts'
import type { EvaluationCache } from '../../shared-kinetics/tasks/memo.ts'
import { taskMap } from '../../shared-kinetics/tasks/task-map.ts'
import { shareColumns } from '../study/share-columns.ts'
import type { TaskTable } from './host-tasks.ts'

/**
 * What a worker can do. Each table keeps a cache of its own for the steps of an evaluation.
 * @param importOptions - what a person says about every file that is read
 */
export function createTaskTable(importOptions: ImportOptions = {}): TaskTable {
  const cache: EvaluationCache = new Map()
  return {
    'evaluate-study': ({ study, columns }, context) => taskMap['evaluate-study'](study, columns, context, cache),
    'estimate-uncertainty': ({ study, columns, uncertainty }, context) =>
      taskMap['estimate-uncertainty'](study, columns, uncertainty, context, cache),
    'draw-energies': taskMap['draw-energies'],
    'intervals-of-draws': ({ order, shares, seed }, context) => taskMap['intervals-of-draws'](order, shares, seed, context),
    'rate-constants-of-holds': ({ holds, model, options }, { checkCancelled }) =>
      taskMap['rate-constants-of-holds'](holds, reactionModels[model], options, checkCancelled),
    'evaluate-rate-constants': ({ table }) => taskMap['evaluate-rate-constants'](table),
    'import-file': ({ fileName, bytes }, context) => {
      try {
        // Out of shared memory: text decoders do not take it everywhere.
        const { runs } = readExport(fileName, new Uint8Array(bytes), importOptions, context)
        return { kind: 'runs', runs: runs.map(({ info, columns }) => ({ info, columns: shareColumns(columns) })) }
      } catch (error) {
        const refused = refusedFile(error)
        if (refused === null) throw error
        return { kind: 'refused', refused }
      }
    },
    // Loaded when one is made or opened: packing brings tables of its own.
    'pack-saved-copy': async (copy) => (await import('../study/saved-copy.ts')).packSavedCopy(copy),
    'open-saved-copy': async ({ bytes }) => (await import('../study/saved-copy.ts')).openSavedCopy(new Uint8Array(bytes)),
  }
}
