import { evaluateStudy } from './evaluate-study.ts'

/** Everything in shared-kinetics that is worth a worker, by the name it is asked for. */
export const taskMap = { 'evaluate-study': evaluateStudy } as const
