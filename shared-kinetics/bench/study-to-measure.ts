import type { MethodId } from '../isoconversional/result.ts'
import type { RunInfo } from '../series/run.ts'
import type { StudyInput } from '../tasks/study-input.ts'
import type { UncertaintySettings } from '../uncertainty/measured-sources.ts'
import type { RunRead } from './phases.ts'

/** The part of a study that results and their uncertainty depend on. */
export interface StudyToMeasure extends StudyInput {
  readonly runs: readonly RunInfo[]
  readonly uncertainty: UncertaintySettings
}

/**
 * The runs as a study with evenly spaced levels and 2,000 draws.
 *
 * @param methods - null: all that apply
 */
export function studyToMeasure(runs: readonly RunRead[], levels: number, methods: readonly MethodId[] | null): StudyToMeasure {
  return {
    runs: runs.map(({ info }) => info),
    settings: {
      signal: null,
      levels: Array.from({ length: levels }, (_, i) => (i + 1) / (levels + 1)),
      methods,
      window: null,
      baseline: 'area-proportional',
      meanRange: [0.1, 0.9],
    },
    importNotes: [],
    uncertainty: { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0.02, draws: 2000, seed: 1 },
  }
}
