import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import type { ImportDecision, ImportNote, NominalHeatingRate, RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import { type AssembledRun, assembleRun, rowsNote } from './assemble-run.ts'
import type { Dialect } from './decide-dialect.ts'
import { type Division, divideIntoRuns, type RunOfColumns } from './divide-into-runs.ts'
import type { Layout } from './find-layout.ts'
import { heatingRateOfName } from './heating-rate-text.ts'
import type { ImportContext } from './import-context.ts'
import { quoted, type Refuse } from './import-refusal.ts'
import { exothermicIn, type Preamble, parsePreamble } from './parse-preamble.ts'
import { type PlannedColumn, planColumns, words } from './plan-columns.ts'
import { type RawTable, readColumns } from './read-columns.ts'
import type { TextLines } from './text-lines.ts'

/** Everything known about a file once its layout is. */
export interface FileInHand {
  readonly file: RunInfo['file']
  readonly baseName: string
  readonly lines: TextLines
  readonly dialect: Dialect
  readonly layout: Layout
  readonly decisions: readonly ImportDecision[]
  readonly options: ImportOptions
  readonly context: ImportContext
  readonly refuse: Refuse
}

/** From layout to runs: quantities and units, numbers, division into runs, what the preamble says. */
export function readRuns(inHand: FileInHand): readonly { readonly info: Omit<RunInfo, 'columnsKey'>; readonly columns: RunColumns }[] {
  const { file, baseName, lines, dialect, layout, options, context, refuse } = inHand
  const plan = planColumns(layout, dialect.numericColumns.length, options, refuse)
  const table = readColumns(lines, layout, dialect, plan, context, refuse)
  const headingLine = (layout.headingLine ?? layout.unitLine ?? layout.firstData) + 1
  const division = divideIntoRuns(plan, table, layout.titles, headingLine, refuse)
  const preamble = parsePreamble(lines, layout, dialect)
  const alone = division.runs.length === 1
  const exothermic = options.exothermic ?? preamble.exothermic ?? exothermicIn(layout.headings)
  const fileNotes = notesOfFile(plan, table, layout, division)
  return division.runs.map((run, i) => {
    const nominalHeatingRate = nominal(run, alone ? preamble : null, alone ? baseName : null)
    const massStated = alone ? preamble.initialMass_kg : null
    const assembled = assembleRun(
      run,
      table,
      { nominal_K_per_s: nominalHeatingRate?.heatingRate_K_per_s ?? null, initialMass_kg: massStated },
      refuse,
    )
    const info: Omit<RunInfo, 'columnsKey'> = {
      id: `${file.sha256.slice(0, 16)}-${i + 1}`,
      label: run.part === null ? baseName : `${baseName} · ${run.part}`,
      file,
      rows: assembled.rows,
      hasTime: assembled.columns.time_s !== null,
      signals: assembled.signals,
      nominalHeatingRate,
      initialMass_kg: massStated ?? assembled.firstMass_kg,
      exothermic,
      metadata: preamble.metadata,
      importNotes: [...(i === 0 ? fileNotes : []), ...assembled.notes],
      importDecisions: [...inHand.decisions, ...layoutDecisions(layout), ...columnDecisions(run, assembled)],
      use: true,
      window: null,
    }
    return { info, columns: assembled.columns }
  })
}

function nominal(run: RunOfColumns, preamble: Preamble | null, name: string | null): NominalHeatingRate | null {
  if (run.heatingRate !== null) return { ...run.heatingRate, source: 'heading' }
  const inPreamble = preamble?.heatingRate ?? null
  if (inPreamble !== null) return { ...inPreamble, source: 'preamble' }
  const inName = name === null ? null : heatingRateOfName(name)
  return inName === null ? null : { ...inName, source: 'name' }
}

function notesOfFile(plan: readonly PlannedColumn[], table: RawTable, layout: Layout, division: Division): readonly ImportNote[] {
  const notes: ImportNote[] = []
  if (layout.headingLine === null && layout.unitLine !== null) {
    const read = plan.filter((column) => column.quantity !== null).map((column) => `${column.label} as ${words(column.quantity ?? 'time')}`)
    const message = `No names stand above the columns; their units alone tell what they hold: ${read.join(', ')}.`
    notes.push({ code: 'heading-missing', severity: 'caution', message, evidence: { unitLine: layout.unitLine + 1 } })
  }
  if (layout.trailing.length > 0) notes.push(rowsNote(layout.trailing.map((i) => i + 1)))
  const isEmpty = (column: PlannedColumn): boolean => table.filled[column.index] === 0
  const named = plan.filter((column) => column.heading.text !== '' || !isEmpty(column))
  const empty = named.filter(isEmpty)
  const aside = [
    ...named.filter((column) => column.setAside !== null && !isEmpty(column)).map((column) => ({ column, why: column.setAside ?? '' })),
    ...division.leftOver,
  ]
  const parts = [
    ...aside.map(({ column, why }) => `${quoted(column.label)} (${why})`),
    ...empty.map((column) => `${quoted(column.label)} (empty in every row)`),
  ]
  if (parts.length > 0) {
    const weighty = aside.some(({ column }) => column.weighty)
    const message = `Set aside: ${parts.slice(0, 40).join('; ')}${parts.length > 40 ? '; …' : ''}.`
    const evidence = { columns: aside.length + empty.length, empty: empty.length }
    notes.push({ code: 'columns-set-aside', severity: weighty ? 'caution' : 'note', message: message.slice(0, 4000), evidence })
  }
  return notes
}

const lineOr = (line: number | null): string => (line === null ? 'none' : String(line + 1))

function layoutDecisions(layout: Layout): readonly ImportDecision[] {
  return [
    {
      step: 'heading line',
      value: lineOr(layout.headingLine),
      reason: layout.headingLine === null ? 'no names stand above the numbers' : 'names stand here, above the numbers',
    },
    {
      step: 'unit line',
      value: lineOr(layout.unitLine),
      reason: layout.unitLine === null ? 'no row of units stands above the numbers' : 'every cell is a unit',
    },
    { step: 'first data line', value: String(layout.firstData + 1), reason: 'the first row of numbers' },
  ]
}

function columnDecisions(run: RunOfColumns, assembled: AssembledRun): readonly ImportDecision[] {
  const used = [...(run.time === null ? [] : [run.time]), run.temperature, ...run.signals]
  return used.flatMap((column): ImportDecision[] => {
    const unit = assembled.units.get(column.index)
    if (unit === undefined || column.quantity === null) return []
    const from = column.unit === null ? 'unit told by its values' : `unit written ${quoted(column.unitText)}`
    return [
      {
        step: `column ${column.index + 1}`,
        value: `${words(column.quantity)}, ${unit.word}`,
        reason: `${quoted(column.label)}: ${column.reason}, ${from}`,
      },
    ]
  })
}
