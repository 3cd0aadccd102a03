import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { RateConstantTable } from '../../../shared-kinetics/rate-constants/rate-constant-table.ts'
import { savedCopySuffix } from '../../study/saved-copy-suffix.ts'
import { newStudy } from '../workspace.ts'
import type { HandlerContext, HandlerTable } from './handler-table.ts'
import { fileNameFor } from './file-name-for.ts'
import { importFiles } from './import-files.ts'

type StudyRequests =
  | 'program.describe'
  | 'study.read'
  | 'study.change'
  | 'study.undo'
  | 'study.redo'
  | 'study.new'
  | 'study.open-demo'
  | 'study.recent'
  | 'study.open-recent'
  | 'study.save-copy'

/** Requests about the study as a document. */
export function studyHandlers(context: HandlerContext): Pick<HandlerTable, StudyRequests> {
  const { workspace, pool, parts, randomId, version, shell } = context
  const stopWork = (): void => {
    context.evaluation.cancel()
    context.uncertainty.cancel()
    for (const running of context.imports) running.abort()
  }
  return {
    'program.describe': () => ({ name: 'rampfold', version, shell }),
    'study.read': () => workspace.session.snapshot(),
    'study.change': ({ revision, change }) => {
      // Runs come from files that the host has read itself; a page could only invent them.
      if (change.kind === 'add-runs') throw new KineticsError('bad-request', 'Runs are added by importing their files.')
      if (change.kind === 'set-rate-constants' && change.table !== null) refuseBesideRuns(change.table, workspace.session.document)
      return workspace.change(revision, change)
    },
    'study.undo': ({ revision }) => workspace.undo(revision),
    'study.redo': ({ revision }) => workspace.redo(revision),
    'study.new': async () => {
      stopWork()
      return workspace.replace(newStudy(randomId))
    },
    'study.open-demo': async () => {
      stopWork()
      const demo = parts.demoSeries()
      await workspace.replace(newStudy(randomId, demo.name))
      const files = demo.files.map(({ fileName, bytes }) => ({ fileName, bytes, declaredBytes: bytes.byteLength }))
      return (await importFiles(context, files)).snapshot
    },
    'study.recent': async () => ({ studies: (await workspace.store?.recent()) ?? [] }),
    'study.open-recent': async ({ studyId }) => {
      stopWork()
      return workspace.openStored(studyId)
    },
    'study.save-copy': async () => {
      const { study } = workspace
      const { document } = workspace.session
      const columns = new Map(document.runs.map((run) => [run.columnsKey, study.columns.get(run.columnsKey)]))
      const files = new Map<string, Uint8Array>()
      for (const { file } of document.runs) {
        const bytes = await study.originalFile(file.sha256)
        if (bytes !== null) files.set(file.sha256, bytes)
      }
      const bytes = await pool.run('pack-saved-copy', { document, columns, files })
      return { fileName: fileNameFor(document.name, savedCopySuffix), mediaType: 'application/zip', bytes }
    },
  }
}

/** A study holds runs or a table of rate constants; both only where the table was made from the runs. */
function refuseBesideRuns(table: RateConstantTable, { runs }: StudyDocument): void {
  if (runs.length === 0 || table.source.kind === 'isothermal-runs') return
  throw new KineticsError('bad-request', 'This study holds runs. Start a new study for a table of rate constants.', { runs: runs.length })
}
