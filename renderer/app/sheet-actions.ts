import { emptyTable } from '../stages/runs/rate-constant-edits.ts'
import { runCopyColumns, runRows } from '../stages/runs/run-rows.ts'
import { levelCopyColumns, levelRows } from '../stages/activation/level-rows.ts'
import { peakCopyColumns } from '../stages/activation/peak-rows.ts'
import { areLevelsBehind } from '../stages/activation/levels-behind.ts'
import { intervalsOf } from '../stages/activation/shown-interval.ts'
import type { SheetActions } from '../stages/stage-props.ts'
import { levelQuantity } from '../sheet/at-level.ts'
import { copyText } from '../sheet/data-table.ts'
import { nearestLevel } from '../sheet/nearest-level.ts'
import type { Services } from '../state/services.ts'
import type { OpenRequest } from '../state/study-session.ts'
import { isStale } from '../state/study-state.ts'
import { chosenAmong, comparedAmong } from '../state/view-store.ts'
import { copyToClipboard, download } from './files-out.ts'
import { rateConstantTables, showsRateConstants } from './rate-constant-study.ts'

/** What buttons, menus and keys set going. Nothing here throws: what went wrong is said on the sheet. */
export function createSheetActions({ session, view }: Services, openFileDialog: () => void): SheetActions {
  const read = session.store.getState

  /** Another study begins at its runs. */
  function open(request: OpenRequest): void {
    view.setState({ stage: 'runs', pointedRun: null })
    void session.open(request)
  }

  async function saveCopy(): Promise<void> {
    const file = await session.ask('study.save-copy', {})
    if (file === null) return
    download(file)
    session.say('done', `A copy was saved as ${file.fileName}.`)
  }

  /** With every kind of interval where they are there, or on their way. They are waited for outside of the line of changes, which goes on meanwhile. */
  async function exportTable(): Promise<void> {
    const withUncertainty = await session.uncertainty.settled()
    const answer = await session.ask('results.export', { format: 'csv', withUncertainty })
    if (answer === null) return
    for (const file of answer.files) download(file)
    const names = answer.files.map((file) => file.fileName).join(' and ')
    session.say(
      'done',
      `Saved ${names}, ${withUncertainty ? 'with every kind of interval' : 'without the intervals that were not worked out'}.`,
    )
  }

  async function exportRateConstants(format: 'csv' | 'json' | 'svg'): Promise<void> {
    const answer = await session.ask('results.export', { format, of: 'rate-constants' })
    if (answer === null) return
    for (const file of answer.files) download(file)
    session.say('done', `Saved ${answer.files.map((file) => file.fileName).join(' and ')}.`)
  }

  async function copyTable(): Promise<void> {
    if (isTableBehind({ session, view })) {
      session.say(
        'failure',
        'Nothing was copied: the numbers on show are for the study before the last change. Copy them when they are worked out again.',
      )
      return
    }
    const text = tableOfStage({ session, view })
    if (text === null) session.say('failure', 'There is no table to copy yet.')
    else await copyOut(text)
  }

  async function copyOut(text: string): Promise<void> {
    await copyToClipboard(text).then(
      () => session.say('done', 'The table is on the clipboard, with units in its headings.'),
      (error: unknown) => session.say('failure', error instanceof Error ? error.message : String(error)),
    )
  }

  return {
    change: (change) => void session.change(change),
    openFiles: openFileDialog,
    openDemo: () => open({ name: 'study.open-demo' }),
    newStudy: () => open({ name: 'study.new' }),
    openRecent: (studyId) => open({ name: 'study.open-recent', studyId }),
    saveCopy: () => void saveCopy(),
    exportTable: () => void (showsRateConstants(read().replica, view.getState()) ? exportRateConstants('csv') : exportTable()),
    copyTable: () => void copyTable(),
    copyOut: (text) => void copyOut(text),
    exportRateConstants: (format) => void exportRateConstants(format),
    typeRateConstants: () => {
      view.setState({ stage: 'runs', rateConstant: { kind: 'row', index: 0 } })
      void session.change({ kind: 'set-rate-constants', table: emptyTable })
    },
    undo: () => void session.undo(),
    redo: () => void session.redo(),
    moveLevel: (index) => {
      const level = read().evaluated?.result.levels[index]
      if (level !== undefined) view.setState({ conversion: level })
    },
    pictureCopied: (failure) => {
      if (failure === null) session.say('done', 'The picture is on the clipboard.')
      else session.say('failure', `The picture could not be copied: ${failure}`)
    },
  }
}

/** Whether the table of the stage that is shown holds numbers of another state of the study than its settings. */
function isTableBehind({ session, view }: Services): boolean {
  const state = session.store.getState()
  const { stage, chosenMethod, comparedMethods, interval, beneath } = view.getState()
  const result = state.evaluated?.result
  if (state.replica === null || result === undefined || showsRateConstants(state.replica, view.getState())) return false
  if (stage === 'runs' || beneath === 'peaks') return isStale(state)
  const available = result.profiles.map((profile) => profile.method)
  const chosen = chosenAmong(available, chosenMethod)
  const methods = chosen === null ? [] : [chosen, ...comparedAmong(available, comparedMethods, chosen)]
  return areLevelsBehind(state, methods, intervalsOf(result, state.uncertain, interval))
}

/** The table of the stage that is shown, as tab-separated text. */
function tableOfStage({ session, view }: Services): string | null {
  const { replica, evaluated, uncertain, rated } = session.store.getState()
  const { stage, conversion, chosenMethod, comparedMethods, interval, beneath } = view.getState()
  if (replica === null) return null
  if (showsRateConstants(replica, view.getState())) return rateConstantTables(replica, rated?.result ?? null, stage)
  const result = evaluated?.result ?? null
  const levelIndex = nearestLevel(result?.levels ?? [], conversion)
  const level = result?.levels[levelIndex] ?? null
  if (stage === 'runs')
    return replica.document.runs.length === 0
      ? null
      : copyText(runCopyColumns(level, levelIndex, levelQuantity(result)), runRows(replica.document, result))
  const available = result?.profiles.map((profile) => profile.method) ?? []
  const chosen = chosenAmong(available, chosenMethod)
  if (result === null) return null
  if (beneath === 'peaks' || chosen === null)
    return result.peakMethods.length === 0 ? null : copyText(peakCopyColumns(), result.peakMethods)
  const compared = comparedAmong(available, comparedMethods, chosen)
  return copyText(levelCopyColumns(result, chosen, compared, intervalsOf(result, uncertain, interval)), levelRows(result))
}
