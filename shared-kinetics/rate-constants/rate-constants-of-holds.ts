import type { ReactionModel } from '../reaction-models/model.ts'
import { fitsOfHolds, readHold, type HoldAtLevels, type ReadHold } from './fits-of-holds.ts'
import type { HoldOptions } from './hold-rows.ts'
import type { RateConstantFromHold } from './rate-constant-from-hold.ts'
import type { RateConstantNote, RateConstantTable } from './rate-constant-table.ts'

export type { HoldAtLevels }

const whyNot: Readonly<Record<Exclude<RateConstantFromHold['status'], 'ok'>, string>> = {
  'too-few-rows': 'too few levels of conversion lie in the range',
  'time-not-distinct': 'its levels are all reached at one time',
  'not-positive': 'g does not rise with time',
  'not-converged': 'the fit of its conversion found no minimum',
  'model-does-not-apply': 'the model has no zero in time of its own; let it be fitted',
}

/**
 * The rate constants of isothermal runs under one chosen model, as a table of k in 1/s: `rateConstantFromHold` of each, at its levels, by nonlinear least squares of
 * conversion. The model, the range and how the fits came out are said in a note, and so are runs that gave no k; `holdFits` holds the fits and the ranking of models.
 * No uncertainty of k is entered: neighbouring levels of one run are not independent, and the standard error of their fit, which stands in `holdFits` and is shown beside k, would pretend to be one.
 *
 * @throws KineticsError `bad-option` where the range is not inside [0, 1] or empty; Cancelled, by `checkCancelled`
 * @source ictac-2011
 */
export function rateConstantsOfHolds(
  holds: readonly HoldAtLevels[],
  model: ReactionModel,
  options: HoldOptions,
  checkCancelled: () => void = () => undefined,
): RateConstantTable {
  const read = holds.map((hold) => {
    checkCancelled()
    return readHold(hold, model, options)
  })
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
    ...(usable.length === 0 ? {} : { holdFits: fitsOfHolds(usable, model, options, checkCancelled) }),
  }
}

function modelNote(usable: readonly ReadHold[], model: ReactionModel, { zeroInTime, range }: HoldOptions): readonly RateConstantNote[] {
  if (usable.length === 0) return []
  const worst = Math.min(...usable.map(({ k }) => k.linearised.r2))
  const before = Math.max(0, ...usable.map(({ hold }) => (Number.isNaN(hold.conversionBeforeHold) ? 0 : hold.conversionBeforeHold)))
  const zeros_s = usable.map(({ k }) => k.zero_s as number)
  const zero = zeroInTime === 'fixed' ? 'zero in time at the start of the hold' : `zero in time fitted (${zerosText(usable)})`
  const scatter = Math.max(0, ...usable.map(({ k }) => (Number.isNaN(k.residualStandardDeviation) ? 0 : k.residualStandardDeviation)))
  const fromLine = Math.max(...usable.map(({ k }) => Math.abs(k.linearised.rateConstant_per_s / k.rateConstant - 1)))
  return [
    {
      code: 'model-assumed',
      severity: 'note',
      message:
        `k rests on a chosen model, ${model.label} (${model.code}), ${equationOf(model)}, over conversion ${range[0]} to ${range[1]}, ${zero}. Conversion itself was fitted against time (nonlinear least squares; ` +
        `standard deviation at most ${short(scatter)}); the line of g gives k within ${short(100 * fromLine)} %. At most ${short(100 * before)} % converted before a hold began. ` +
        'Ea hardly depends on the model, A does; a good fit does not show that the model is right.',
      evidence: {
        model: model.code,
        leastR2: worst,
        greatestResidualStandardDeviation: scatter,
        greatestDifferenceFromLine: fromLine,
        convertedBeforeHold: before,
        runs: usable.length,
        leastZero_s: Math.min(...zeros_s),
        greatestZero_s: Math.max(...zeros_s),
      },
    },
  ]
}

/** g(alpha) = k t with nothing left to look up: L written out, and n with its number, which stands in the code. */
function equationOf({ code, equations: { g } }: ReactionModel): string {
  const written = g === 'L' ? '-ln(1 - alpha)' : g.replaceAll(/\bL\b/g, '[-ln(1 - alpha)]')
  return `g = ${written} = k t${/\bn\b/.test(g) ? `, n = ${code.slice(1)}` : ''}`
}

/** Three digits as in the ranking of models; by a power of ten where zeros would have to be counted. */
const short = (value: number): string => (value !== 0 && value < 1e-3 ? value.toExponential(2) : String(Number(value.toPrecision(3))))

/** Where the reaction of each run begins, from the start of its hold: before it where the run reacted on the way up, behind it after an induction time. */
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
