import type { MethodId } from '../isoconversional/result.ts'
import type { PhiResult, StudyResult } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import { extentOf, levelText, niceAxis } from './nice-axis.ts'

/** The curve is drawn up to so many times the height of the threshold above the minimum: far from it Phi grows exponentially, and would press the threshold to the floor. */
const heights = 7
/** With fewer points left than these there would be no curve: the interval of nearly error-free runs is narrower than its steps. */
const fewestPoints = 9

/**
 * Phi(Ea) of a minimising method at one level: the curve, its minimum, the threshold, and the interval that the threshold cuts out of it.
 * Without a minimum (a status other than `ok`) the curve stands alone.
 */
export function phiFigure(result: StudyResult, methodId: MethodId, levelIndex: number): Figure {
  const profile = result.profiles.find((one) => one.method === methodId && one.evidence === 'minimum')
  const phi = profile?.phi[levelIndex]
  const at = (values: readonly (number | null)[] | undefined): number | null => values?.[levelIndex] ?? null
  const [Ea, lower, upper] = [at(profile?.Ea_kJ_per_mol), at(profile?.lower95_kJ_per_mol), at(profile?.upper95_kJ_per_mol)]
  const level = levelText(result.levels[levelIndex] ?? Number.NaN)
  const curve = phi === undefined ? { x: [], y: [] } : curveInView(phi)
  const marks: Mark[] = []
  if (phi !== undefined && phi.phi.length > 0) {
    marks.push({ kind: 'line', name: 'Φ(Ea)', tone: { kind: 'ink' }, ...curve })
    if (phi.phiThreshold !== null) {
      marks.push({ kind: 'rule', name: 'Threshold', tone: { kind: 'faint' }, along: 'x', at: phi.phiThreshold, dash: 'dashed' })
    }
    for (const [name, end] of [
      ['Lower end, 95 %', lower],
      ['Upper end, 95 %', upper],
    ] as const) {
      if (end !== null) marks.push({ kind: 'rule', name, tone: { kind: 'accent' }, along: 'y', at: end, dash: 'dotted' })
    }
    if (Ea !== null && phi.phiMinimum !== null) {
      marks.push({ kind: 'points', name: 'Minimum', tone: { kind: 'accent' }, x: [Ea], y: [phi.phiMinimum], joined: false })
    }
  }
  const xAxis = niceAxis(...extentOf(curve.x, [lower, upper]))
  const yAxis = niceAxis(...extentOf(curve.y, [phi?.phiMinimum ?? null, phi?.phiThreshold ?? null]), 5)
  return {
    id: 'phi',
    title: `Φ(Ea) at α ${level}`,
    description: `${profile?.label ?? methodId}: the function whose minimum is Ea, at conversion ${level}, with the threshold that bounds the 95 % interval.`,
    x: { label: 'Ea', unit: 'kJ/mol', min: xAxis.min, max: xAxis.max, second: null },
    y: { label: 'Φ', unit: '', min: yAxis.min, max: yAxis.max, second: null },
    marks,
  }
}

/** The points of the curve that lie low enough for the threshold to be seen; all of them where there is none. */
function curveInView({ Ea_kJ_per_mol: Ea, phi, phiMinimum, phiThreshold }: PhiResult): {
  readonly x: readonly number[]
  readonly y: readonly number[]
} {
  const top = phiMinimum === null || phiThreshold === null ? Number.POSITIVE_INFINITY : phiMinimum + heights * (phiThreshold - phiMinimum)
  const low = phi.flatMap((value, i) => (value <= top ? [i] : []))
  const seen = low.length < fewestPoints ? Array.from(phi.keys()) : low
  return { x: seen.map((i) => Ea[i] ?? Number.NaN), y: seen.map((i) => phi[i] ?? Number.NaN) }
}
