import type { SourceKey } from '../sources.ts'

export const severities = ['stop', 'caution', 'note'] as const
export type Severity = (typeof severities)[number]

/** Codes of everything the program can notice in this version. */
export const findingCodes = [
  'too-few-programmes',
  'narrow-heating-rate-spread',
  'heating-rate-differs-from-nominal',
  'heating-rate-not-constant',
  'order-broken',
  'method-does-not-apply',
  'outside-scope-of-standard',
  'signal-chosen',
  'time-rebuilt',
  'temperature-not-measured',
  'window-cuts-reaction',
  'baseline-replaced',
  'gap-in-reaction',
  'sampling-coarse',
  'level-not-reached',
  'energy-varies',
  'integral-lags-differential',
  'interval-wide-because-few-runs',
  'runs-do-not-agree',
  'outlier-run',
  'replicates-disagree',
  'lack-of-fit',
  'unequal-variance',
  'level-without-energy',
  'energy-not-positive',
  'peaks-at-different-conversion',
  'peak-line-curved',
  'single-run-energy-differs',
  'exothermic-direction-unknown',
  'run-unusable',
  'rows-set-aside',
  'columns-set-aside',
  'several-columns-of-one-quantity',
  'unit-from-values',
  'heading-missing',
  'time-missing',
  'file-left-out',
  'few-temperatures',
  'prediction-extrapolated',
  'lines-not-straight',
  'energy-implausible',
  'rate-unit-missing',
  'heading-read-as',
  'uncertainty-read-as',
  'model-assumed',
  'model-fits-badly',
  'other-models-fit-better',
] as const
export type FindingCode = (typeof findingCodes)[number]

/** Something the program noticed: a code, a severity, the number that shows it, and the rule with its source. */
export interface Finding {
  readonly code: FindingCode
  readonly severity: Severity
  /** Stage of the sheet it speaks of. */
  readonly stage: 'runs' | 'activation'
  /** Short heading, e.g. `Ea varies by 36 % of its mean`. */
  readonly title: string
  /** What was seen, what it means, what to do. */
  readonly message: string
  /** Id of the run meant, or null. */
  readonly run: string | null
  /** Level meant, or null. */
  readonly level: number | null
  readonly evidence: Readonly<Record<string, string | number | null>>
  /** The rule, and where it is published; `common practice` where it has no source. */
  readonly basis: string
  readonly sources: readonly SourceKey[]
}
