import { describe, expect, it } from 'vitest'
import { firstOrder, ramp, reducedTime, temperatureOf } from '../../shared-kinetics/check-values/simulated-run.ts'
import { defaultSettings, emptyStudy } from '../../shared-kinetics/contract/study-document.ts'
import { evaluateStudy } from '../../shared-kinetics/tasks/evaluate-study.ts'
import { readExport } from '../import/read-export.ts'
import { exportResults } from './export-results.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const written: Readonly<Record<string, (kelvin: number) => number>> = {
  K: (kelvin) => kelvin,
  '°C': (kelvin) => kelvin - 273.15,
  // 0 °C is 32 °F, 100 °C is 212 °F: by the definition of the degree Fahrenheit.
  '°F': (kelvin) => (kelvin - 273.15) * 1.8 + 32,
}

/** A first-order series of four heating rates as files in one unit of temperature; the run at 10 K/min lacks rows while it reacts, that at 20 K/min runs 25 K too cold. */
function exported(unit: string): { readonly notes: string; readonly csv: string; readonly messages: readonly string[] } {
  const runs = [2, 5, 10, 20].flatMap((rate) => {
    const programme = ramp(400, rate, 760)
    const time = Float64Array.from({ length: 1200 }, (_, i) => (i * 360 * 60) / rate / 1199)
    const theta = reducedTime(step, programme, time)
    const rows = Array.from(time, (t, i) => {
      const T = temperatureOf(programme, t) + 0.3 * Math.sin(i / 7) - (rate === 20 ? 25 : 0)
      return {
        T,
        line: `${(t / 60).toFixed(6)},${(written[unit] ?? Number)(T).toFixed(9)},${(8 - 4 * firstOrder(theta[i] ?? 0)).toFixed(6)}`,
      }
    })
    const lines = rows.filter(({ T }) => !(rate === 10 && T > 545 && T < 560)).map(({ line }) => line)
    const text = `Time (min),Temperature (${unit}),Mass (mg)\n${lines.join('\n')}\n`
    return readExport(`run ${rate} K per min.csv`, new TextEncoder().encode(text), {}, context).runs
  })
  const study = { ...emptyStudy('study'), runs: runs.map(({ info }) => info), settings: { ...defaultSettings, levels: [0.2, 0.5, 0.8] } }
  const result = evaluateStudy(study, new Map(runs.map(({ info, columns }) => [info.columnsKey, columns])), context)
  const source = { document: study, result, program: { name: 'rampfold' as const, version: '0' } }
  const [csv, notes] = exportResults(source, 'csv').map(({ bytes }) => new TextDecoder().decode(bytes))
  return {
    csv: csv ?? '',
    // The files themselves differ, and with them their hashes.
    notes: (notes ?? '').replaceAll(/SHA-256 [0-9a-f]+/g, 'SHA-256'),
    messages: result.findings.map(({ message }) => message),
  }
}

const cellsOf = (csv: string): readonly string[] => csv.split('\r\n').flatMap((row) => row.split(','))

describe('a series whose files give the temperature in K, in °C or in °F', () => {
  const inKelvin = exported('K')

  it.each(['°C', '°F'])('%s: table, notes and findings are the same, to the last digit they print', (unit) => {
    const other = exported(unit)
    expect(other.messages).toEqual(inKelvin.messages)
    expect(other.notes).toBe(inKelvin.notes)
    const [cells, others] = [cellsOf(inKelvin.csv), cellsOf(other.csv)]
    expect(others).toHaveLength(cells.length)
    const isNear = (cell: string, i: number): boolean => cell === others[i] || Math.abs(Number(others[i]) / Number(cell) - 1) < 1e-6
    expect(cells.filter((cell, i) => !isNear(cell, i))).toEqual([])
  })

  it('every temperature names its unit, K beside °C', () => {
    const said = [...inKelvin.messages, ...inKelvin.notes.split('\n').filter((line) => line.includes('window'))].join('\n')
    // 545 to 560 K, the rows that are missing.
    expect(said).toMatch(/from 27[12]\.\d °C \(54[45]\.\d K\) to 28[67]\.\d °C \((559|560)\.\d K\)/)
    expect(said).toMatch(/20 K per min stands at \d+\.\d °C \(\d+\.\d K\), the slower .* at \d+\.\d °C \(\d+\.\d K\)/)
    expect(said).toMatch(/window \d+\.\d\d K \(\d+\.\d\d °C\) to \d+\.\d\d K \(\d+\.\d\d °C\); peak \d+\.\d\d K \(\d+\.\d\d °C\)/)
    for (const [, kelvin, celsius] of inKelvin.notes.matchAll(/(\d+\.\d\d) K \((-?\d+\.\d\d) °C\)/g))
      expect(Number(kelvin) - Number(celsius)).toBeCloseTo(273.15, 1)
  })
})
