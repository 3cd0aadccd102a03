import type { ImportNote } from '../../shared-kinetics/series/run.ts'
import type { StudySnapshot } from '../../shared-kinetics/contract/host-api.ts'
import { studyChangeSchema, type StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import { emptyStudy, studyLimits, type StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { createOpenStudy, type OpenedStudy, type OpenStudy } from '../study/open-study.ts'
import { createStudySession, type StudySession } from '../study/study-session.ts'
import type { StudyStore } from '../study/study-store.ts'
import type { EventHub } from './event-hub.ts'
import type { ImportedRun } from './host-tasks.ts'

/** The one open study of a host and the way to another one. */
export interface Workspace {
  readonly session: StudySession
  readonly study: OpenStudy
  readonly store: StudyStore | null
  change(revision: number, change: StudyChange): StudySnapshot
  undo(revision: number): StudySnapshot
  redo(revision: number): StudySnapshot
  /**
   * Adds runs that were read from files as ONE change.
   * @param to - the study that was open when reading began; throws `Cancelled` when another has been opened since
   */
  addRuns(
    to: OpenStudy,
    runs: readonly ImportedRun[],
    files: ReadonlyMap<string, Uint8Array>,
    importNotes: readonly ImportNote[],
  ): StudySnapshot
  /** Puts another study in the place of the open one, which is saved and given back. */
  replace(opened: OpenedStudy): Promise<StudySnapshot>
  /** Opens a study of the data folder: itself, or as a copy when another host has it open. */
  openStored(studyId: string): Promise<StudySnapshot>
  close(options: { readonly save: boolean }): Promise<void>
}

export interface WorkspaceOptions {
  readonly store: StudyStore | null
  readonly events: EventHub
  readonly randomId: () => string
  /** Told in words a person can read when something could not be kept or recovered. */
  readonly warn: (message: string) => void
}

export const newStudy = (randomId: () => string, name?: string): OpenedStudy => ({
  document: name === undefined ? emptyStudy(randomId()) : emptyStudy(randomId(), name),
  columns: new Map(),
  files: new Map(),
  folder: null,
})

/** A workspace with the study that was open last, or with an empty one. */
export async function createWorkspace({ store, events, randomId, warn }: WorkspaceOptions): Promise<Workspace> {
  const notSaved = (error: unknown): void => {
    const why = error instanceof Error ? error.message : String(error)
    warn(`The study could not be saved: ${why}`)
    events.send({ kind: 'not-saved', message: `The study could not be saved: ${why}. Save a copy to be safe.` })
  }
  const first = (store === null ? null : await lastStudy(store, warn)) ?? newStudy(randomId)
  const session = createStudySession(first.document)
  let study = createOpenStudy(first, store, notSaved)

  /** Saves, frees and tells; `before` is the revision the change was made on. */
  const settled = (before: number, snapshot: StudySnapshot): StudySnapshot => {
    if (snapshot.revision === before) return snapshot
    study.changed(snapshot.document, session.namesInUse())
    events.send({ kind: 'study-changed', revision: snapshot.revision })
    return snapshot
  }

  // One opening after the other, so that two windows asking for the same study get the same one.
  let opening: Promise<unknown> = Promise.resolve()
  const inTurn = async <T>(open: () => Promise<T>): Promise<T> => {
    const turn = opening.then(open)
    opening = turn.catch(() => undefined)
    return turn
  }
  const replace = async (opened: OpenedStudy): Promise<StudySnapshot> => {
    const closing = study
    study = createOpenStudy(opened, store, notSaved)
    const snapshot = session.open(opened.document)
    events.send({ kind: 'study-changed', revision: snapshot.revision })
    await closing.finish()
    if (opened.folder !== null) await store?.remember(opened.document.id).catch(notSaved)
    return snapshot
  }

  return {
    session,
    get study() {
      return study
    },
    store,
    change: (revision, change) => settled(session.revision, session.change(revision, change)),
    undo: (revision) => settled(session.revision, session.undo(revision)),
    redo: (revision) => settled(session.revision, session.redo(revision)),
    addRuns: (to, runs, files, importNotes) => {
      if (to !== study) throw new Cancelled()
      if (session.document.runs.length + runs.length > studyLimits.runs) {
        throw new KineticsError('too-large', `A study holds at most ${studyLimits.runs} runs. Start a new study for the rest.`)
      }
      for (const { info, columns } of runs) study.columns.put(info.columnsKey, columns)
      for (const { info } of runs) {
        const bytes = files.get(info.file.sha256)
        if (bytes !== undefined) study.holdFile(info.file.sha256, bytes)
      }
      const change = studyChangeSchema.parse({ kind: 'add-runs', runs: runs.map((run) => run.info), importNotes })
      return settled(session.revision, session.change(session.revision, change))
    },
    replace: async (opened) => inTurn(async () => replace(opened)),
    openStored: async (studyId) =>
      inTurn(async () => {
        if (store === null) throw new KineticsError('bad-study', 'This host keeps no studies.', { studyId })
        if (session.document.id === studyId) return session.snapshot()
        return replace(await storedStudy(store, studyId, randomId))
      }),
    close: async ({ save }) => {
      await opening
      await (save ? study.finish() : study.abandon())
    },
  }
}

async function lastStudy(store: StudyStore, warn: (message: string) => void): Promise<OpenedStudy | null> {
  const studyId = await store.lastStudyId()
  if (studyId === null) return null
  try {
    // null while it is open in another window: this one begins with an empty study of its own.
    return await lockedStudy(store, studyId)
  } catch (error) {
    warn(`The study that was open last could not be opened again: ${error instanceof Error ? error.message : String(error)}`)
    return null
  }
}

async function storedStudy(store: StudyStore, studyId: string, randomId: () => string): Promise<OpenedStudy> {
  const locked = await lockedStudy(store, studyId)
  if (locked !== null) return locked
  const { document, columns } = await store.read(studyId)
  const files = new Map<string, Uint8Array>()
  for (const run of document.runs) {
    const bytes = await store.originalFile(studyId, run.file.sha256)
    if (bytes !== null) files.set(run.file.sha256, bytes)
  }
  return { document: asCopy(document, randomId()), columns, files, folder: null }
}

/** The study with its folder, or null while another host has it open. */
async function lockedStudy(store: StudyStore, studyId: string): Promise<OpenedStudy | null> {
  // Looked for before it is locked, since locking would make a folder for a study that is gone.
  if (!(await store.has(studyId))) throw new KineticsError('bad-study', 'This study is not on the disk any more.', { studyId })
  const folder = await store.lock(studyId)
  if (folder === null) return null
  try {
    return { ...(await store.read(studyId)), files: new Map(), folder }
  } catch (error) {
    await folder.release()
    throw error
  }
}

const asCopy = (document: StudyDocument, id: string): StudyDocument => ({ ...document, id, name: `${document.name.slice(0, 193)} (copy)` })
