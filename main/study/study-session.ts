import { enablePatches, applyPatches, produceWithPatches, type Patch } from 'immer'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { StudySnapshot } from '../../shared-kinetics/contract/host-api.ts'
import { applyChange, labelOfChange, type StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import { reconcile } from './reconcile.ts'

enablePatches()

/** Oldest entries of the patch log go first once it holds this many. */
export const longestPatchLog = 500

/** One change in the patch log: how to go forward, how to go back, and which columns both sides of it name. */
interface LogEntry {
  readonly label: string
  readonly forward: readonly Patch[]
  readonly back: readonly Patch[]
  readonly columnsKeys: readonly string[]
  readonly fileSums: readonly string[]
}

/** What the document or its patch log still names, and what must therefore be kept. */
export interface NamesInUse {
  readonly columnsKeys: ReadonlySet<string>
  /** SHA-256 of original files. */
  readonly fileSums: ReadonlySet<string>
}

/** The study document of one host with its revision and patch log. */
export interface StudySession {
  readonly document: StudyDocument
  readonly revision: number
  snapshot(): StudySnapshot
  /**
   * Applies a change a replica made on the revision it saw; a change that alters nothing keeps revision and log.
   * @throws KineticsError `revision-conflict` when that revision is not the current one
   */
  change(revision: number, change: StudyChange): StudySnapshot
  /** @throws KineticsError `revision-conflict`; with nothing to undo the snapshot is as before */
  undo(revision: number): StudySnapshot
  /** @throws KineticsError `revision-conflict`; with nothing to redo the snapshot is as before */
  redo(revision: number): StudySnapshot
  /** Replaces the study; the log starts anew and the revision counts on. */
  open(document: StudyDocument): StudySnapshot
  namesInUse(): NamesInUse
}

/** A session on `first`, at revision 1, with an empty patch log. */
export function createStudySession(first: StudyDocument): StudySession {
  let document = first
  let revision = 1
  let done: LogEntry[] = []
  let undone: LogEntry[] = []

  const snapshot = (): StudySnapshot => ({
    revision,
    document,
    undo: done.at(-1)?.label ?? null,
    redo: undone.at(-1)?.label ?? null,
  })
  const checkRevision = (seen: number): void => {
    if (seen === revision) return
    throw new KineticsError(
      'revision-conflict',
      'The study has changed since this page last saw it. Read it again and repeat the change.',
      {
        seen,
        current: revision,
      },
    )
  }

  return {
    get document() {
      return document
    },
    get revision() {
      return revision
    },
    snapshot,
    change: (seen, change) => {
      checkRevision(seen)
      const before = document
      const [after, forward, back] = produceWithPatches(before, (draft) => reconcile(draft, applyChange(before, change)))
      if (forward.length === 0) return snapshot()
      const both = [before, after]
      done.push({
        label: labelOfChange(before, change),
        forward,
        back,
        columnsKeys: both.flatMap((study) => study.runs.map((run) => run.columnsKey)),
        fileSums: both.flatMap((study) => study.runs.map((run) => run.file.sha256)),
      })
      if (done.length > longestPatchLog) done.shift()
      undone = []
      document = after
      revision += 1
      return snapshot()
    },
    undo: (seen) => {
      checkRevision(seen)
      const entry = done.pop()
      if (entry === undefined) return snapshot()
      document = applyPatches(document, entry.back)
      undone.push(entry)
      revision += 1
      return snapshot()
    },
    redo: (seen) => {
      checkRevision(seen)
      const entry = undone.pop()
      if (entry === undefined) return snapshot()
      document = applyPatches(document, entry.forward)
      done.push(entry)
      revision += 1
      return snapshot()
    },
    open: (next) => {
      document = next
      revision += 1
      done = []
      undone = []
      return snapshot()
    },
    namesInUse: () => {
      const log = [...done, ...undone]
      return {
        columnsKeys: new Set([...document.runs.map((run) => run.columnsKey), ...log.flatMap((entry) => entry.columnsKeys)]),
        fileSums: new Set([...document.runs.map((run) => run.file.sha256), ...log.flatMap((entry) => entry.fileSums)]),
      }
    },
  }
}
