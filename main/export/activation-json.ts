import type { StudyDocument } from '../../shared-kinetics/contract/study-document.ts'
import type { Finding } from '../../shared-kinetics/review/finding.ts'
import type { Window } from '../../shared-kinetics/series/run.ts'
import type {
  ProfileResult,
  RunResult,
  StudyResult,
  UncertaintyProfile,
  UncertaintyResult,
} from '../../shared-kinetics/tasks/study-result.ts'
import { meanCaution } from '../../shared-kinetics/figure/mean-not-alone.ts'
import { intervalsNotGiven } from '../../shared-kinetics/figure/intervals-not-given.ts'
import { studentStatus } from '../../shared-kinetics/figure/interval-status.ts'
import { assumedShareLines } from './budget-lines.ts'
import { caution } from './caution.ts'
import { preExponentialOf } from './pre-exponential.ts'

/** What an export is made from: the study, what followed from it, and the program that worked it out. */
export interface ExportSource {
  readonly document: StudyDocument
  readonly result: StudyResult
  /** Intervals by resampling and from measured sources, where they were asked for. */
  readonly uncertainty?: UncertaintyResult
  readonly program: { readonly name: 'rampfold'; readonly version: string }
}

/**
 * The text of `activation.json`, format `rampfold.activation/1`: full precision, null for a number that is not to be had.
 * Scripts rely on its fields: some may be added, none changed.
 */
export function activationJson({ document, result, program, uncertainty }: ExportSource): string {
  const labelOf = new Map(document.runs.map((run) => [run.id, run.label]))
  const content = {
    format: 'rampfold.activation/1',
    program: { name: program.name, version: program.version },
    caution,
    study: document.name,
    settings: document.settings,
    signal: result.signal,
    runs: result.runs.map(runFields),
    levels: result.levels,
    profiles: result.profiles.map((profile) => profileFields(profile, result, uncertaintyOf(profile, uncertainty))),
    uncertainty: uncertainty === undefined ? null : { seed: uncertainty.seed, draws: uncertainty.draws },
    intervalsNotGiven: uncertainty === undefined ? [] : intervalsNotGiven(result.runs.map((run) => run.programmeGroup)),
    kissinger: result.kissinger,
    peakMethods: result.peakMethods,
    findings: result.findings.map((finding) => findingFields(finding, labelOf)),
  }
  // JSON has no NaN: what is not to be had becomes null by itself.
  return `${JSON.stringify(content, null, 1)}\n`
}

function runFields(run: RunResult): Record<string, unknown> {
  return {
    id: run.runId,
    file: run.fileName,
    column: run.column,
    sha256: run.sha256,
    label: run.label,
    signal: run.signal,
    programme: run.programme,
    nominalHeatingRate_K_per_min: run.nominalHeatingRate_K_per_min,
    heatingRate_K_per_min: run.heatingRate_K_per_min,
    heatingRateStandardError_K_per_min: run.heatingRateStandardError_K_per_min,
    heatingRateSource: run.heatingRateSource,
    holdTemperature_K: run.holdTemperature_K,
    holdStart_s: run.holdStart_s,
    conversionBeforeHold: run.conversionBeforeHold,
    rows: run.rows,
    initialMass_mg: run.initialMass_kg === null ? null : run.initialMass_kg * 1e6,
    window: windowFields(run.window),
    peak_K: run.peak_K,
    enthalpy_J_per_g: run.enthalpy_J_per_g,
    enthalpyMagnitude_J_per_g: run.enthalpyMagnitude_J_per_g,
    temperatureAtLevel_K: run.temperatureAtLevel_K,
    timeAtLevel_s: run.timeAtLevel_s,
  }
}

/** Both kinds of window have the same fields, so that a reader need not ask which it is. */
function windowFields(window: Window): Record<string, number | null> {
  return window.kind === 'temperature'
    ? { start_K: window.start_K, end_K: window.end_K, start_s: null, end_s: null }
    : { start_K: null, end_K: null, start_s: window.start_s, end_s: window.end_s }
}

/** What was worked out apart from the evaluation for a method. */
export const uncertaintyOf = (profile: ProfileResult, uncertainty: UncertaintyResult | undefined): UncertaintyProfile | undefined =>
  uncertainty?.profiles.find(({ method }) => method === profile.method)

function profileFields(profile: ProfileResult, result: StudyResult, apart: UncertaintyProfile | undefined): Record<string, unknown> {
  return {
    method: profile.method,
    label: profile.label,
    sources: profile.sources,
    interval: profile.interval,
    Ea_kJ_per_mol: profile.Ea_kJ_per_mol,
    standardError_kJ_per_mol: profile.standardError_kJ_per_mol,
    lower95_kJ_per_mol: profile.lower95_kJ_per_mol,
    upper95_kJ_per_mol: profile.upper95_kJ_per_mol,
    intervalStatus: studentStatus(profile),
    lnAf_per_s: profile.lnAf_per_s,
    lnAfStandardError: profile.lnAfStandardError,
    covarianceEaLnAf_kJ_per_mol: profile.covarianceEaLnAf_kJ_per_mol,
    lnA_per_s: profile.lnA_per_s,
    preExponential: preExponentialOf(profile, result),
    systematicError_percent: profile.systematicError_percent,
    r2: profile.r2,
    status: profile.status,
    mean: profile.mean,
    meanCombined: apart?.mean ?? null,
    meanCaution: meanCaution(result.findings),
    otherIntervals: [...profile.otherIntervals, ...(apart?.intervals ?? [])],
    budget: apart?.budget ?? [],
    budgetRemarks: apart === undefined ? [] : assumedShareLines(profile, apart, result.levels),
    lackOfFit: profile.lackOfFit,
  }
}

function findingFields(finding: Finding, labelOf: ReadonlyMap<string, string>): Record<string, unknown> {
  return {
    code: finding.code,
    severity: finding.severity,
    run: finding.run === null ? null : (labelOf.get(finding.run) ?? finding.run),
    runId: finding.run,
    level: finding.level,
    title: finding.title,
    message: finding.message,
    evidence: finding.evidence,
    basis: finding.basis,
    sources: finding.sources,
  }
}
