import type { MethodId } from '../isoconversional/result.ts'
import type { StudyResult } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import { extentOf, levelText, niceAxis } from './nice-axis.ts'

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
  const marks: Mark[] = []
  if (phi !== undefined && phi.phi.length > 0) {
    marks.push({ kind: 'line', name: 'Φ(Ea)', tone: { kind: 'ink' }, x: phi.Ea_kJ_per_mol, y: phi.phi })
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
  const xAxis = niceAxis(...extentOf(phi?.Ea_kJ_per_mol ?? [], [lower, upper]))
  const yAxis = niceAxis(...extentOf(phi?.phi ?? [], [phi?.phiMinimum ?? null, phi?.phiThreshold ?? null]), 5)
  return {
    id: 'phi',
    title: `Φ(Ea) at α ${level}`,
    description: `${profile?.label ?? methodId}: the function whose minimum is Ea, at conversion ${level}, with the threshold that bounds the 95 % interval.`,
    x: { label: 'Ea', unit: 'kJ/mol', min: xAxis.min, max: xAxis.max, second: null },
    y: { label: 'Φ', unit: '', min: yAxis.min, max: yAxis.max, second: null },
    marks,
  }
}
