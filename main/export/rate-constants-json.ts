import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { RateConstantsResult } from '../../shared-kinetics/tasks/rate-constants-result.ts'
import { caution } from './caution.ts'

/** What an export of rate constants is made from. */
export interface RateConstantsSource {
  readonly document: StudyDocument
  readonly result: RateConstantsResult
  readonly program: { readonly name: 'rampfold'; readonly version: string }
}

/**
 * The text of `rate-constants.json`, format `rampfold.rate-constants/1`: full precision, null for a number that is not to be had. `lnA` and `A` are in the
 * unit of k, `rateUnit` (empty where nobody stated it). Scripts rely on its fields: some may be added, none changed.
 */
export function rateConstantsJson({ document, result, program }: RateConstantsSource): string {
  const content = {
    format: 'rampfold.rate-constants/1',
    program: { name: program.name, version: program.version },
    caution,
    study: document.name,
    source: result.source,
    runs: runsBehind(document, result).map(({ label, file }) => ({ label, file: file.name, sha256: file.sha256 })),
    rateUnit: result.rateUnit,
    rows: result.rows,
    span: result.span,
    line: result.line,
    weightedLine: result.weightedLine,
    eyring: result.eyring,
    betweenTemperatures: result.betweenTemperatures,
    factorsPer10K: result.factorsPer10K,
    predictions: result.predictions,
    curvature: result.curvature,
    holdFits: result.holdFits,
    modelFollowsHolds: result.modelFollowsHolds,
    findings: result.findings.map(({ code, severity, title, message, evidence, basis, sources }) => ({
      code,
      severity,
      title,
      message,
      evidence,
      basis,
      sources,
    })),
  }
  return `${JSON.stringify(content, nullForMissing, 1)}\n`
}

/** The runs that a table was made from; none where it was typed, pasted or read. */
export const runsBehind = (document: StudyDocument, { source }: RateConstantsResult): StudyDocument['runs'] =>
  source.kind === 'isothermal-runs' ? document.runs.filter((run) => run.use) : []

/** JSON has no NaN; what is not to be had is null. */
const nullForMissing = (_key: string, value: unknown): unknown => (typeof value === 'number' && !Number.isFinite(value) ? null : value)
