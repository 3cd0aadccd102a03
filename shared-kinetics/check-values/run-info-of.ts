import type { RunInfo } from '../series/run.ts'

/** A mass run with nothing special about it; tests say what matters to them in `change`. */
export const runInfoOf = (id: string, change: Partial<RunInfo> = {}): RunInfo => ({
  id,
  label: `Run ${id}`,
  file: { name: `${id}.csv`, sha256: '0'.repeat(64), byteLength: 1 },
  columnsKey: '1'.repeat(64),
  rows: 1000,
  hasTime: true,
  signals: [{ quantity: 'mass', unit: 'kg', label: 'Mass (mg)', fileUnit: 'mg' }],
  nominalHeatingRate: null,
  initialMass_kg: null,
  exothermic: null,
  metadata: [],
  importNotes: [],
  importDecisions: [],
  use: true,
  window: null,
  ...change,
})
