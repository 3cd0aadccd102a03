import type {
  CombinedMean,
  IntervalResult,
  IntervalStatus,
  LevelStatus,
  Maybe,
  MethodId,
  ProfileResult,
  StudyResult,
  UncertaintyProfile,
} from '../../../shared-kinetics/contract/study-result.ts'
import type { DrawnInterval } from '../../../shared-kinetics/figure/activation-figure.ts'
import { intervalStatusWords, studentStatus } from '../../../shared-kinetics/figure/interval-status.ts'
import { tooFewForInterval } from '../../../shared-kinetics/figure/intervals-not-given.ts'
import type { Uncertain } from '../../state/study-state.ts'
import type { ShownKind } from '../../state/view-store.ts'

/** One interval of a method as chart, table, rail and read-out show it: arrays as long as the levels. */
export interface ShownInterval {
  readonly kind: ShownKind
  /** Whole name, as it stands before "95 %, pointwise". */
  readonly label: string
  readonly approximate: boolean
  /** How it was made. */
  readonly note: string
  readonly sources: readonly string[]
  readonly lower95_kJ_per_mol: readonly Maybe[]
  readonly upper95_kJ_per_mol: readonly Maybe[]
  /** Why a level has no ends, or only one, and where the lower one means nothing. */
  readonly status: readonly IntervalStatus[]
}

/** A kind of interval as it is offered. */
export interface IntervalOffer {
  readonly kind: ShownKind
  /** Why the method has none of this kind; null where it has one, or may have one once it is worked out. */
  readonly reason: string | null
}

export const intervalKinds: readonly ShownKind[] = [
  'student-t',
  'vyazovkin-wight-f',
  'jackknife',
  'bootstrap',
  'measured-sources',
  'combined',
]

/** Short names, for buttons and the rail. */
export const shortKinds: Readonly<Record<ShownKind, string>> = {
  'student-t': 'Student-t',
  'vyazovkin-wight-f': 'F-type',
  jackknife: 'jackknife',
  bootstrap: 'bootstrap',
  'measured-sources': 'measured sources',
  combined: 'combined',
}

/** Kinds that come with an evaluation; the others take longer, and are asked for apart. */
export const isOfEvaluation = (kind: ShownKind): boolean => kind === 'student-t' || kind === 'vyazovkin-wight-f'

/**
 * What resampling and measured sources say of a method, where it is about these very Ea: after a change that leaves Ea alone (a name, a stated uncertainty) what was
 * worked out before stays in sight until the new is there.
 */
export function uncertaintyOf(uncertain: Uncertain | null, profile: ProfileResult): UncertaintyProfile | null {
  const about = uncertain?.about.result.profiles.find((one) => one.method === profile.method)
  if (uncertain === null || about === undefined) return null
  const same =
    about === profile ||
    (about.Ea_kJ_per_mol.length === profile.Ea_kJ_per_mol.length && about.Ea_kJ_per_mol.every((Ea, i) => Ea === profile.Ea_kJ_per_mol[i]))
  return same ? (uncertain.result.profiles.find((one) => one.method === profile.method) ?? null) : null
}

/**
 * The interval of one kind by a method; null where there is none, or none yet.
 *
 * @param apart - what takes longer than an evaluation, where it is at hand
 */
export function intervalOfKind(profile: ProfileResult, apart: UncertaintyProfile | null, kind: ShownKind): ShownInterval | null {
  if (kind === 'student-t') return hasInterval(profile) ? studentT(profile) : null
  const found = resultOfKind(profile, apart, kind)
  return found === undefined || !hasInterval(found) ? null : { ...found, kind }
}

const resultOfKind = (profile: ProfileResult, apart: UncertaintyProfile | null, kind: ShownKind): IntervalResult | undefined =>
  [...profile.otherIntervals, ...(apart?.intervals ?? [])].find((one) => one.kind === kind)

/** The kind that is shown: the wanted one, or the method's own where it can have none of the wanted kind. */
export function kindShown(wanted: ShownKind, offers: readonly IntervalOffer[]): ShownKind {
  return offers.some((offer) => offer.kind === wanted && offer.reason === null) ? wanted : 'student-t'
}

