import { describe, expect, it } from 'vitest'
import { defaultSettings } from '../../shared-kinetics/contract/study-document.ts'
import type { RunColumns, RunInfo } from '../../shared-kinetics/series/run.ts'
import { evaluateStudy } from '../../shared-kinetics/tasks/evaluate-study.ts'
import { readExport } from '../import/read-export.ts'
import { demoMaterial, demoRuns, demoSeries } from './demo-series.ts'
import { demoTemperature_K, generateDemoRun } from './generate-demo.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const gasConstant = 8.31446261815324

/** Where a run without noise reaches a level, by marching both steps with the classical Runge–Kutta rule: another way than the generator's. */
function exactLevels(heatingRate_K_per_min: number, levels: readonly number[]): { T: number; rate: number }[] {
  const beta = heatingRate_K_per_min / 60
  const models = [(a: number) => 1 - a, (a: number) => 3 * Math.max(0, 1 - a) ** (2 / 3)]
  const rateOf = (i: number, a: number, t: number): number => {
    const step = demoMaterial.steps[i]
    if (step === undefined) throw new Error('the demo material has two steps')
    return Math.exp(step.lnA_per_s - step.Ea_J_per_mol / (gasConstant * demoTemperature_K(beta, t))) * (models[i]?.(a) ?? Number.NaN)
  }
  const shares = demoMaterial.steps.map((step) => step.share)
  const total = (parts: readonly number[]): number => parts.reduce((sum, part, i) => sum + part * (shares[i] ?? 0), 0)
  const h = 0.02 / beta
  let a = [0, 0]
  let before = { t: 0, alpha: 0 }
  const found: { T: number; rate: number }[] = []
  for (let t = 0; found.length < levels.length; ) {
    a = a.map((x, i) => {
      const k1 = rateOf(i, x, t)
      const k2 = rateOf(i, x + (h / 2) * k1, t + h / 2)
      const k3 = rateOf(i, x + (h / 2) * k2, t + h / 2)
      const k4 = rateOf(i, x + h * k3, t + h)
      return Math.min(1, x + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4))
    })
    t += h
    const alpha = total(a)
    for (let level = levels[found.length]; level !== undefined && alpha >= level; level = levels[found.length]) {
      const at = before.t + (h * (level - before.alpha)) / (alpha - before.alpha)
      found.push({ T: demoTemperature_K(beta, at), rate: total(a.map((x, i) => rateOf(i, x, t))) })
    }
    before = { t, alpha }
  }
  return found
}

function slope(x: readonly number[], y: readonly number[]): number {
  const [mx, my] = [x.reduce((s, v) => s + v, 0) / x.length, y.reduce((s, v) => s + v, 0) / y.length]
  return x.reduce((s, v, i) => s + (v - mx) * ((y[i] ?? 0) - my), 0) / x.reduce((s, v) => s + (v - mx) ** 2, 0)
}

const read = demoSeries().files.map((file) => readExport(file.fileName, file.bytes, {}, context).runs)
const infos: readonly RunInfo[] = read.flat().map((run) => run.info)
const columns: ReadonlyMap<string, RunColumns> = new Map(read.flat().map((run) => [run.info.columnsKey, run.columns]))
const levels = [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9]

const texts = (): string[] => demoSeries().files.map((file) => new TextDecoder().decode(file.bytes))

describe('the demo series', () => {
  it('gives the same bytes every time, and other noise for another seed', () => {
    const first = texts()
    expect(texts()).toEqual(first)
    const [run] = demoRuns
    if (run === undefined) throw new Error('the demo series has runs')
    expect(first[0]).toBe(generateDemoRun(run, demoMaterial))
    expect(generateDemoRun({ ...run, seed: run.seed + 1 }, demoMaterial)).not.toBe(generateDemoRun(run, demoMaterial))
  })

  it('weighs to about 1 µg: the noise of the flat part before the reaction', () => {
    for (const run of read.flat()) {
      const mass_mg = Array.from(run.columns.signals[0]?.slice(0, 200) ?? [], (mass) => mass * 1e6)
      const mean = mass_mg.reduce((sum, mass) => sum + mass, 0) / mass_mg.length
      const spread = Math.sqrt(mass_mg.reduce((sum, mass) => sum + (mass - mean) ** 2, 0) / (mass_mg.length - 1))
      expect(spread).toBeGreaterThan(0.0008)
      expect(spread).toBeLessThan(0.0012)
    }
  })

  it('reads like any export: one run a file, its sample mass and stated heating rate from the preamble', () => {
    expect(read.map((runs) => runs.length)).toEqual([1, 1, 1, 1, 1])
    for (const [i, info] of infos.entries()) {
      expect((info.initialMass_kg ?? 0) * 1e6).toBeCloseTo(demoRuns[i]?.sampleMass_mg ?? Number.NaN, 6)
      expect((info.nominalHeatingRate?.heatingRate_K_per_s ?? 0) * 60).toBeCloseTo([2, 4, 6, 10, 20][i] ?? Number.NaN, 9)
    }
  })

  describe('evaluated', () => {
    const result = evaluateStudy({ runs: infos, settings: { ...defaultSettings, levels } }, columns, context, new Map())
    const exact = demoRuns.map((run) => exactLevels(run.heatingRate_K_per_min, levels))
    const profile = (method: string) => result.profiles.find((one) => one.method === method)

    it('shows that the run that says 10 K/min was heated at 10.4', () => {
      for (const [i, rate] of [2, 4, 6, 10.4, 20].entries()) expect(result.runs[i]?.heatingRate_K_per_min).toBeCloseTo(rate, 1)
      const found = result.findings.filter((finding) => finding.code === 'heating-rate-differs-from-nominal')
      expect(found.map((finding) => finding.run)).toEqual([infos[3]?.id])
    })

    it('gives back the true Friedman profile within the noise', () => {
      const truth = levels.map(
        (_, l) =>
          (-slope(
            exact.map((run) => 1 / (run[l]?.T ?? 0)),
            exact.map((run) => Math.log(run[l]?.rate ?? 0)),
          ) *
            gasConstant) /
          1000,
      )
      for (const [l, Ea] of truth.entries())
        expect(Math.abs((profile('friedman')?.Ea_kJ_per_mol[l] ?? Number.NaN) - Ea)).toBeLessThan(0.02 * Ea)
      expect(truth[0]).toBeLessThan(130)
      expect(Math.abs((truth.at(-1) ?? 0) - 168)).toBeLessThan(2)
    })

    it('gives back the true profile of an integral method within the noise', () => {
      const truth = levels.map((_, l) => {
        const T = exact.map((run) => run[l]?.T ?? 0)
        return (
          (-slope(
            T.map((t) => 1 / t),
            T.map((t, i) => Math.log((demoRuns[i]?.heatingRate_K_per_min ?? 0) / t ** 2)),
          ) *
            gasConstant) /
          1000
        )
      })
      for (const [l, Ea] of truth.entries()) expect(Math.abs((profile('kas')?.Ea_kJ_per_mol[l] ?? Number.NaN) - Ea)).toBeLessThan(0.01 * Ea)
    })
  })
})
