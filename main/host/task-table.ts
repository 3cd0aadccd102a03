import { readExport } from '../import/read-export.ts'
import { refusedFile } from '../import/import-refusal.ts'
import { evaluateStudy } from '../../shared-kinetics/tasks/evaluate-study.ts'
import { shareColumns } from '../study/share-columns.ts'
import { openSavedCopy, packSavedCopy } from '../study/saved-copy.ts'
import type { TaskTable } from './host-tasks.ts'

/** What a worker can do. Each table keeps a cache of its own for the steps of an evaluation. */
export function createTaskTable(): TaskTable {
  const cache = new Map()
  return {
    'evaluate-study': ({ study, columns }, context) => evaluateStudy(study, columns, context, cache),
    'import-file': ({ fileName, bytes }, context) => {
      try {
        // Out of shared memory: text decoders do not take it everywhere.
        const { runs } = readExport(fileName, new Uint8Array(bytes), {}, context)
        return { kind: 'runs', runs: runs.map(({ info, columns }) => ({ info, columns: shareColumns(columns) })) }
      } catch (error) {
        const refused = refusedFile(error)
        if (refused === null) throw error
        return { kind: 'refused', refused }
      }
    },
    'pack-saved-copy': packSavedCopy,
    'open-saved-copy': ({ bytes }) => openSavedCopy(new Uint8Array(bytes)),
  }
}
