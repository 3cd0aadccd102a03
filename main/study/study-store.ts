import { mkdir, readdir, readFile, stat, unlink } from 'node:fs/promises'
import { join } from 'node:path'
import * as z from 'zod/mini'
import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { columnsFit, decodeColumns, encodeColumns } from './columns-file.ts'
import { isMissing } from './is-missing.ts'
import { lockStale_ms } from './lock-file.ts'
import { largestStudyJsonBytes, readStudyJson, writeStudyJson } from './read-study-json.ts'
import { takeStudyLock, type StudyLock } from './study-lock.ts'
import type { NamesInUse } from './study-session.ts'
import { writeAtomically } from './write-atomically.ts'

/** Newest studies that the recent list holds. */
const longestRecentList = 50

const studyId = /^[0-9a-z-]{1,64}$/
const lastStudySchema = z.object({ studyId: z.string().check(z.regex(studyId)) })

/** What a save needs besides the document: columns and original files by key, for those not on the disk yet. */
export interface StudyParts {
  columns(columnsKey: string): RunColumns
  /** null when the bytes are not held in memory (they are on the disk, or were never kept). */
  originalFile(sha256: string): Uint8Array | null
}

/** One study's folder, held by this host: only it writes there. */
export interface StudyFolder {
  readonly studyId: string
  /** Columns and files first, the document last, each atomically: whatever the document on the disk names is there. */
  save(document: StudyDocument, parts: StudyParts): Promise<void>
  originalFile(sha256: string): Promise<Uint8Array | null>
  /** Deletes columns and files that are not named any more. */
  prune(names: NamesInUse): Promise<void>
  release(): Promise<void>
}

export interface StoredStudy {
  readonly document: StudyDocument
  readonly columns: ReadonlyMap<string, RunColumns>
}

/**
 * The studies in the user's data folder: `studies/<id>/study.json`, `columns/<key>.bin`, `exports/<sha256>`.
 * Two hosts may share the folder: each locks the study it has open. A study that is locked elsewhere can still be read, and is
 * then opened as a copy under an id of its own, so that neither overwrites the other.
 */
export interface StudyStore {
  has(studyId: string): Promise<boolean>
  /** null while another host has this study open. */
  lock(studyId: string): Promise<StudyFolder | null>
  /** @throws KineticsError `bad-study` for a study that is gone, damaged or of a later format */
  read(studyId: string): Promise<StoredStudy>
  originalFile(studyId: string, sha256: string): Promise<Uint8Array | null>
  recent(): Promise<readonly RecentStudy[]>
  /** The study that was open last, or null. */
  lastStudyId(): Promise<string | null>
  remember(studyId: string): Promise<void>
}

/**
 * Opens (and makes, readable by the user alone) the data folder.
 * @param token - names this host in its locks
 */
