import { assert, double, property } from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { MethodId } from '../isoconversional/result.ts'
import type { ProfileResult, RunResult, StudyResult } from '../tasks/study-result.ts'
import { activationAtLevel, activationFigure } from './activation-figure.ts'
import type { Figure, Mark } from './figure.ts'
import { niceAxis, niceTicks, tickText } from './nice-axis.ts'
import { phiFigure } from './phi-figure.ts'
import { runNames, runPlaces } from './run-place.ts'
import { signalsAtLevel, signalsFigure } from './signals-figure.ts'
import { inverseTemperatureAxis, straightLinesAtLevel, straightLinesFigure } from './straight-lines-figure.ts'

const levels = [0.25, 0.5, 0.75]
const rates_K_per_min = [2, 5, 10, 10, 20]
const gasConstant = 8.31446261815324

/** Runs whose level temperatures are chosen by hand; the last but one repeats 10 K/min. */
function runOf(i: number, change: Partial<RunResult> = {}): RunResult {
  const temperature_K = Float64Array.from({ length: 5 }, (_, row) => 500 + 50 * row + i)
  return {
    runId: `run-${i}`,
    label: `sample ${i}`,
    fileName: `run ${i}.csv`,
    column: 'Mass (mg)',
    sha256: '0'.repeat(64),
    signal: 'mass',
    signalUnit: 'kg',
    programme: 'constant-heating-rate',
    programmeGroup: [0, 1, 2, 2, 3][i] ?? 0,
    nominalHeatingRate_K_per_min: null,
    heatingRate_K_per_min: rates_K_per_min[i] ?? null,
    heatingRateStandardError_K_per_min: 0.01,
    heatingRateSource: 'measured',
    holdTemperature_K: null,
    holdStart_s: null,
    conversionBeforeHold: null,
    rows: 5,
    initialMass_kg: 8e-6,
    window: { kind: 'temperature', start_K: 500, end_K: 700 },
    peak_K: 600,
    enthalpy_J_per_g: null,
    enthalpyMagnitude_J_per_g: null,
    temperatureAtLevel_K: [560 + i, 600 + i, null],
    timeAtLevel_s: [120, 240, null],
    reactionRateAtLevel_per_s: [0.001, 0.002, null],
    signalAtLevel: [7e-6, 5e-6, null],
    curve: {
      time_s: Float64Array.of(0, 60, 120, 180, 240),
      temperature_K,
      signal: Float64Array.of(8e-6, 7.9e-6, 5e-6, 3e-6, 2.5e-6),
      conversion: Float64Array.of(0, 0.02, 0.5, 0.9, 1),
      reactionRate_per_s: new Float64Array(5),
      baseline: new Float64Array(0),
    },
    ...change,
  }
}

const runs = rates_K_per_min.map((_, i) => runOf(i))

/** An exact line y = intercept - (Ea/R) x at each level, so that points and line must agree. */
function lineProfile(method: MethodId, label: string, Ea: readonly (number | null)[]): ProfileResult {
  const lines = levels.map((_, level) => {
    const slope_K = Ea[level] === null ? null : -((Ea[level] ?? 0) * 1000) / gasConstant
    const x_per_K = runs.map((run) => {
      const T = run.temperatureAtLevel_K[level] ?? null
      return T === null ? null : 1 / T
    })
    return {
      x_per_K,
      y: x_per_K.map((x) => (x === null || slope_K === null ? null : 20 + slope_K * x)),
      slope_K,
      intercept: slope_K === null ? null : 20,
    }
  })
  const shifted = (by: number) => Ea.map((value) => (value === null ? null : value + by))
  return {
    method,
    label,
    sources: [],
    evidence: 'line',
    interval: { kind: 'student-t', level: 0.95, dof: 3, pointwise: true },
    Ea_kJ_per_mol: Ea,
    standardError_kJ_per_mol: Ea.map((value) => (value === null ? null : 1)),
    lower95_kJ_per_mol: shifted(-3.18),
    upper95_kJ_per_mol: shifted(3.18),
    lnAf_per_s: Ea.map(() => null),
    lnAfStandardError: Ea.map(() => null),
    covarianceEaLnAf_kJ_per_mol: Ea.map(() => null),
    lnA_per_s: Ea.map(() => null),
    otherIntervals: [],
    systematicError_percent: Ea.map((value) => (value === null ? null : 0)),
    lackOfFit: null,
    r2: Ea.map((value) => (value === null ? null : 1)),
    status: Ea.map((value) => (value === null ? 'level-not-reached' : 'ok')),
    lines,
    phi: [],
    mean: {
      from: 0.1,
      to: 0.9,
      Ea_kJ_per_mol: null,
      spread_kJ_per_mol: null,
      standardError_kJ_per_mol: null,
      lower95_kJ_per_mol: null,
      upper95_kJ_per_mol: null,
      levelsUsed: 0,
      levelsInRange: 3,
      firstLevel: null,
      lastLevel: null,
      note: 'From the scatter of the runs alone.',
    },
  }
}

