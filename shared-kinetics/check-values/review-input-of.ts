import type { ReviewedRun, ReviewInput } from '../review/review-input.ts'
import type { RunInfo } from '../series/run.ts'
import type { AnalysisSettings } from '../tasks/study-input.ts'
import type { Maybe, ProfileResult, RunResult, StudyResult } from '../tasks/study-result.ts'
import { runInfoOf } from './run-info-of.ts'

/** Three levels: enough for every rule. */
export const levels = [0.1, 0.5, 0.9]

export interface RunToReview {
  readonly info?: Partial<RunInfo>
  readonly result?: Partial<RunResult>
  readonly heatingRateSpread?: number
  readonly steadiness?: ReviewedRun['steadiness']
  readonly rateAtEnds?: ReviewedRun['rateAtEnds']
  readonly baselineKind?: ReviewedRun['baselineKind']
  readonly sampling?: Partial<ReviewedRun['sampling']>
  readonly timeNoiseAtLevel_s?: readonly number[]
}

/** A run at a constant heating rate with nothing to remark on. */
export function reviewedRun(id: string, rate_K_per_min: number, group: number, change: RunToReview = {}): ReviewedRun {
  const info = runInfoOf(id, {
    nominalHeatingRate: { heatingRate_K_per_s: rate_K_per_min / 60, source: 'name', text: `${rate_K_per_min}K` },
    ...change.info,
  })
  const temperature = levels.map((level) => 600 + 20 * level + 10 * Math.log(rate_K_per_min))
  const result: RunResult = {
    runId: id,
    label: info.label,
    fileName: info.file.name,
    column: 'Mass (mg)',
    sha256: info.file.sha256,
    signal: 'mass',
    signalUnit: 'kg',
    programme: 'constant-heating-rate',
    programmeGroup: group,
    nominalHeatingRate_K_per_min: rate_K_per_min,
    heatingRate_K_per_min: rate_K_per_min,
    heatingRateStandardError_K_per_min: 0.001,
    heatingRateSource: 'measured',
    holdTemperature_K: null,
    holdStart_s: null,
    conversionBeforeHold: null,
    rows: 1000,
    initialMass_kg: null,
    window: { kind: 'temperature', start_K: 400, end_K: 900 },
    peak_K: 620,
    enthalpy_J_per_g: null,
    enthalpyMagnitude_J_per_g: null,
    temperatureAtLevel_K: temperature,
    timeAtLevel_s: levels.map((level) => 1000 * level),
    reactionRateAtLevel_per_s: levels.map(() => 0.001),
    signalAtLevel: levels.map(() => 1e-6),
    curve: {
      time_s: new Float64Array(0),
      temperature_K: new Float64Array(0),
      signal: new Float64Array(0),
      conversion: new Float64Array(0),
      reactionRate_per_s: new Float64Array(0),
      baseline: new Float64Array(0),
    },
    ...change.result,
  }
  const sampling = { rowsInReaction: 300, gaps: [], withoutNumber: 0, sameTime: 0, behind: 0, behindInReaction: 0, ...change.sampling }
  return {
    info,
    result,
    heatingRateSpread: change.heatingRateSpread ?? 0.01,
    steadiness: change.steadiness ?? { deviation_K: 0.3, lastDigit_K: Number.NaN },
    rateAtEnds: change.rateAtEnds ?? { start: 0, end: 0 },
    baselineKind: change.baselineKind ?? null,
    sampling,
    timeNoiseAtLevel_s: change.timeNoiseAtLevel_s ?? levels.map(() => 0),
  }
}

/** A profile with the given Ea in kJ/mol and half intervals, over the range 0.1 to 0.9. */
export function profileOf(method: ProfileResult['method'], Ea: readonly Maybe[], halfInterval = 5, dof = 3): ProfileResult {
  const numbers = Ea.filter((value) => value !== null)
  const none = Ea.map(() => null)
  return {
    method,
    label: method,
    sources: [],
    evidence: 'line',
    interval: { kind: 'student-t', level: 0.95, dof, pointwise: true },
    Ea_kJ_per_mol: Ea,
    standardError_kJ_per_mol: Ea.map((value) => (value === null ? null : 1)),
    lower95_kJ_per_mol: Ea.map((value) => (value === null ? null : value - halfInterval)),
    upper95_kJ_per_mol: Ea.map((value) => (value === null ? null : value + halfInterval)),
    lnAf_per_s: none,
    lnAfStandardError: none,
    covarianceEaLnAf_kJ_per_mol: none,
    lnA_per_s: none,
    otherIntervals: [],
    systematicError_percent: Ea.map((value) => (value === null ? null : 0)),
    lackOfFit: null,
    r2: none,
    status: Ea.map((value) => (value === null ? 'level-not-reached' : 'ok')),
    lines: [],
    phi: [],
    mean: {
      from: 0.1,
      to: 0.9,
      Ea_kJ_per_mol: numbers.reduce((sum, value) => sum + value, 0) / numbers.length,
      spread_kJ_per_mol: Math.max(...numbers) - Math.min(...numbers),
      standardError_kJ_per_mol: null,
      lower95_kJ_per_mol: null,
      upper95_kJ_per_mol: null,
      levelsUsed: numbers.length,
      levelsInRange: Ea.length,
      firstLevel: 0.1,
      lastLevel: 0.9,
      note: 'From the scatter of the runs alone.',
    },
  }
}

/** Everything a rule may look at: by default four runs at 2, 5, 10 and 20 K/min with nothing to remark on. */
export function reviewInput(
  change: {
    readonly runs?: readonly ReviewedRun[]
    readonly settings?: Partial<AnalysisSettings>
    readonly result?: Partial<StudyResult>
    readonly unusable?: ReviewInput['unusable']
    readonly leftOut?: ReviewInput['leftOut']
    readonly importNotes?: RunInfo['importNotes']
  } = {},
): ReviewInput {
  const runs = change.runs ?? [2, 5, 10, 20].map((rate, i) => reviewedRun(String(i), rate, i))
  const unusable = change.unusable ?? []
  return {
    study: {
      runs: [...runs.map((run) => run.info), ...unusable.map((run) => run.info)],
      settings: {
        signal: null,
        levels,
        methods: null,
        window: null,
        baseline: 'area-proportional',
        meanRange: [0.1, 0.9],
        ...change.settings,
      },
      importNotes: change.importNotes ?? [],
    },
    result: {
      levels,
      signal: 'mass',
      signalsToChooseFrom: ['mass'],
      runs: runs.map((run) => run.result),
      profiles: [profileOf('friedman', [100, 100, 100]), profileOf('vyazovkin', [100, 100, 100])],
      kissinger: null,
      peakMethods: [],
      ...change.result,
    },
    runs,
    unusable,
    leftOut: change.leftOut ?? [],
  }
}
