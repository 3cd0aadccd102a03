import { drawShare, intervalsOfDraws } from './draw-uncertainty.ts'
import { estimateUncertainty } from './estimate-uncertainty.ts'
import { evaluateRateConstants } from './evaluate-rate-constants.ts'
import { evaluateStudy } from './evaluate-study.ts'
import { rateConstantsOfHolds } from '../rate-constants/rate-constants-of-holds.ts'

/** Everything in shared-kinetics that is worth a worker, by the name it is asked for. */
export const taskMap = {
  'evaluate-study': evaluateStudy,
  'evaluate-rate-constants': evaluateRateConstants,
  'rate-constants-of-holds': rateConstantsOfHolds,
  'estimate-uncertainty': estimateUncertainty,
  'draw-energies': drawShare,
  'intervals-of-draws': intervalsOfDraws,
} as const