const phiProfile: ProfileResult = {
  ...lineProfile('vyazovkin', 'Vyazovkin', [120, 140, null]),
  evidence: 'minimum',
  lines: [],
  phi: levels.map(() => ({
    Ea_kJ_per_mol: [100, 110, 120, 130, 140],
    phi: [13, 12.4, 12.1, 12.4, 13],
    phiMinimum: 12.1,
    phiThreshold: 12.5,
  })),
}

const result: StudyResult = {
  levels,
  signal: 'mass',
  signalsToChooseFrom: ['mass'],
  runs,
  profiles: [lineProfile('friedman', 'Friedman', [119, 141, null]), lineProfile('starink', 'Starink', [120, 140, null]), phiProfile],
  kissinger: null,
  peakMethods: [],
  findings: [],
}

const marksOf = <Kind extends Mark['kind']>(marks: readonly Mark[], kind: Kind) =>
  marks.filter((mark): mark is Extract<Mark, { kind: Kind }> => mark.kind === kind)

const isOnAxes =
  (figure: Figure) =>
  (x: number, y: number): boolean =>
    x >= (figure.x.min ?? Number.NaN) &&
    x <= (figure.x.max ?? Number.NaN) &&
    y >= (figure.y.min ?? Number.NaN) &&
    y <= (figure.y.max ?? Number.NaN)

describe('nice axis', () => {
  it('encloses any range with a handful of evenly spaced ticks at 1, 2 or 5 times a power of ten', () => {
    const number = double({ min: -1e9, max: 1e9, noNaN: true })
    assert(
      property(number, double({ min: 1e-6, max: 1e9, noNaN: true }), (low, width) => {
        const high = low + Math.max(width, Math.abs(low) * 1e-6)
        const { min, max, step, ticks } = niceAxis(low, high)
        const leading = Number(step.toExponential().split('e')[0])
        expect([1, 2, 5]).toContain(leading)
        expect(min).toBeLessThanOrEqual(low + step * 1e-6)
        expect(max).toBeGreaterThanOrEqual(high - step * 1e-6)
        expect(ticks.length).toBeGreaterThanOrEqual(3)
        expect(ticks.length).toBeLessThanOrEqual(9)
        for (const [i, tick] of ticks.slice(1).entries()) expect((tick - (ticks[i] ?? 0)) / step).toBeCloseTo(1, 4)
      }),
    )
  })

  it('gives a range of no width a length, and numbers that are not finite an axis at all', () => {
    expect(niceAxis(5, 5).max).toBeGreaterThan(niceAxis(5, 5).min)
    expect(niceAxis(0, 0).max).toBeGreaterThan(niceAxis(0, 0).min)
    expect(niceAxis(Number.NaN, Number.NaN)).toMatchObject({ min: 0, max: 1 })
    expect(niceTicks(1, 1)).toEqual([])
  })

  it('writes ticks with the decimals of their step and a true minus sign', () => {
    expect([tickText(-9.5, 0.5), tickText(100, 20), tickText(0.1 + 0.2, 0.1), tickText(2e8, 1e8)]).toEqual(['−9.5', '100', '0.3', '2.0e8'])
  })
})

