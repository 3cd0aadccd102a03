import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { createAutosave } from './autosave.ts'
import { createColumnStore, type ColumnStore } from './column-store.ts'
import type { NamesInUse } from './study-session.ts'
import type { StudyFolder, StudyStore } from './study-store.ts'

/** A study as it comes from the disk, from a saved copy, or new. */
export interface OpenedStudy {
  readonly document: StudyDocument
  readonly columns: ReadonlyMap<string, RunColumns>
  /** Original files not in the study's folder yet, by SHA-256. */
  readonly files: ReadonlyMap<string, Uint8Array>
  /** null for a study that has no folder yet; it gets one with its first save. */
  readonly folder: StudyFolder | null
}

/** All that belongs to the study that is open besides its document and log: columns, original files, folder, autosave. */
export interface OpenStudy {
  readonly columns: ColumnStore
  holdFile(sha256: string, bytes: Uint8Array): void
  /** From memory or from the study's folder; null where it was never kept. */
  originalFile(sha256: string): Promise<Uint8Array | null>
  /** To be called after every change: lets go of what nothing names any more and has the document saved a moment later. */
  changed(document: StudyDocument, names: NamesInUse): void
  /** Last save, then deletes what the document does not name and gives the folder back. */
  finish(): Promise<void>
  /** Gives the folder back without a last save. */
  abandon(): Promise<void>
  readonly folder: StudyFolder | null
}

/** @param failed - told of every save that did not succeed; the next change tries again */
export function createOpenStudy(opened: OpenedStudy, store: StudyStore | null, failed: (error: unknown) => void): OpenStudy {
  const columns = createColumnStore()
  for (const [key, held] of opened.columns) columns.put(key, held)
  const files = new Map(opened.files)
  let { document, folder } = opened

  const save = async (): Promise<void> => {
    if (store === null) return
    const saved = document
    folder ??= await store.lock(saved.id)
    if (folder === null) throw new Error('the folder of the study is in use by another window of the program')
    await folder.save(saved, { columns: (key) => columns.get(key), originalFile: (sum) => files.get(sum) ?? null })
    // On the disk now; memory need not hold them twice.
    for (const run of saved.runs) files.delete(run.file.sha256)
    await store.remember(saved.id)
  }
  const autosave = createAutosave(save, failed)
  // A study that came with files but without a folder is not on the disk at all yet.
  if (folder === null && document.runs.length > 0) autosave.changed()

  const release = async (): Promise<void> => {
    await folder?.release()
    folder = null
  }
  return {
    columns,
    holdFile: (sha256, bytes) => {
      files.set(sha256, bytes)
    },
    originalFile: async (sha256) => files.get(sha256) ?? (await folder?.originalFile(sha256)) ?? null,
    changed: (next, names) => {
      document = next
      columns.retain(names.columnsKeys)
      for (const sum of files.keys()) if (!names.fileSums.has(sum)) files.delete(sum)
      autosave.changed()
    },
    finish: async () => {
      await autosave.flush()
      const names: NamesInUse = {
        columnsKeys: new Set(document.runs.map((run) => run.columnsKey)),
        fileSums: new Set(document.runs.map((run) => run.file.sha256)),
      }
      await folder?.prune(names).catch(failed)
      await release()
    },
    abandon: async () => {
      await autosave.drop()
      await release()
    },
    get folder() {
      return folder
    },
  }
}
