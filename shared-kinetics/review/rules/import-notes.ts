import type { ImportNote } from '../../series/run.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'

const titles: Readonly<Record<ImportNote['code'], string>> = {
  'rows-set-aside': 'rows set aside while reading',
  'columns-set-aside': 'columns set aside while reading',
  'several-columns-of-one-quantity': 'several columns of one quantity',
  'unit-from-values': 'a unit told from the values',
  'heading-missing': 'no row of headings',
  'time-missing': 'no time column',
  'file-left-out': 'a file was left out',
}

/** Turns what was noticed while reading into findings: the notes of each used run, and those of the study. */
export function importNotes({ study }: ReviewInput): Finding[] {
  const ofRuns = study.runs
    .filter((run) => run.use)
    .flatMap((run) => run.importNotes.filter(saidHereOnly).map((note) => finding(note, run.id, `${run.label}: ${titles[note.code]}`)))
  const ofStudy = (study.importNotes ?? []).map((note) =>
    finding(
      note,
      null,
      titles[note.code].replace(/^./, (letter) => letter.toUpperCase()),
    ),
  )
  return [...ofRuns, ...ofStudy]
}

/** A missing time column is spoken of by `time-rebuilt`, or by `run-unusable` where no heating rate is known. */
const saidHereOnly = (note: ImportNote): boolean => note.code !== 'time-missing'

const finding = (note: ImportNote, run: string | null, title: string): Finding => ({
  code: note.code,
  severity: note.severity,
  stage: 'runs',
  title,
  message: note.message,
  run,
  level: null,
  evidence: note.evidence,
  basis: 'Nothing is guessed silently while a file is read',
  sources: [],
})