describe('place of a run', () => {
  it('goes from 0 to 1 in equal steps by programme, replicates sharing one', () => {
    expect(runPlaces(runs)).toEqual([0, 1 / 3, 2 / 3, 2 / 3, 1])
    expect(runPlaces([{ programmeGroup: 4 }])).toEqual([0])
  })

  it('names a run by its heating rate, and numbers replicates', () => {
    expect(runNames(runs)).toEqual(['2 K/min', '5 K/min', '10 K/min (1)', '10 K/min (2)', '20 K/min'])
    expect(runNames([runOf(0, { programme: 'isothermal', heatingRate_K_per_min: null, holdTemperature_K: 393.15 })])).toEqual(['120.0 °C'])
    expect(runNames([runOf(0, { programme: 'general', heatingRate_K_per_min: null })])).toEqual(['sample 0'])
  })
})

describe('signals figure', () => {
  it('draws mass in mg against °C, every point inside the axes', () => {
    const figure = signalsFigure(result, { against: 'temperature' })
    const lines = marksOf(figure.marks, 'line')
    expect(lines).toHaveLength(5)
    expect([figure.x.unit, figure.y.unit]).toEqual(['°C', 'mg'])
    expect(lines[1]?.x[0]).toBeCloseTo(501 - 273.15, 9)
    expect(lines[1]?.y[0]).toBeCloseTo(8, 12)
    for (const line of lines) expect(Array.from(line.x).every((x, i) => isOnAxes(figure)(x, line.y[i] ?? Number.NaN))).toBe(true)
  })

  it('draws against minutes, and marks where each run stands at a level', () => {
    const view = { against: 'time' } as const
    expect(marksOf(signalsFigure(result, view).marks, 'line')[0]?.x[4]).toBe(4)
    const points = marksOf(signalsAtLevel(result, view, 1), 'points')
    expect(points).toHaveLength(5)
    expect(points[0]).toMatchObject({ x: [4], y: [5] })
    expect(signalsAtLevel(result, view, 2)).toEqual([])
  })

  it('draws all masses in % where one run gives only fractions', () => {
    const fraction = runOf(1, { signalUnit: '1', curve: { ...runOf(1).curve, signal: Float64Array.of(1, 0.9, 0.6, 0.4, 0.3) } })
    const figure = signalsFigure({ ...result, runs: [runOf(0), fraction] }, { against: 'time' })
    expect(figure.y.unit).toBe('%')
    expect(marksOf(figure.marks, 'line').map((line) => line.y[2])).toEqual([expect.closeTo(62.5, 9), expect.closeTo(60, 9)])
  })

  it('draws heat flow per gram in W/g with its baseline dashed', () => {
    const curve = {
      ...runOf(0).curve,
      signal: Float64Array.of(0, 1000, 2000, 1000, 0),
      baseline: Float64Array.of(0, 10, 20, 10, Number.NaN),
    }
    const figure = signalsFigure(
      { ...result, signal: 'heat-flow', runs: [runOf(0, { signal: 'heat-flow', signalUnit: 'W/kg', curve })] },
      { against: 'time' },
    )
    const [signal, baseline] = marksOf(figure.marks, 'line')
    expect(figure.y.unit).toBe('W/g')
    expect(signal?.y[2]).toBe(2)
    expect(baseline).toMatchObject({ dash: 'dashed' })
    expect(baseline?.y[2]).toBeCloseTo(0.02, 12)
  })
})

