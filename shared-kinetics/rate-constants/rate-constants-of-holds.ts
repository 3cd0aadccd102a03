import type { ReactionModel } from '../reaction-models/model.ts'
import { quantity } from '../units/quantity.ts'
import { rateConstantFromHold, type HoldOptions, type RateConstantFromHold } from './rate-constant-from-hold.ts'
import type { RateConstantNote, RateConstantTable } from './rate-constant-table.ts'

/** An isothermal run read at levels of conversion; NaN where a level was not reached. */
export interface HoldAtLevels {
  readonly label: string
  readonly temperature_K: number
  /** Time from the start of the hold. */
  readonly time_s: ArrayLike<number>
  readonly conversion: ArrayLike<number>
  /** Conversion lost before the hold began; NaN where it is not known. */
  readonly conversionBeforeHold: number
}

const whyNot: Readonly<Record<Exclude<RateConstantFromHold['status'], 'ok'>, string>> = {
  'too-few-rows': 'too few levels of conversion lie in the range',
  'time-not-distinct': 'its levels are all reached at one time',
  'not-positive': 'g does not rise with time',
}

/**
 * The rate constants of isothermal runs under one chosen model, as a table of k in 1/s: `rateConstantFromHold` of each, at its levels. The model, the range and the
 * straightness of g against t are said in a note, and so are runs that gave no k. No uncertainty of k is entered: neighbouring levels of one run are not
 * independent, and the standard error of their line would pretend to be one.
 *
 * @throws KineticsError `bad-option` where the range is not inside [0, 1] or empty
 * @source ictac-2011
 */
export function rateConstantsOfHolds(holds: readonly HoldAtLevels[], model: ReactionModel, options: HoldOptions): RateConstantTable {
  const read = holds.map((hold) => ({
    hold,
    k: rateConstantFromHold(
      { temperature: quantity(hold.temperature_K, 'K'), time_s: hold.time_s, conversion: hold.conversion },
      model.g,
      options,
    ),
  }))
  const usable = read.filter(({ k }) => k.status === 'ok')
  return {
    rows: usable.map(({ hold, k }) => ({
      temperature_K: hold.temperature_K,
      rateConstant: k.rateConstant,
      standardUncertainty: null,
      label: hold.label,
      use: true,
    })),
    rateUnit: '1/s',
    temperatureUnitShown: 'C',
    predictAt_K: [],
    source: { kind: 'isothermal-runs', name: `${model.label} (${model.code})`, sha256: null },
    notes: [...modelNote(usable, model, options), ...leftOutNote(read)],
  }
}

interface ReadHold {
  readonly hold: HoldAtLevels
  readonly k: RateConstantFromHold
}

function modelNote(usable: readonly ReadHold[], model: ReactionModel, { zeroInTime, range }: HoldOptions): readonly RateConstantNote[] {
  if (usable.length === 0) return []
  const worst = Math.min(...usable.map(({ k }) => k.r2))
  const before = Math.max(0, ...usable.map(({ hold }) => (Number.isNaN(hold.conversionBeforeHold) ? 0 : hold.conversionBeforeHold)))
  const zeros_s = usable.map(({ k }) => k.zero_s as number)
  const zero = zeroInTime === 'fixed' ? 'zero in time at the start of the hold' : `zero in time fitted (${zerosText(usable)})`
  return [
    {
      code: 'model-assumed',
      severity: 'note',
      message:
        `k rests on a chosen model, ${model.label} (${model.code}), g = ${model.equations.g} = k t, over conversion ${range[0]} to ${range[1]}, ${zero}; least r² of g against t ` +
        `${Number(worst.toPrecision(5))}, at most ${Number((100 * before).toPrecision(2))} % converted before a hold began. Ea hardly depends on the model, A does; a straight g does not show that the model is right.`,
      evidence: {
        model: model.code,
        leastR2: worst,
        convertedBeforeHold: before,
        runs: usable.length,
        leastZero_s: Math.min(...zeros_s),
        greatestZero_s: Math.max(...zeros_s),
      },
    },
  ]
}

/** Where the line of each run meets g = 0, from the start of its hold: before it where the run reacted on the way up, behind it after an induction time. */
function zerosText(usable: readonly ReadHold[]): string {
  const most = 10
  const each = usable.slice(0, most).map(({ hold: { label }, k }) => {
    const name = label.length > 24 ? `${label.slice(0, 23)}…` : label
    return `${name} ${secondsText(k.zero_s)} s`
  })
  return `${each.join(', ')}${usable.length > most ? ', …' : ''}`
}

const secondsText = (value: number): string =>
  String(Number(Math.abs(value) < 1 ? value.toFixed(2) : value.toPrecision(3))).replace('-', '−')

function leftOutNote(read: readonly ReadHold[]): readonly RateConstantNote[] {
  const without = read.flatMap(({ hold, k }) => (k.status === 'ok' ? [] : [`${hold.label} (${whyNot[k.status]})`]))
  if (without.length === 0) return []
  return [
    {
      code: 'rows-set-aside',
      severity: 'caution',
      message: `Runs without a rate constant: ${without.slice(0, 10).join(', ')}.`,
      evidence: { runs: without.length },
    },
  ]
}
