import type { SignalQuantity } from '../series/signal-quantity.ts'
import type { RunResult, StudyResult } from '../tasks/study-result.ts'
import { kelvinToCelsius } from '../units/convert.ts'
import type { Axis, Figure, Mark } from './figure.ts'
import { extentOf, niceAxis } from './nice-axis.ts'
import { runNames, runTones } from './run-place.ts'

export interface SignalsView {
  readonly against: 'temperature' | 'time'
}

interface SignalScale {
  readonly unit: string
  /** From the unit the signal is held in to the one it is drawn in. */
  readonly factorOf: (run: RunResult) => number
}

const signalNames: Readonly<Record<SignalQuantity, string>> = {
  mass: 'Mass',
  conversion: 'Conversion α',
  'heat-release': 'Heat release rate',
  'heat-flow': 'Heat flow',
}

/**
 * The measured signals of all runs against temperature (°C) or time (min), with the baselines under heat flow.
 * Mass is drawn in mg or, where a run gives only fractions, in % for all; power in mW or W/g.
 */
export function signalsFigure(result: StudyResult, view: SignalsView): Figure {
  const tones = runTones(result)
  const names = runNames(result.runs)
  const scale = signalScale(result)
  const marks = result.runs.flatMap((run, i): Mark[] => {
    const tone = tones[i] ?? { kind: 'ink' }
    const name = names[i] ?? run.label
    const x = abscissa(run, view)
    const factor = scale.factorOf(run)
    const curve: Mark = { kind: 'line', name, tone, x, y: run.curve.signal.map((value) => value * factor) }
    if (run.curve.baseline.length === 0) return [curve]
    return [
      curve,
      { kind: 'line', name: `${name}, baseline`, tone, x, y: run.curve.baseline.map((value) => value * factor), dash: 'dashed' },
    ]
  })
  const label = result.signal === null ? 'Signal' : signalNames[result.signal]
  return {
    id: 'signals',
    title: 'Signals',
    description: `${label} of ${countOf(result.runs.length, 'run')} against ${view.against}.`,
    x: abscissaAxis(result, view),
    y: axisOver({ label, unit: scale.unit }, ...marks.map(ordinates)),
    marks,
  }
}

/** Where each run stands at one level: a point a run, on the axes of `signalsFigure`. */
export function signalsAtLevel(result: StudyResult, view: SignalsView, levelIndex: number): Mark[] {
  const tones = runTones(result)
  const names = runNames(result.runs)
  const scale = signalScale(result)
  return result.runs.flatMap((run, i): Mark[] => {
    const signal = run.signalAtLevel[levelIndex] ?? null
    const along = view.against === 'temperature' ? run.temperatureAtLevel_K[levelIndex] : run.timeAtLevel_s[levelIndex]
    const tone = tones[i]
    if (signal === null || along === null || along === undefined || tone === undefined) return []
    const x = view.against === 'temperature' ? kelvinToCelsius(along) : along / 60
    return [{ kind: 'points', name: names[i] ?? run.label, tone, x: [x], y: [signal * scale.factorOf(run)], joined: false }]
  })
}

function abscissa(run: RunResult, view: SignalsView): Float64Array {
  return view.against === 'temperature' ? run.curve.temperature_K.map(kelvinToCelsius) : run.curve.time_s.map((time) => time / 60)
}

function abscissaAxis(result: StudyResult, view: SignalsView): Axis {
  const title = view.against === 'temperature' ? { label: 'Temperature', unit: '°C' } : { label: 'Time', unit: 'min' }
  return axisOver(title, ...result.runs.map((run) => abscissa(run, view)))
}

function axisOver(title: { readonly label: string; readonly unit: string }, ...columns: readonly Iterable<number>[]): Axis {
  const { min, max } = niceAxis(...extentOf(...columns))
  return { ...title, min, max, second: null }
}

const ordinates = (mark: Mark): Iterable<number> => (mark.kind === 'line' ? Array.from(mark.y) : [])

function signalScale(result: StudyResult): SignalScale {
  const units = new Set(result.runs.map((run) => run.signalUnit))
  const [only] = units
  if (result.signal === 'mass') {
    if (only === 'kg' && units.size === 1) return { unit: 'mg', factorOf: () => 1e6 }
    return { unit: '%', factorOf: (run) => (run.signalUnit === '1' ? 100 : 100 / firstMass_kg(run)) }
  }
  if (result.signal === 'conversion' || only === undefined) return { unit: '', factorOf: () => 1 }
  if (only === 'W' && units.size === 1) return { unit: 'mW', factorOf: () => 1000 }
  return { unit: 'W/g', factorOf: (run) => (run.signalUnit === 'W' ? 1e-3 / (run.initialMass_kg ?? Number.NaN) : 1e-3) }
}

const firstMass_kg = (run: RunResult): number => run.initialMass_kg ?? run.curve.signal.find(Number.isFinite) ?? Number.NaN
const countOf = (n: number, word: string): string => `${n} ${word}${n === 1 ? '' : 's'}`
