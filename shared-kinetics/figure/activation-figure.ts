import type { MethodId } from '../isoconversional/result.ts'
import type { Maybe, ProfileResult, StudyResult } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import { extentOf, levelText, niceAxis } from './nice-axis.ts'

/** The interval of the chosen method that is drawn, as long as the levels. */
export interface DrawnInterval {
  /** Its kind, e.g. `Student-t`. */
  readonly name: string
  readonly lower95_kJ_per_mol: readonly Maybe[]
  readonly upper95_kJ_per_mol: readonly Maybe[]
}

/**
 * Ea against conversion: the chosen method first, with the band of its interval, the other methods of `methodIds` behind it by line style and
 * marker, with theirs where it is given. A level without a number breaks the line. Methods that gave no profile are passed over.
 *
 * @param drawn - the interval of the chosen method; its regression's own where left out, none where null
 * @param besideOf - the interval of another method; none where left out
 */
export function activationFigure(
  result: StudyResult,
  methodIds: readonly MethodId[],
  chosen: MethodId,
  drawn?: DrawnInterval | null,
  besideOf: (profile: ProfileResult) => DrawnInterval | null = () => null,
): Figure {
  const profiles = profilesInOrder(result, methodIds, chosen)
  const [first] = profiles
  const intervals = profiles.map((profile, index) => (index === 0 ? drawnOf(profile, drawn) : besideOf(profile)))
  const marks: Mark[] = []
  // The chosen method's band is drawn over the others'.
  for (const [index, profile] of [...profiles.entries()].toReversed()) {
    const interval = intervals[index] ?? null
    if (interval === null || interval.lower95_kJ_per_mol.every((end) => end === null)) continue
    const [lower, upper] = [numbers(interval.lower95_kJ_per_mol), numbers(interval.upper95_kJ_per_mol)]
    const name = `95 % interval (${interval.name}), ${profile.label}`
    marks.push({ kind: 'band', name, tone: { kind: 'method', index }, x: result.levels, lower, upper })
  }
  for (const [index, profile] of profiles.entries()) {
    const y = numbers(profile.Ea_kJ_per_mol)
    marks.push({ kind: 'points', name: profile.label, tone: { kind: 'method', index }, x: result.levels, y, joined: true })
  }
  const fences = outerFences(profiles)
  const { min, max } = energyAxis(profiles, intervals, fences)
  const note = beyondText(result, first, min, max)
  return {
    id: 'activation-energy',
    title: 'Activation energy against conversion',
    description: describe(result, profiles),
    x: { label: 'Conversion α', unit: '', min: 0, max: 1, second: null },
    y: { label: 'Ea', unit: 'kJ/mol', min, max, second: null },
    marks,
    ...(note === null ? {} : { note }),
  }
}

/** The current level: a rule at its conversion, and the chosen method's point there with its interval. */
export function activationAtLevel(
  result: StudyResult,
  methodIds: readonly MethodId[],
  chosen: MethodId,
  levelIndex: number,
  drawn?: DrawnInterval | null,
): Mark[] {
  const level = result.levels[levelIndex]
  if (level === undefined) return []
  const marks: Mark[] = [{ kind: 'rule', name: 'Level', tone: { kind: 'ink' }, along: 'y', at: level, dash: 'dotted' }]
  const [first] = profilesInOrder(result, methodIds, chosen)
  const Ea = first?.Ea_kJ_per_mol[levelIndex] ?? null
  if (first === undefined || Ea === null) return marks
  const shown = drawnOf(first, drawn)
  const [lower, upper] = [shown?.lower95_kJ_per_mol[levelIndex] ?? null, shown?.upper95_kJ_per_mol[levelIndex] ?? null]
  const interval = lower === null || upper === null ? {} : { lower: [lower], upper: [upper] }
  marks.push({ kind: 'points', name: first.label, tone: { kind: 'accent' }, x: [level], y: [Ea], joined: false, ...interval })
  return marks
}

