import { KineticsError } from '../errors.ts'
import type { RunInfo, SignalInfo } from '../series/run.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { convertRunVersion, type ConversionSettings } from './convert-run.ts'
import type { StudyInput } from './study-input.ts'

/** What `convertRun` is to do with one run of a study. */
export interface ConversionOrder {
  readonly info: RunInfo
  readonly signal: SignalInfo
  readonly settings: ConversionSettings
  /** Names everything that its result depends on. */
  readonly key: string
}

/**
 * @param quantity - the signal that is analysed
 * @throws KineticsError `no-signal` where the run has none of that quantity
 */
export function conversionOrder(info: RunInfo, quantity: SignalQuantity, { settings }: StudyInput): ConversionOrder {
  const signalIndex = info.signals.findIndex((signal) => signal.quantity === quantity)
  const signal = info.signals[signalIndex]
  if (signal === undefined) {
    throw new KineticsError(
      'no-signal',
      `${info.label} has no ${quantity.replace('-', ' ')} column. Choose a signal that all runs have, or leave this run out.`,
      { run: info.label, signal: quantity },
    )
  }
  const window = info.window ?? settings.window
  const key = JSON.stringify([
    'convert',
    convertRunVersion,
    info.columnsKey,
    signalIndex,
    quantity,
    window,
    quantity === 'heat-flow' ? settings.baseline : null,
    info.hasTime ? null : info.nominalHeatingRate,
  ])
  return { info, signal, settings: { quantity, signalIndex, window, baseline: settings.baseline }, key }
}
