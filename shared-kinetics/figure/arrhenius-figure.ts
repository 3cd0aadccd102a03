import type { RateConstantsResult } from '../tasks/rate-constants-result.ts'
import type { Maybe } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import { extentOf, niceAxis } from './nice-axis.ts'
import { inverseTemperatureAxis } from './straight-lines-figure.ts'

/**
 * ln k against 1000/T with temperature, in the table's unit, along the opposite edge: the points, their line, its 95 % band and that of a new measurement, and the predictions asked for
 * with the band of a new measurement as bars. Rows not used are faint.
 */
export function arrheniusFigure(result: RateConstantsResult): Figure {
  const { band, rows, predictions } = result
  const x = band.temperature_K.map(thousandOver)
  const marks: Mark[] = []
  if (band.lnLineLower95.some((end) => end !== null)) {
    const [newLower, newUpper] = [numbers(band.lnNewLower95), numbers(band.lnNewUpper95)]
    const [lower, upper] = [numbers(band.lnLineLower95), numbers(band.lnLineUpper95)]
    marks.push({
      kind: 'band',
      name: '95 % band, new measurement',
      tone: { kind: 'method', index: 1 },
      x,
      lower: newLower,
      upper: newUpper,
    })
    marks.push({ kind: 'band', name: '95 % band, line', tone: { kind: 'method', index: 0 }, x, lower, upper })
  }
  if (x.length > 0) marks.push({ kind: 'line', name: 'Arrhenius line', tone: { kind: 'ink' }, x, y: numbers(band.lnK) })
  const [used, leftOut] = [rows.filter((row) => row.use), rows.filter((row) => !row.use)]
  for (const [name, tone, some] of [
    ['Not used', { kind: 'faint' }, leftOut],
    ['Rate constants', { kind: 'ink' }, used],
  ] as const) {
    if (some.length === 0) continue
    const [at, y] = [some.map((row) => thousandOver(row.temperature_K)), some.map((row) => row.lnK)]
    marks.push({ kind: 'points', name, tone, x: at, y, joined: false, ...barsOf(some) })
  }
  const predicted = predictions.filter((row) => row.rateConstant !== null)
  if (predicted.length > 0) {
    marks.push({
      kind: 'points',
      name: 'Predicted',
      tone: { kind: 'accent' },
      x: predicted.map((row) => thousandOver(row.temperature_K)),
      y: predicted.map((row) => ln(row.rateConstant)),
      joined: false,
      lower: predicted.map((row) => ln(row.newLower95)),
      upper: predicted.map((row) => ln(row.newUpper95)),
    })
  }
  const yAxis = niceAxis(...extentOf(...marks.map(ordinates)), 5)
  const allX = [...x, ...rows.map((row) => thousandOver(row.temperature_K)), ...predicted.map((row) => thousandOver(row.temperature_K))]
  return {
    id: 'arrhenius',
    title: 'Arrhenius line',
    description: describe(result),
    x: inverseTemperatureAxis(allX, result.temperatureUnitShown),
    y: {
      label: 'ln k',
      unit: result.rateUnit === '' ? 'unit of k not stated' : `k in ${result.rateUnit}`,
      min: yAxis.min,
      max: yAxis.max,
      second: null,
    },
    marks,
  }
}

/** One row picked out, on the axes of `arrheniusFigure`: the row that a table beside the figure points at. */
export function arrheniusAtRow(result: RateConstantsResult, rowIndex: number): Mark[] {
  const row = result.rows[rowIndex]
  if (row === undefined) return []
  const x = [thousandOver(row.temperature_K)]
  return [{ kind: 'points', name: row.label ?? `Row ${rowIndex + 1}`, tone: { kind: 'accent' }, x, y: [row.lnK], joined: false }]
}

const thousandOver = (temperature_K: number): number => 1000 / temperature_K
const ln = (value: Maybe): number => (value === null ? Number.NaN : Math.log(value))
const numbers = (values: readonly Maybe[]): Float64Array => Float64Array.from(values, (value) => value ?? Number.NaN)

/** One standard uncertainty to either side, where all have one. */
function barsOf(rows: RateConstantsResult['rows']): { lower: number[]; upper: number[] } | Record<string, never> {
  if (rows.some((row) => row.standardUncertainty === null)) return {}
  const relative = (row: (typeof rows)[number]): number => (row.standardUncertainty ?? Number.NaN) / row.rateConstant
  return { lower: rows.map((row) => row.lnK - relative(row)), upper: rows.map((row) => row.lnK + relative(row)) }
}

function ordinates(mark: Mark): number[] {
  if (mark.kind === 'rule') return []
  if (mark.kind === 'band') return [...Array.from(mark.lower), ...Array.from(mark.upper)]
  const bars = mark.kind === 'points' ? [...Array.from(mark.lower ?? []), ...Array.from(mark.upper ?? [])] : []
  return [...Array.from(mark.y), ...bars]
}

function describe({ line, rows, span }: RateConstantsResult): string {
  const points = `ln k against 1000/T, ${line.points} of ${rows.length} rate constants`
  if (line.Ea_kJ_per_mol === null || span === null) return `${points}; no line can be drawn through them.`
  const [low, high] = [line.lower95_kJ_per_mol, line.upper95_kJ_per_mol]
  const interval = low === null || high === null ? 'no interval' : `95 % interval ${low.toFixed(1)} to ${high.toFixed(1)}`
  return `${points}, ${span.coldest_K.toFixed(1)} to ${span.hottest_K.toFixed(1)} K, and their line: Ea ${line.Ea_kJ_per_mol.toFixed(1)} kJ/mol, ${interval}.`
}
