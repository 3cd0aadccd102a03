import { generateDemoRun, type DemoMaterial, type DemoRun } from './generate-demo.ts'

/**
 * Invented: a polymer additive that loses mass in nitrogen in two steps side by side, a first-order one and, with a larger Ea, one that goes as a
 * sphere contracts. Ea therefore rises with conversion from the one to the other.
 */
export const demoMaterial: DemoMaterial = {
  residue: 0.24,
  steps: [
    { share: 0.42, Ea_J_per_mol: 120_000, lnA_per_s: 20.4, conversionAt: (integral) => 1 - Math.exp(-integral) },
    { share: 0.58, Ea_J_per_mol: 168_000, lnA_per_s: 27.2, conversionAt: (integral) => 1 - Math.max(0, 1 - integral) ** 3 },
  ],
}

/** Five heating rates; the run that says 10 K/min was heated at 10.4, as a run with a badly set furnace is. */
export const demoRuns: readonly DemoRun[] = [
  {
    fileName: 'Additive K-7, 2 K per min.csv',
    statedHeatingRate_K_per_min: 2,
    heatingRate_K_per_min: 2,
    sampleMass_mg: 8.104,
    rowInterval_s: 10,
    seed: 7001,
  },
  {
    fileName: 'Additive K-7, 4 K per min.csv',
    statedHeatingRate_K_per_min: 4,
    heatingRate_K_per_min: 4,
    sampleMass_mg: 7.962,
    rowInterval_s: 5,
    seed: 7002,
  },
  {
    fileName: 'Additive K-7, 6 K per min.csv',
    statedHeatingRate_K_per_min: 6,
    heatingRate_K_per_min: 6,
    sampleMass_mg: 8.217,
    rowInterval_s: 3.5,
    seed: 7003,
  },
  {
    fileName: 'Additive K-7, 10 K per min.csv',
    statedHeatingRate_K_per_min: 10,
    heatingRate_K_per_min: 10.4,
    sampleMass_mg: 8.051,
    rowInterval_s: 2,
    seed: 7004,
  },
  {
    fileName: 'Additive K-7, 20 K per min.csv',
    statedHeatingRate_K_per_min: 20,
    heatingRate_K_per_min: 20,
    sampleMass_mg: 7.893,
    rowInterval_s: 1,
    seed: 7005,
  },
]

export interface DemoSeries {
  readonly name: string
  readonly files: readonly { readonly fileName: string; readonly bytes: Uint8Array<ArrayBuffer> }[]
}

/** The demo series as files, made anew each time: they read like any other export, through the same importer. */
export function demoSeries(): DemoSeries {
  const encoder = new TextEncoder()
  return {
    name: 'Additive K-7, nitrogen (demo)',
    files: demoRuns.map((run) => ({ fileName: run.fileName, bytes: encoder.encode(generateDemoRun(run, demoMaterial)) })),
  }
}
