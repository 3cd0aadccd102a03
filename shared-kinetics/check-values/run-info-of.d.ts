import type { RunInfo } from '../series/run.ts'
/** A mass run with nothing special about it; tests say what matters to them in `change`. */
export declare const runInfoOf: (id: string, change?: Partial<RunInfo>) => RunInfo