describe('straight lines figure', () => {
  const figure = straightLinesFigure(result, 'starink')

  it('has one faint line for each level that has one, through the points of its runs', () => {
    const lines = marksOf(figure.marks, 'line')
    expect(lines.map((line) => line.name)).toEqual(['α 0.25', 'α 0.5'])
    expect(lines.every((line) => line.tone.kind === 'faint')).toBe(true)
    const [line] = lines
    const slope = ((line?.y[1] ?? 0) - (line?.y[0] ?? 0)) / ((line?.x[1] ?? 0) - (line?.x[0] ?? 0))
    expect(slope).toBeCloseTo(-120 / gasConstant, 9)
    const points = marksOf(straightLinesAtLevel(result, 'starink', 0), 'points')
    for (const point of points) expect(point.y[0]).toBeCloseTo((line?.y[0] ?? 0) + slope * ((point.x[0] ?? 0) - (line?.x[0] ?? 0)), 9)
  })

  it('shows the heating rate in K/min: ln 60 above the same value in K/s', () => {
    const [point] = marksOf(straightLinesAtLevel(result, 'starink', 0), 'points')
    expect((point?.y[0] ?? 0) - (20 - 120_000 / gasConstant / 560)).toBeCloseTo(4.0943445622221, 9)
    expect(figure.y.unit).toContain('K/min')
    const [friedman] = marksOf(straightLinesAtLevel(result, 'friedman', 0), 'points')
    expect(friedman?.y[0]).toBeCloseTo(20 - 119_000 / gasConstant / 560, 9)
  })

  it('titles its axes with the terms of the field', () => {
    expect(straightLinesFigure(result, 'friedman').y.label).toBe('ln(dα/dt)')
    expect(figure.y.label).toBe('ln(β/T^1.92)')
    expect(straightLinesFigure(result, 'kas').y.label).toBe('ln(β/T²)')
    expect(figure.x).toMatchObject({ label: '1000/T', unit: '1/K' })
  })

  it('reads the same axis in °C along the opposite edge, where 1000/T says so', () => {
    const ticks = figure.x.second?.ticks ?? []
    expect(ticks.length).toBeGreaterThanOrEqual(3)
    for (const { at, text } of ticks) {
      expect(1000 / at - 273.15).toBeCloseTo(Number(text), 6)
      expect(isOnAxes(figure)(at, figure.y.min ?? Number.NaN)).toBe(true)
    }
  })

  it('reads it in K or °F where a table is in these', () => {
    // 0 °F is 459.67 °R.
    const toKelvin = { K: (T: number) => T, F: (T: number) => (T + 459.67) / 1.8 }
    for (const unit of ['K', 'F'] as const) {
      const { second } = inverseTemperatureAxis([1.8, 2], unit)
      expect(second?.unit).toBe(unit === 'K' ? 'K' : '°F')
      expect(second?.ticks.length).toBeGreaterThanOrEqual(3)
      for (const { at, text } of second?.ticks ?? []) expect(1000 / at).toBeCloseTo(toKelvin[unit](Number(text)), 6)
    }
  })

  it('gives the current level in ink with a point a run in its own tone, and nothing where there is no line', () => {
    const marks = straightLinesAtLevel(result, 'starink', 1)
    expect(marksOf(marks, 'line').map((line) => line.tone.kind)).toEqual(['ink'])
    expect(marksOf(marks, 'points').map((mark) => mark.tone)).toEqual(
      runs.map((_, index) => ({ kind: 'run', place: runPlaces(runs)[index], index })),
    )
    expect(straightLinesAtLevel(result, 'starink', 2)).toEqual([])
    expect(straightLinesAtLevel(result, 'vyazovkin', 0)).toEqual([])
    expect(straightLinesFigure(result, 'kas').marks).toEqual([])
  })
})