/** Every kind, with the reason why the method has none of it. */
export function intervalOffers(
  profile: ProfileResult,
  apart: UncertaintyProfile | null,
  programmes: readonly number[],
): readonly IntervalOffer[] {
  return intervalKinds.map((kind) => {
    const isHad = intervalOfKind(profile, apart, kind) !== null
    const isToCome = apart === null && !isOfEvaluation(kind)
    const reason = isHad ? null : (tooFewForInterval(kind, programmes) ?? (isToCome ? null : noneOfKind(kind, profile, apart)))
    return { kind, reason }
  })
}

function noneOfKind(kind: ShownKind, profile: ProfileResult, apart: UncertaintyProfile | null): string {
  if (kind === 'vyazovkin-wight-f' && profile.evidence === 'line') return 'belongs to methods that minimise Φ: Vyazovkin, incremental'
  if (profile.status.every((status: LevelStatus) => status !== 'ok')) return 'no level has an Ea'
  const words = (resultOfKind(profile, apart, kind)?.status ?? []).flatMap((status) => intervalStatusWords[status] ?? [])
  return words.length === 0 ? 'not to be had for these runs' : [...new Set(words)].join('; ')
}

function hasInterval({
  lower95_kJ_per_mol: lower,
  upper95_kJ_per_mol: upper,
}: Pick<IntervalResult, 'lower95_kJ_per_mol' | 'upper95_kJ_per_mol'>): boolean {
  return lower.some((end) => end !== null) || upper.some((end) => end !== null)
}

const studentT = (profile: ProfileResult): ShownInterval => ({
  kind: 'student-t',
  label: 'Student-t of the regression',
  approximate: false,
  note: `Standard error of Ea from the scatter of the runs, times Student's t with n − 2 degrees of freedom (${profile.interval.dof} here).`,
  sources: [],
  lower95_kJ_per_mol: profile.lower95_kJ_per_mol,
  upper95_kJ_per_mol: profile.upper95_kJ_per_mol,
  status: studentStatus(profile),
})

/** What is to be said of an interval at a level: why an end is not there, or means nothing; null where there is nothing to say. */
export function intervalWordsAt(interval: ShownInterval | null, levelIndex: number): string | null {
  const status = interval?.status[levelIndex]
  return status === undefined ? null : intervalStatusWords[status]
}

/** The interval as figures draw it. */
export const drawnInterval = (interval: ShownInterval | null): DrawnInterval | null =>
  interval === null ? null : { name: shortKinds[interval.kind], ...interval }

/** `95 %, pointwise, approximate`: what holds of an interval besides its kind. */
export const intervalQualities = ({ approximate }: ShownInterval): string => `95 %, pointwise${approximate ? ', approximate' : ''}`

export interface ShownOfMethod {
  readonly profile: ProfileResult
  readonly apart: UncertaintyProfile | null
  readonly offers: readonly IntervalOffer[]
  /** The kind that is chosen. */
  readonly kind: ShownKind
  /** Of the chosen kind or, until that is worked out, Student's t: its own `kind` says which. */
  readonly interval: ShownInterval | null
  /** The mean with what moves all runs alike, where it is at hand and of the range that is asked for. */
  readonly mean: CombinedMean | null
}

/** Everything the sheet shows of a method's intervals; null where it gave no profile. */
export function shownOf(
  { profiles, runs }: Pick<StudyResult, 'profiles' | 'runs'>,
  method: MethodId | null,
  uncertain: Uncertain | null,
  wanted: ShownKind,
): ShownOfMethod | null {
  const profile = profiles.find((one) => one.method === method)
  if (profile === undefined) return null
  const apart = uncertaintyOf(uncertain, profile)
  const programmes = runs.map((run) => run.programmeGroup)
  const offers = intervalOffers(profile, apart, programmes)
  const kind = kindShown(wanted, offers)
  const about = uncertain?.about.result.profiles.find((one) => one.method === method)?.mean
  const isOfRange = about?.from === profile.mean.from && about.to === profile.mean.to
  const mean = isOfRange ? (apart?.mean ?? null) : null
  const interval = intervalOfKind(profile, apart, kind) ?? intervalOfKind(profile, apart, 'student-t')
  return { profile, apart, offers, kind, interval, mean }
}

/** The interval of every method, of the kind that is wanted or, where it has none of it, its own. */
export const intervalsOf =
  (result: StudyResult, uncertain: Uncertain | null, wanted: ShownKind) =>
  ({ method }: ProfileResult): ShownInterval | null =>
    shownOf(result, method, uncertain, wanted)?.interval ?? null
