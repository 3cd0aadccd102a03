import { estimateUncertainty } from '../tasks/estimate-uncertainty.ts'
import type { DrawOrder } from '../tasks/draw-uncertainty.ts'
import type { RunRead } from './phases.ts'

const levels = Array.from({ length: 99 }, (_, i) => (i + 1) / 100)
const context = { checkCancelled: (): void => undefined, progress: (): void => undefined }

/** What draws of measured sources are made from for the nonlinear method at 99 levels. */
export function drawOrder(runs: readonly RunRead[]): DrawOrder {
  const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
  const settings = {
    signal: null,
    levels,
    methods: ['vyazovkin' as const],
    window: null,
    baseline: 'area-proportional',
    meanRange: [0.1, 0.9],
  } as const
  const uncertainty = { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0.02, draws: 2000, seed: 1 }
  return estimateUncertainty({ runs: runs.map(({ info }) => info), settings }, columns, uncertainty, context).order
}