describe('phi figure', () => {
  it('shows curve, minimum, threshold and the ends of the interval, all inside the axes', () => {
    const figure = phiFigure(result, 'vyazovkin', 0)
    expect(figure.marks.map((mark) => mark.name)).toEqual(['Φ(Ea)', 'Threshold', 'Lower end, 95 %', 'Upper end, 95 %', 'Minimum'])
    expect(marksOf(figure.marks, 'points')[0]).toMatchObject({ x: [120], y: [12.1] })
    expect(marksOf(figure.marks, 'rule').map((rule) => [rule.along, rule.at])).toEqual([
      ['x', 12.5],
      ['y', 120 - 3.18],
      ['y', 120 + 3.18],
    ])
    expect(isOnAxes(figure)(100, 13)).toBe(true)
  })

  it('keeps the threshold well inside the picture, however steeply Phi rises beyond it', () => {
    // Runs that differ by y = Ea u, two of a kind on each side: Phi = 4 + 8 cosh y, threshold where y = 2.
    const Ea = Array.from({ length: 81 }, (_, i) => 20 + 2.5 * i)
    const phi = Ea.map((value) => 4 + 8 * Math.cosh((value - 120) / 20))
    const [minimum, threshold] = [12, 4 + 8 * Math.cosh(2)]
    const steep = { ...phiProfile, phi: levels.map(() => ({ Ea_kJ_per_mol: Ea, phi, phiMinimum: minimum, phiThreshold: threshold })) }
    const { x, y, marks } = phiFigure({ ...result, profiles: [steep] }, 'vyazovkin', 0)
    const height = (threshold - (y.min ?? Number.NaN)) / ((y.max ?? Number.NaN) - (y.min ?? Number.NaN))
    expect(height).toBeGreaterThan(0.1)
    expect(height).toBeLessThan(0.6)
    const [line] = marksOf(marks, 'line')
    expect(Math.max(...Array.from(line?.y ?? []))).toBeGreaterThan(4 * (threshold - minimum))
    expect([line?.x[0] ?? 0, line?.x[(line?.x.length ?? 0) - 1] ?? 0].every((end) => end >= (x.min ?? 0) && end <= (x.max ?? 0))).toBe(true)
  })

  it('is still a curve where the interval is narrower than its steps', () => {
    const Ea = Array.from({ length: 81 }, (_, i) => 119.6 + 0.01 * i)
    const sharp = { Ea_kJ_per_mol: Ea, phi: Ea.map((value) => 12 + (value - 120) ** 2), phiMinimum: 12, phiThreshold: 12 + 1e-9 }
    const figure = phiFigure({ ...result, profiles: [{ ...phiProfile, phi: levels.map(() => sharp) }] }, 'vyazovkin', 0)
    expect(marksOf(figure.marks, 'line')[0]?.x).toHaveLength(81)
  })

  it('shows the ends of another interval by its kind, without the threshold that belongs to Student’s t, and none where there is none', () => {
    const drawn = { name: 'F-type', lower95_kJ_per_mol: [104, 130, null], upper95_kJ_per_mol: [126, 150, null] }
    const figure = phiFigure(result, 'vyazovkin', 0, drawn)
    expect(marksOf(figure.marks, 'rule').map((rule) => [rule.name, rule.at])).toEqual([
      ['Lower end, 95 % (F-type)', 104],
      ['Upper end, 95 % (F-type)', 126],
    ])
    expect(isOnAxes(figure)(104, 12.1) && isOnAxes(figure)(126, 12.1)).toBe(true)
    expect(figure.description).toContain('F-type')
    expect(marksOf(phiFigure(result, 'vyazovkin', 0, null).marks, 'rule')).toEqual([])
  })

  it('leaves minimum and interval out where the level has none', () => {
    expect(phiFigure(result, 'vyazovkin', 2).marks.map((mark) => mark.name)).toEqual(['Φ(Ea)', 'Threshold'])
    expect(phiFigure(result, 'friedman', 0).marks).toEqual([])
  })
})