export async function openStudyStore(dataFolder: string, token: string, now: () => number): Promise<StudyStore> {
  const studies = join(dataFolder, 'studies')
  await mkdir(studies, { recursive: true, mode: 0o700 })
  const lastStudy = join(dataFolder, 'last-study.json')

  const folderOf = (id: string): string => {
    if (!studyId.test(id)) throw new KineticsError('bad-study', 'There is no study of this name.', { studyId: id })
    return join(studies, id)
  }
  const readDocument = async (id: string): Promise<StudyDocument> => {
    const path = join(folderOf(id), 'study.json')
    try {
      if ((await stat(path)).size > largestStudyJsonBytes)
        throw new KineticsError('bad-study', 'The study cannot be read: it is too large.')
      const document = readStudyJson(await readFile(path))
      if (document.id !== id)
        throw new KineticsError('bad-study', 'The study cannot be read: its folder holds another study.', { studyId: id })
      return document
    } catch (error) {
      if (isMissing(error)) throw new KineticsError('bad-study', 'This study is not on the disk any more.', { studyId: id })
      throw error
    }
  }

  return {
    has: async (id) => exists(join(folderOf(id), 'study.json')),
    lock: async (id) => {
      const folder = folderOf(id)
      await mkdir(join(folder, 'columns'), { recursive: true, mode: 0o700 })
      await mkdir(join(folder, 'exports'), { recursive: true, mode: 0o700 })
      const lock = await takeStudyLock(folder, token, now)
      if (lock === null) return null
      await removePassingFiles(folder, now)
      return createStudyFolder(id, folder, lock)
    },
    read: async (id) => {
      const document = await readDocument(id)
      const columns = new Map<string, RunColumns>()
      for (const run of document.runs) {
        const bytes = await readOrNull(join(folderOf(id), 'columns', `${run.columnsKey}.bin`))
        const held = bytes === null ? null : decodeColumns(bytes)
        if (held === null || !columnsFit(run, held)) {
          throw new KineticsError('bad-study', `The study cannot be read: the columns of ${run.label} are missing or are another run's.`)
        }
        columns.set(run.columnsKey, held)
      }
      return { document, columns }
    },
    originalFile: async (id, sha256) => readOrNull(join(folderOf(id), 'exports', sha256)),
    recent: async () => {
      const found: RecentStudy[] = []
      for (const id of await readdir(studies)) {
        if (!studyId.test(id)) continue
        const changed = await stat(join(studies, id, 'study.json')).catch(() => null)
        if (changed === null) continue
        // One damaged study must not hide the others.
        const document = await readDocument(id).catch(() => null)
        if (document === null) continue
        const rateConstants = document.rateConstants?.rows.length ?? 0
        found.push({ studyId: id, name: document.name, runs: document.runs.length, rateConstants, changedAt: changed.mtime.toISOString() })
      }
      return found.toSorted((a, b) => b.changedAt.localeCompare(a.changedAt)).slice(0, longestRecentList)
    },
    lastStudyId: async () => {
      try {
        return lastStudySchema.parse(JSON.parse(await readFile(lastStudy, 'utf8'))).studyId
      } catch {
        return null
      }
    },
    remember: async (id) => writeAtomically(lastStudy, JSON.stringify({ studyId: id })),
  }
}

function createStudyFolder(id: string, folder: string, lock: StudyLock): StudyFolder {
  const columnsPath = (key: string): string => join(folder, 'columns', `${key}.bin`)
  const exportPath = (sha256: string): string => join(folder, 'exports', sha256)
  return {
    studyId: id,
    save: async (document, parts) => {
      if (!(await lock.isOurs())) {
        throw new KineticsError(
          'bad-study',
          'Another window of the program has taken this study over. Save a copy to keep what you see here.',
        )
      }
      for (const run of document.runs) {
        if (!(await exists(columnsPath(run.columnsKey)))) {
          await writeAtomically(columnsPath(run.columnsKey), encodeColumns(parts.columns(run.columnsKey)))
        }
        if (!(await exists(exportPath(run.file.sha256)))) {
          const bytes = parts.originalFile(run.file.sha256)
          if (bytes !== null) await writeAtomically(exportPath(run.file.sha256), bytes)
        }
      }
      await writeAtomically(join(folder, 'study.json'), writeStudyJson(document))
    },
    originalFile: async (sha256) => readOrNull(exportPath(sha256)),
    prune: async (names) => {
      if (!(await lock.isOurs())) return
      for (const file of await readdir(join(folder, 'columns'))) {
        if (!names.columnsKeys.has(file.replace(/\.bin$/, ''))) await unlink(join(folder, 'columns', file)).catch(() => undefined)
      }
      for (const file of await readdir(join(folder, 'exports'))) {
        if (!names.fileSums.has(file)) await unlink(join(folder, 'exports', file)).catch(() => undefined)
      }
    },
    release: async () => lock.release(),
  }
}

/** What a host that was killed in the middle of a write has left behind. Others may be at the lock just now: their files are left alone. */
async function removePassingFiles(folder: string, now: () => number): Promise<void> {
  for (const part of [folder, join(folder, 'columns'), join(folder, 'exports')]) {
    for (const name of await readdir(part)) {
      if (!name.endsWith('.tmp')) continue
      const path = join(part, name)
      if (name.startsWith('lock.json.') && now() - (await changedAt_ms(path)) < lockStale_ms) continue
      await unlink(path).catch(() => undefined)
    }
  }
}

/** When a file got its present name or content, whatever its time of modification says. */
const changedAt_ms = async (path: string): Promise<number> =>
  stat(path).then(
    (found) => found.ctimeMs,
    () => 0,
  )

const exists = async (path: string): Promise<boolean> =>
  stat(path).then(
    () => true,
    () => false,
  )

async function readOrNull(path: string): Promise<Uint8Array | null> {
  try {
    return await readFile(path)
  } catch (error) {
    if (isMissing(error)) return null
    throw error
  }
}
