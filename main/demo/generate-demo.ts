import { gasConstant_J_per_mol_K } from '../../shared-kinetics/units/constants.ts'
import { celsiusToKelvin, kelvinToCelsius } from '../../shared-kinetics/units/convert.ts'

/** One invented run: what its file says of it, and how the furnace really went. */
export interface DemoRun {
  readonly fileName: string
  readonly statedHeatingRate_K_per_min: number
  readonly heatingRate_K_per_min: number
  readonly sampleMass_mg: number
  readonly rowInterval_s: number
  readonly seed: number
}

/** One of the steps that lose mass side by side: `share` of the volatile part, A and Ea, and alpha as a function of the integral of k over time. */
export interface DemoStep {
  readonly share: number
  readonly Ea_J_per_mol: number
  readonly lnA_per_s: number
  readonly conversionAt: (integralOfRateConstant: number) => number
}

/** The invented material: its steps, and the part of the mass that stays as residue. */
export interface DemoMaterial {
  readonly steps: readonly DemoStep[]
  readonly residue: number
}

const start_C = 40
const end_C = 470
/** Time constant with which the sample falls in behind the furnace at the start of the ramp. */
const lag_s = 45
const massNoise_mg = 0.001
const temperatureNoise_K = 0.02

/** Temperature of the sample: at rest at first, then rising at the heating rate, `lag_s` behind the furnace. */
export function demoTemperature_K(heatingRate_K_per_s: number, time_s: number): number {
  return celsiusToKelvin(start_C) + heatingRate_K_per_s * (time_s - lag_s * (1 - Math.exp(-time_s / lag_s)))
}

/**
 * The text of one run's export: a preamble, then time (min), temperature (°C) and mass (mg). Each step's alpha follows from the integral of
 * k = A exp(-Ea/RT) over the sample's own T(t), by Simpson's rule within every row interval; the weighing and the temperature reading get normal noise.
 * The same run gives the same bytes everywhere.
 */
export function generateDemoRun(run: DemoRun, material: DemoMaterial): string {
  const normal = normalNoise(run.seed)
  const heatingRate = run.heatingRate_K_per_min / 60
  const rows = Math.floor((end_C - start_C) / heatingRate / run.rowInterval_s) + 1
  const integrals = material.steps.map(() => 0)
  const lines = [
    'Series: demonstration (invented; no real material)',
    'Sample: Additive K-7',
    `Sample mass: ${run.sampleMass_mg.toFixed(3)} mg`,
    `Heating rate: ${run.statedHeatingRate_K_per_min} K/min`,
    'Gas: nitrogen',
    'Gas flow: 50 mL/min',
    'Crucible: open alumina pan',
    'Time (min),Temperature (°C),Mass (mg)',
  ]
  for (let row = 0; row < rows; row += 1) {
    const time_s = row * run.rowInterval_s
    const left = material.steps.reduce((rest, step, i) => rest - step.share * step.conversionAt(integrals[i] ?? 0), 1)
    const mass_mg = run.sampleMass_mg * (material.residue + (1 - material.residue) * left) + massNoise_mg * normal()
    const temperature_C = kelvinToCelsius(demoTemperature_K(heatingRate, time_s)) + temperatureNoise_K * normal()
    lines.push(`${(time_s / 60).toFixed(4)},${temperature_C.toFixed(3)},${mass_mg.toFixed(4)}`)
    for (const [i, step] of material.steps.entries()) {
      integrals[i] =
        (integrals[i] ?? 0) + simpson((t) => rateConstant(step, demoTemperature_K(heatingRate, t)), time_s, time_s + run.rowInterval_s)
    }
  }
  return `${lines.join('\n')}\n`
}

const rateConstant = (step: DemoStep, temperature_K: number): number =>
  Math.exp(step.lnA_per_s - step.Ea_J_per_mol / (gasConstant_J_per_mol_K * temperature_K))

const simpson = (f: (x: number) => number, from: number, to: number): number =>
  ((to - from) / 6) * (f(from) + 4 * f((from + to) / 2) + f(to))

/** Standard normal numbers by the method of Box and Muller (Ann. Math. Stat. 29 (1958) 610) from a seeded generator. */
function normalNoise(seed: number): () => number {
  const uniform = mulberry32(seed)
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform())
}

/** Uniform numbers in [0, 1): the public-domain 32-bit generator "mulberry32" of T. Ettinger. */
function mulberry32(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
}