describe('activation figure', () => {
  it('puts the chosen method first, with its band; levels without a number are NaN and so break the line', () => {
    const figure = activationFigure(result, ['friedman', 'starink', 'kas'], 'starink')
    expect(figure.marks.map((mark) => [mark.kind, mark.name])).toEqual([
      ['band', '95 % interval (Student-t), Starink'],
      ['points', 'Starink'],
      ['points', 'Friedman'],
    ])
    expect(marksOf(figure.marks, 'points').map((mark) => mark.tone)).toEqual([
      { kind: 'method', index: 0 },
      { kind: 'method', index: 1 },
    ])
    expect(Array.from(marksOf(figure.marks, 'points')[0]?.y ?? [])).toEqual([120, 140, Number.NaN])
    expect(figure.x).toMatchObject({ min: 0, max: 1 })
    expect(isOnAxes(figure)(0.5, 120 - 3.18) && isOnAxes(figure)(0.5, 141)).toBe(true)
  })

  it('draws the interval of a method beside it in its own tone, where it is given, and on the axis', () => {
    const beside = { name: 'Student-t', lower95_kJ_per_mol: [110, 111, 112], upper95_kJ_per_mol: [130, 131, 132] }
    const figure = activationFigure(result, ['starink', 'friedman'], 'starink', null, ({ method }) =>
      method === 'friedman' ? beside : null,
    )
    const bands = marksOf(figure.marks, 'band')
    expect(bands.map((band) => [band.tone, Array.from(band.upper)])).toEqual([[{ kind: 'method', index: 1 }, [130, 131, 132]]])
    expect(isOnAxes(figure)(0.5, 111)).toBe(true)
    expect(marksOf(activationFigure(result, ['starink', 'friedman'], 'starink', null).marks, 'band')).toEqual([])
  })

  it('draws another interval of the chosen method in place of its own, and none where there is none', () => {
    const drawn = { name: 'jackknife', lower95_kJ_per_mol: [90, 131, null], upper95_kJ_per_mol: [150, 149, null] }
    const figure = activationFigure(result, ['friedman', 'starink'], 'starink', drawn)
    const [band] = marksOf(figure.marks, 'band')
    expect(band?.name).toBe('95 % interval (jackknife), Starink')
    expect(Array.from(band?.lower ?? [])).toEqual([90, 131, Number.NaN])
    expect(isOnAxes(figure)(0.5, 131)).toBe(true)
    const at = marksOf(activationAtLevel(result, ['starink'], 'starink', 1, drawn), 'points')[0]
    expect(at).toMatchObject({ y: [140], lower: [131], upper: [149] })
    expect(marksOf(activationFigure(result, ['starink'], 'starink', null).marks, 'band')).toEqual([])
    expect(marksOf(activationAtLevel(result, ['starink'], 'starink', 1, null), 'points')[0]).not.toHaveProperty('lower')
  })

  it('leaves a level that is far out beyond the axis, and says so with its number', () => {
    const [, starink] = result.profiles
    if (starink === undefined) throw new Error('the fixture has a second profile')
    // Quartiles 160 and 172: the outer fences lie at 160 - 3 x 16.6 and 172 + 3 x 16.6, a tenth of the median 166 being more than 12.
    const Ea = [154, 158, 160, 162, 164, 166, 168, 170, 172, 221, 540]
    const many = {
      ...result,
      levels: Ea.map((_, i) => (i + 1) / 12),
      profiles: [
        {
          ...starink,
          Ea_kJ_per_mol: Ea,
          lower95_kJ_per_mol: Ea.map((value) => value - 1),
          upper95_kJ_per_mol: Ea.map((value) => value + 1),
        },
      ],
    }
    const figure = activationFigure(many, ['starink'], 'starink')
    expect(figure.y.max).toBeLessThan(260)
    expect(isOnAxes(figure)(0.8, 221)).toBe(true)
    expect(figure.note).toBe('Beyond the axis: α 0.916667 (540).')
    expect(activationFigure(result, ['starink'], 'starink').note).toBeUndefined()
  })

  it('keeps the curve readable under an interval far wider than it', () => {
    const [, starink] = result.profiles
    if (starink === undefined) throw new Error('the fixture has a second profile')
    const wide = { ...starink, lower95_kJ_per_mol: [-4000, 100, null], upper95_kJ_per_mol: [4000, 180, null] }
    const { y } = activationFigure({ ...result, profiles: [wide] }, ['starink'], 'starink')
    expect((140 - 120) / ((y.max ?? 0) - (y.min ?? 0))).toBeGreaterThanOrEqual(0.2)
  })

  it('marks the level with a rule, and with the point and interval of the chosen method where it has them', () => {
    expect(activationAtLevel(result, ['starink'], 'starink', 1)).toEqual([
      expect.objectContaining({ kind: 'rule', along: 'y', at: 0.5 }),
      expect.objectContaining({ kind: 'points', x: [0.5], y: [140], lower: [140 - 3.18], upper: [140 + 3.18] }),
    ])
    expect(activationAtLevel(result, ['starink'], 'starink', 2)).toHaveLength(1)
    expect(activationAtLevel(result, ['starink'], 'starink', 9)).toEqual([])
  })

  it('has no interval band with two programmes, and no marks without a profile', () => {
    const [, starink] = result.profiles
    if (starink === undefined) throw new Error('the fixture has a second profile')
    const none = levels.map(() => null)
    const bare = { ...starink, lower95_kJ_per_mol: none, upper95_kJ_per_mol: none }
    expect(activationFigure({ ...result, profiles: [bare] }, ['starink'], 'starink').marks.map((mark) => mark.kind)).toEqual(['points'])
    expect(activationFigure({ ...result, profiles: [] }, ['starink'], 'starink').marks).toEqual([])
  })
})
