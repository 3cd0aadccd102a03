import { createStore } from 'zustand/vanilla'
import type { IntervalKind, MethodId } from '../../shared-kinetics/contract/study-result.ts'

export type Stage = 'runs' | 'activation'
export type Theme = 'system' | 'light' | 'dark'

/** The interval that chart, table, rail and read-out show: the regression's own, or another kind. */
export type ShownKind = 'student-t' | IntervalKind
/** What the left half of the activation stage shows: what Ea is read from at the level, where its uncertainty comes from, or the line through the rate peaks. */
export type Evidence = 'fit' | 'budget' | 'peaks'
/** The table beneath Ea against conversion. */
export type Beneath = 'levels' | 'peaks'
/** The table beneath the line of rate constants: how far each lies from it or, where they were made from holds, how the model follows each hold. */
export type BeneathLine = 'rows' | 'holds'
/** The table beneath the numbers of that line. */
export type BeneathNumbers = 'models' | 'pairs'

/** A row or a prediction of the table of rate constants, by its place in the study. */
export interface RateConstantPlace {
  readonly kind: 'row' | 'prediction'
  readonly index: number
}

export interface TypedPredictions {
  readonly text: string
  readonly temperatures_K: readonly number[]
}

/** What is looked at and how. Never part of the study, never undone. */
export interface ViewState {
  readonly stage: Stage
  /** The conversion looked at; the level nearest to it is the current one, so that it survives a change of levels. */
  readonly conversion: number
  /** The method whose evidence, table and interval are shown; null takes the first of `preferredMethods` that applies. */
  readonly chosenMethod: MethodId | null
  /** Methods drawn beside the chosen one; null takes Friedman where it applies. */
  readonly comparedMethods: readonly MethodId[] | null
  /** Where the chosen method has no interval of this kind, its own stands for it. */
  readonly interval: ShownKind
  readonly evidence: Evidence
  readonly beneath: Beneath
  /** The row picked out among the peak and single-run methods, by its key; null for the first. */
  readonly peakRow: string | null
  /** null takes temperature for constant heating rates and time for everything else. */
  readonly against: 'temperature' | 'time' | null
  /** What the Activation energy stage shows of a study that holds rate constants made from its runs. */
  readonly basis: 'runs' | 'rate-constants'
  readonly rateConstant: RateConstantPlace
  /** Temperatures as somebody typed them, whatever their units, and what they were read as; they stand in the field while the study asks for just these. */
  readonly typedPredictions: TypedPredictions | null
  readonly beneathLine: BeneathLine
  readonly beneathNumbers: BeneathNumbers
  /** The run that a finding or a row points at. */
  readonly pointedRun: string | null
  readonly theme: Theme
}

const initialViewState: ViewState = {
  stage: 'runs',
  conversion: 0.5,
  chosenMethod: null,
  comparedMethods: null,
  interval: 'student-t',
  evidence: 'fit',
  beneath: 'levels',
  peakRow: null,
  against: null,
  basis: 'runs',
  rateConstant: { kind: 'row', index: 0 },
  typedPredictions: null,
  beneathLine: 'rows',
  beneathNumbers: 'models',
  pointedRun: null,
  theme: 'system',
}

export const createViewStore = () => createStore<ViewState>(() => initialViewState)
export type ViewStore = ReturnType<typeof createViewStore>

const preferredMethods: readonly MethodId[] = ['starink', 'vyazovkin', 'kas', 'isothermal-integral', 'friedman', 'ofw']

/** The chosen method among those that gave a profile; null where none did. */
export function chosenAmong(available: readonly MethodId[], wanted: MethodId | null): MethodId | null {
  if (wanted !== null && available.includes(wanted)) return wanted
  return preferredMethods.find((method) => available.includes(method)) ?? available[0] ?? null
}

/** The methods drawn beside the chosen one, in the order in which methods are listed. */
export function comparedAmong(
  available: readonly MethodId[],
  wanted: readonly MethodId[] | null,
  chosen: MethodId | null,
): readonly MethodId[] {
  return available.filter((method) => method !== chosen && (wanted ?? [chosen === 'friedman' ? 'starink' : 'friedman']).includes(method))
}
