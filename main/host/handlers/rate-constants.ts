import type { RateConstantsRead } from '../../../shared-kinetics/contract/host-api.ts'
import { rateConstantTableSchema } from '../../../shared-kinetics/contract/rate-constant-schema.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import type { HoldAtLevels } from '../../../shared-kinetics/rate-constants/rate-constants-of-holds.ts'
import type { RateConstantTable } from '../../../shared-kinetics/rate-constants/rate-constant-table.ts'
import type { StudyResult } from '../../../shared-kinetics/tasks/study-result.ts'
import { refusedFile } from '../../import/import-refusal.ts'
import { RateConstantQuestion } from '../../import/rate-constant-question.ts'
import { readRateConstantFile, readRateConstantText } from '../../import/rate-constant-table.ts'
import { checkRevision } from './check-revision.ts'
import type { HandlerContext, HandlerTable } from './handler-table.ts'

/** Tables of rate constants: read from text or a file, and evaluated. Reading changes nothing. */
export function rateConstantHandlers(
  context: HandlerContext,
): Pick<HandlerTable, 'rate-constants.read-text' | 'rate-constants.read-file' | 'rate-constants.from-holds' | 'rate-constants.evaluate'> {
  const { workspace, pool, uploads } = context
  return {
    'rate-constants.read-text': ({ text, source = 'pasted', options = {} }) =>
      answer(() =>
        readRateConstantText({ text, name: source === 'typed' ? 'The typed table' : 'The pasted table', source, sha256: null }, options),
      ),
    'rate-constants.read-file': ({ uploadId, options = {} }) => {
      const [file] = uploads.take([uploadId])
      if (file === undefined || file.bytes.byteLength !== file.declaredBytes)
        throw new KineticsError('unknown-upload', 'The file has not arrived whole. Add it again.', { uploadId })
      return answer(() => readRateConstantFile(file.fileName, new Uint8Array(file.bytes), options))
    },
    'rate-constants.from-holds': async ({ revision, model, zeroInTime = 'free', range = [0.1, 0.9] }) => {
      checkRevision(workspace, revision)
      const holds = holdsOf(await context.evaluation.of(revision))
      const table = await pool.run('rate-constants-of-holds', { holds, model, options: { zeroInTime, range: [range[0], range[1]] } })
      if (table.rows.length > 0) return { table }
      const why = table.notes[0]?.message ?? 'None of its runs is isothermal.'
      throw new KineticsError('bad-request', `No rate constant can be made from the runs of this study. ${why}`, { runs: holds.length })
    },
    'rate-constants.evaluate': async ({ revision }) => {
      checkRevision(workspace, revision)
      return { revision, result: await pool.run('evaluate-rate-constants', { table: tableOf(workspace.session.document.rateConstants) }) }
    },
  }
}

/** @throws KineticsError `bad-request` for a study that holds no table of rate constants */
export function tableOf(table: RateConstantTable | null): RateConstantTable {
  if (table === null) throw new KineticsError('bad-request', 'This study holds no table of rate constants.')
  return table
}

/** The isothermal runs at the levels of the study, time counted from the start of each hold. */
function holdsOf({ runs, levels }: StudyResult): readonly HoldAtLevels[] {
  return runs.flatMap(({ label, holdTemperature_K, holdStart_s, timeAtLevel_s, conversionBeforeHold }) => {
    if (holdTemperature_K === null) return []
    const start = holdStart_s ?? Number.NaN
    return [
      {
        label,
        temperature_K: holdTemperature_K,
        time_s: timeAtLevel_s.map((time) => (time ?? Number.NaN) - start),
        conversion: levels,
        conversionBeforeHold: conversionBeforeHold ?? Number.NaN,
      },
    ]
  })
}

function answer(read: () => RateConstantTable): RateConstantsRead {
  try {
    const table = read()
    // What the schema of a study does not take could be saved but never opened again.
    if (rateConstantTableSchema.safeParse(table).success) return { kind: 'table', table }
    const reason = 'It holds more text or larger numbers than a study takes.'
    const fileName = table.source.name ?? 'The table'
    return { kind: 'refused', refused: { fileName, line: null, reason, remedy: 'Shorten its labels, and look at its units.' }, ask: null }
  } catch (error) {
    const refused = refusedFile(error)
    if (refused === null) throw error
    return { kind: 'refused', refused, ask: error instanceof RateConstantQuestion ? error.ask : null }
  }
}
