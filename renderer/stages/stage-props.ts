import type { StudyChange } from '../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { StudyResult } from '../../shared-kinetics/contract/study-result.ts'

/** What a stage can set going. */
export interface SheetActions {
  readonly change: (change: StudyChange) => void
  readonly openFiles: () => void
  readonly openDemo: () => void
  readonly newStudy: () => void
  readonly openRecent: (studyId: string) => void
  readonly saveCopy: () => void
  readonly exportTable: () => void
  /** The main table of the stage. */
  readonly copyTable: () => void
  /** A table as text. */
  readonly copyOut: (text: string) => void
  readonly exportRateConstants: (format: 'csv' | 'json' | 'svg') => void
  /** Begins a table of rate constants by hand. */
  readonly typeRateConstants: () => void
  readonly undo: () => void
  readonly redo: () => void
  readonly moveLevel: (index: number) => void
  readonly pictureCopied: (failure: string | null) => void
}

export interface StageProps {
  readonly document: StudyDocument
  /** null until the first results are there. */
  readonly result: StudyResult | null
  readonly levelIndex: number
  /** The conversion at `levelIndex`; null where there are no results yet. */
  readonly level: number | null
  readonly actions: SheetActions
}