/** The regression's own interval, unless another or none is to be drawn. */
function drawnOf(profile: ProfileResult | undefined, drawn: DrawnInterval | null | undefined): DrawnInterval | null {
  if (drawn !== undefined || profile === undefined) return drawn ?? null
  return { name: 'Student-t', lower95_kJ_per_mol: profile.lower95_kJ_per_mol, upper95_kJ_per_mol: profile.upper95_kJ_per_mol }
}

function profilesInOrder(result: StudyResult, methodIds: readonly MethodId[], chosen: MethodId): readonly ProfileResult[] {
  const wanted = [chosen, ...methodIds.filter((id) => id !== chosen)]
  return wanted.map((id) => result.profiles.find((profile) => profile.method === id)).filter((profile) => profile !== undefined)
}

/**
 * Where values count as far out: three times the distance of the quartiles beyond them (J. W. Tukey, Exploratory Data Analysis, 1977, "outer fences"; from
 * memory). A tenth of the median stands in for a smaller distance, so that a constant Ea does not push out its own ends.
 */
function outerFences(profiles: readonly ProfileResult[]): readonly [number, number] {
  const values = profiles
    .flatMap((profile) => profile.Ea_kJ_per_mol)
    .filter((value) => value !== null)
    .toSorted((a, b) => a - b)
  const quantile = (share: number): number => values[Math.round(share * (values.length - 1))] ?? Number.NaN
  const reach = 3 * Math.max(quantile(0.75) - quantile(0.25), 0.1 * Math.abs(quantile(0.5)))
  return [quantile(0.25) - reach, quantile(0.75) + reach]
}

/** Every Ea that is not far out is on the axis; its interval that is drawn too, unless it is so wide that the curve in it could no longer be read. */
function energyAxis(
  profiles: readonly ProfileResult[],
  intervals: readonly (DrawnInterval | null)[],
  [below, above]: readonly [number, number],
): { readonly min: number; readonly max: number } {
  const isNear = (Ea: Maybe | undefined): boolean => Ea !== null && Ea !== undefined && Ea >= below && Ea <= above
  const [low, high] = extentOf(profiles.flatMap((profile) => profile.Ea_kJ_per_mol.filter(isNear)))
  const near = (ends: 'lower95_kJ_per_mol' | 'upper95_kJ_per_mol'): readonly Maybe[] =>
    profiles.flatMap(({ Ea_kJ_per_mol: Ea }, at) => (intervals[at]?.[ends] ?? []).filter((_, i) => isNear(Ea[i])))
  const [lower, upper] = extentOf(near('lower95_kJ_per_mol'), near('upper95_kJ_per_mol'))
  const room = Math.max(high - low, 0.15 * Math.abs(high))
  return niceAxis(
    Number.isFinite(lower) ? Math.max(Math.min(low, lower), low - room) : low,
    Number.isFinite(upper) ? Math.min(Math.max(high, upper), high + room) : high,
  )
}

function beyondText(result: StudyResult, profile: ProfileResult | undefined, min: number, max: number): string | null {
  const beyond = result.levels.flatMap((level, i) => {
    const Ea = profile?.Ea_kJ_per_mol[i] ?? null
    return Ea === null || (Ea >= min && Ea <= max) ? [] : [`α ${levelText(level)} (${Ea.toFixed(0)})`]
  })
  return beyond.length === 0 ? null : `Beyond the axis: ${beyond.join(', ')}.`
}

function describe(result: StudyResult, profiles: readonly ProfileResult[]): string {
  const [first] = profiles
  if (first === undefined) return 'No method gave an activation energy for these runs.'
  const [low, high] = extentOf(first.Ea_kJ_per_mol)
  const others = profiles.slice(1).map((profile) => profile.label)
  const range = Number.isFinite(low) ? `from ${low.toFixed(1)} to ${high.toFixed(1)} kJ/mol` : 'without a number at any level'
  const beside = others.length === 0 ? '' : ` Beside it: ${others.join(', ')}.`
  return `${first.label}: Ea ${range} over ${result.levels.length} levels of conversion, with its pointwise 95 % interval where there is one.${beside}`
}

const numbers = (values: readonly Maybe[]): Float64Array => Float64Array.from(values, (value) => value ?? Number.NaN)
