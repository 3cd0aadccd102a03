import type { MethodId } from '../isoconversional/result.ts'
import type { Maybe, PhiResult, StudyResult } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import type { DrawnInterval } from './activation-figure.ts'
import { extentOf, levelText, niceAxis } from './nice-axis.ts'

/** The curve is drawn up to so many times the height of the threshold above the minimum: far from it Phi grows exponentially, and would press the threshold to the floor. */
const heights = 7
/** With fewer points left than these there would be no curve: the interval of nearly error-free runs is narrower than its steps. */
const fewestPoints = 9

/**
 * Phi(Ea) of a minimising method at one level: the curve, its minimum, the threshold, and the interval that the threshold cuts out of it.
 * Without a minimum (a status other than `ok`) the curve stands alone.
 *
 * @param drawn - another interval whose ends are drawn instead: the threshold, which belongs to Student's t, is then left out; null for no interval
 */
export function phiFigure(result: StudyResult, methodId: MethodId, levelIndex: number, drawn?: DrawnInterval | null): Figure {
  const profile = result.profiles.find((one) => one.method === methodId && one.evidence === 'minimum')
  const phi = profile?.phi[levelIndex]
  const at = (values: readonly (number | null)[] | undefined): number | null => values?.[levelIndex] ?? null
  const ends = drawn === undefined ? profile : drawn
  const [Ea, lower, upper] = [at(profile?.Ea_kJ_per_mol), at(ends?.lower95_kJ_per_mol), at(ends?.upper95_kJ_per_mol)]
  const threshold = drawn === undefined ? (phi?.phiThreshold ?? null) : null
  const kind = drawn === undefined || drawn === null ? '' : ` (${drawn.name})`
  const level = levelText(result.levels[levelIndex] ?? Number.NaN)
  const curve = phi === undefined ? { x: [], y: [] } : curveInView(phi, lower, upper)
  const marks: Mark[] = []
  if (phi !== undefined && phi.phi.length > 0) {
    marks.push({ kind: 'line', name: 'Φ(Ea)', tone: { kind: 'ink' }, ...curve })
    if (threshold !== null) {
      marks.push({ kind: 'rule', name: 'Threshold', tone: { kind: 'faint' }, along: 'x', at: threshold, dash: 'dashed' })
    }
    for (const [name, end] of [
      [`Lower end, 95 %${kind}`, lower],
      [`Upper end, 95 %${kind}`, upper],
    ] as const) {
      if (end !== null) marks.push({ kind: 'rule', name, tone: { kind: 'accent' }, along: 'y', at: end, dash: 'dotted' })
    }
    if (Ea !== null && phi.phiMinimum !== null) {
      marks.push({ kind: 'points', name: 'Minimum', tone: { kind: 'accent' }, x: [Ea], y: [phi.phiMinimum], joined: false })
    }
  }
  const xAxis = niceAxis(...extentOf(curve.x, [lower, upper]))
  const yAxis = niceAxis(...extentOf(curve.y, [phi?.phiMinimum ?? null, threshold]), 5)
  return {
    id: 'phi',
    title: `Φ(Ea) at α ${level}`,
    description: `${profile?.label ?? methodId}: the function whose minimum is Ea, at conversion ${level}, with ${drawn === undefined ? 'the threshold that bounds the 95 % interval' : `the ends of the 95 % interval${kind}`}.`,
    x: { label: 'Ea', unit: 'kJ/mol', min: xAxis.min, max: xAxis.max, second: null },
    y: { label: 'Φ', unit: '', min: yAxis.min, max: yAxis.max, second: null },
    marks,
  }
}

/** The points of the curve that lie low enough for the threshold to be seen, or within the interval that is drawn; all of them where there is no threshold. */
function curveInView(
  { Ea_kJ_per_mol: Ea, phi, phiMinimum, phiThreshold }: PhiResult,
  lower: Maybe,
  upper: Maybe,
): { readonly x: readonly number[]; readonly y: readonly number[] } {
  const top = phiMinimum === null || phiThreshold === null ? Number.POSITIVE_INFINITY : phiMinimum + heights * (phiThreshold - phiMinimum)
  const isWithin = (value = Number.NaN): boolean => lower !== null && upper !== null && value >= lower && value <= upper
  const low = phi.flatMap((value, i) => (value <= top || isWithin(Ea[i]) ? [i] : []))
  const seen = low.length < fewestPoints ? Array.from(phi.keys()) : low
  return { x: seen.map((i) => Ea[i] ?? Number.NaN), y: seen.map((i) => phi[i] ?? Number.NaN) }
}
