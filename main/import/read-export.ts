import { createHash } from 'node:crypto'
import { basename, extname } from 'node:path'
import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
import type { ImportOptions } from '../../shared-kinetics/contract/import-options.ts'
import type { ImportDecision, RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import { columnsKey } from './columns-key.ts'
import { type Dialect, decideDialect } from './decide-dialect.ts'
import { decodeText } from './decode-text.ts'
import { findLayout } from './find-layout.ts'
import type { ImportContext } from './import-context.ts'
import { ImportRefusal, type Refuse } from './import-refusal.ts'
import { readRuns } from './read-runs.ts'
import { refuseBinary } from './refuse-binary.ts'
import { textLines } from './text-lines.ts'

export { ImportRefusal, refusedFile } from './import-refusal.ts'

/** The runs of one export, in the order in which they stand in it. */
export interface ImportedFile {
  readonly runs: readonly { readonly info: RunInfo; readonly columns: RunColumns }[]
}

/**
 * Reads an export of delimited text: bytes, encoding, text, delimiter and decimal sign, layout, columns with quantity and unit, runs.
 * Whatever the options leave open is decided from the file, and each decision stands in `info.importDecisions` with its reason.
 *
 * @param fileName - for labels, messages and a heating rate in the name; a path before it is left out
 * @param bytes - the whole file
 * @returns at least one run; columns in SI on shared memory, time null where the file has none
 * @throws ImportRefusal (`not-readable`) with line, reason and remedy where the file cannot be understood; Cancelled
 */
export function readExport(fileName: string, bytes: Uint8Array, options: ImportOptions, context: ImportContext): ImportedFile {
  const name = basename(fileName.replaceAll('\\', '/'))
  const refuse: Refuse = (line, reason, remedy) => new ImportRefusal(name, line, reason, remedy)
  refuseBinary(bytes, refuse)
  if (bytes.byteLength > largestUploadBytes) {
    throw refuse(null, `The file is larger than ${largestUploadBytes / 2 ** 20} MiB.`, 'Export it with a coarser time step.')
  }
  const file = { name, sha256: createHash('sha256').update(bytes).digest('hex'), byteLength: bytes.byteLength }
  const { text, decision: encoding } = decodeText(bytes, options.encoding, refuse)
  context.checkCancelled()
  const lines = textLines(text, context, refuse)
  const dialects = decideDialect(lines, options, context, refuse)

  const read = (dialect: Dialect): ImportedFile => {
    const layout = findLayout(lines, dialect, options, refuse)
    const decisions: readonly ImportDecision[] = [
      encoding,
      { step: 'delimiter', value: dialect.delimiter, reason: dialect.delimiterReason },
      { step: 'decimal sign', value: dialect.decimal, reason: dialect.decimalReason },
    ]
    const runs = readRuns({ file, baseName: basename(name, extname(name)), lines, dialect, layout, decisions, options, context, refuse })
    return { runs: runs.map(({ info, columns }) => ({ info: { ...info, columnsKey: columnsKey(columns) }, columns })) }
  }
  const [first, second] = dialects
  if (first === undefined) throw refuse(null, 'No table of numbers was found.', 'Export the run again.')
  return second === undefined ? read(first) : readTheOnlyPossible([first, second], read, refuse)
}

/** Both decimal signs make every cell a number (`1,234`): the reading stands that gives possible runs, if only one does. */
function readTheOnlyPossible(
  dialects: readonly [Dialect, Dialect],
  read: (dialect: Dialect) => ImportedFile,
  refuse: Refuse,
): ImportedFile {
  const outcomes = dialects.map((dialect) => {
    try {
      return read(dialect)
    } catch (error) {
      if (error instanceof ImportRefusal) return error
      throw error
    }
  })
  const possible = outcomes.filter((outcome): outcome is ImportedFile => !(outcome instanceof ImportRefusal))
  const [only] = possible
  if (only !== undefined && possible.length === 1) return only
  const failure = outcomes.find((outcome) => outcome instanceof ImportRefusal)
  if (failure !== undefined) throw failure
  throw refuse(
    null,
    'Its numbers can be read in two ways: the sign in “1,234” may be a decimal sign or divide thousands, and nothing in the file tells which.',
    'State the “decimal sign”, point or comma (on the command line: --decimal-sign).',
  )
}
