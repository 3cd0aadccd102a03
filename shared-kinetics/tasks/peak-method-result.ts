import type { BorchardtDanielsEstimate } from '../peak-methods/borchardt-daniels.ts'
import type { PeakEstimate } from '../peak-methods/peak-line.ts'
import type { PeakMethodInfo } from '../peak-methods/peak-method-info.ts'
import { sources } from '../sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { maybe, maybes } from './maybe.ts'
import type { PeakMethodNumber, PeakMethodNumberKey, PeakMethodResult } from './study-result.ts'

export type RunName = { readonly runId: string; readonly label: string }

/** What stands beside the numbers of a result. */
export interface Beside {
  readonly numbers?: readonly PeakMethodNumber[]
  readonly remarks?: readonly string[]
}

export function peakMethodNumber(
  key: PeakMethodNumberKey,
  label: string,
  value: number,
  unit: PeakMethodNumber['unit'],
  standardError = Number.NaN,
): PeakMethodNumber {
  return { key, label, value: maybe(value), standardError: maybe(standardError), unit }
}

/** A method that does not apply: no number, and the reason as a sentence. */
export function withoutResult(info: PeakMethodInfo, reason: string, run: RunName | null = null): PeakMethodResult {
  return {
    ...named(info, run),
    applies: false,
    reason: sentence(reason),
    Ea_kJ_per_mol: null,
    standardError_kJ_per_mol: null,
    lower95_kJ_per_mol: null,
    upper95_kJ_per_mol: null,
    dof: 0,
    lnA_per_s: null,
    lnAStandardError: null,
    covarianceEaLnA_kJ_per_mol: null,
    covarianceWithOrder: null,
    r2: null,
    numbers: [],
    remarks: [],
    line: null,
  }
}

/** The result of a method that compares the peaks of all runs. */
export function peakResult(info: PeakMethodInfo, estimate: PeakEstimate, { numbers = [], remarks = [] }: Beside): PeakMethodResult {
  const { line } = estimate
  return {
    ...named(info, null),
    ...applied,
    ...energies(estimate),
    dof: estimate.dof,
    lnA_per_s: maybe(estimate.lnA),
    lnAStandardError: maybe(estimate.lnAStandardError),
    covarianceEaLnA_kJ_per_mol: maybe(joulesToKilojoules(estimate.covarianceEaLnA)),
    covarianceWithOrder: null,
    r2: maybe(estimate.r2),
    numbers,
    remarks,
    line: {
      ordinate: info.ordinate ?? '',
      x_per_K: maybes(line.x_per_K),
      y: maybes(line.y),
      slope_K: maybe(line.slope_K),
      intercept: maybe(line.intercept),
    },
  }
}

/** The result of a single-run method on one run. */
export function singleRunResult(
  info: PeakMethodInfo,
  run: RunName,
  estimate: BorchardtDanielsEstimate,
  { numbers = [], remarks = [] }: Beside,
): PeakMethodResult {
  return {
    ...named(info, run),
    ...applied,
    ...energies(estimate),
    dof: estimate.dof,
    lnA_per_s: maybe(estimate.lnZ),
    lnAStandardError: maybe(estimate.lnZStandardError),
    covarianceEaLnA_kJ_per_mol: maybe(joulesToKilojoules(estimate.covarianceEaLnZ)),
    covarianceWithOrder: { Ea_kJ_per_mol: maybe(joulesToKilojoules(estimate.covarianceEaOrder)), lnA: maybe(estimate.covarianceLnZOrder) },
    r2: maybe(estimate.r2),
    numbers,
    remarks,
    line: null,
  }
}

const applied = { applies: true, reason: null } as const

const named = (
  info: PeakMethodInfo,
  run: RunName | null,
): Pick<PeakMethodResult, 'method' | 'label' | 'sources' | 'runId' | 'runLabel'> => ({
  method: info.id,
  label: info.label,
  sources: info.sources.map((key) => sources[key]),
  runId: run?.runId ?? null,
  runLabel: run?.label ?? null,
})

const energies = ({
  Ea,
  standardError,
  lower95,
  upper95,
}: Pick<PeakEstimate, 'Ea' | 'standardError' | 'lower95' | 'upper95'>): Pick<
  PeakMethodResult,
  'Ea_kJ_per_mol' | 'standardError_kJ_per_mol' | 'lower95_kJ_per_mol' | 'upper95_kJ_per_mol'
> => ({
  Ea_kJ_per_mol: maybe(joulesToKilojoules(Ea)),
  standardError_kJ_per_mol: maybe(joulesToKilojoules(standardError)),
  lower95_kJ_per_mol: maybe(joulesToKilojoules(lower95)),
  upper95_kJ_per_mol: maybe(joulesToKilojoules(upper95)),
})

const sentence = (reason: string): string => `${reason.charAt(0).toUpperCase()}${reason.slice(1)}.`
