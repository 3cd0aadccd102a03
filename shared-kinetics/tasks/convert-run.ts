import { KineticsError } from '../errors.ts'
import type { Converted } from '../conversion/converted.ts'
import { fromColumn } from '../conversion/from-column.ts'
import { fromHeatFlow } from '../conversion/from-heat-flow.ts'
import { fromHeatRelease } from '../conversion/from-heat-release.ts'
import { fromMass } from '../conversion/from-mass.ts'
import { peakTemperature } from '../conversion/peak-temperature.ts'
import { samplingOf, type Sampling } from '../conversion/sampling.ts'
import { findWindow, rowsInWindow } from '../conversion/window.ts'
import { isHold, startOfHold, timeOfHold } from '../series/hold.ts'
import { mainHeating, type RowRange } from '../series/main-heating.ts'
import type { RunColumns, RunInfo, Window } from '../series/run.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { steadinessOf, unknownSteadiness, type Steadiness } from '../series/steadiness.ts'
import { tellProgramme, type ToldProgramme } from '../series/tell-programme.ts'
import { pooledRows } from '../series/pooled-rows.ts'
import { usableRows, type UsableRows } from '../series/usable-rows.ts'
import { lowerBound } from '../signal/lower-bound.ts'
import { column } from '../units/quantity.ts'
import type { BaselineKind } from './study-input.ts'

/** One run with its conversion: everything that does not depend on levels, methods or other runs. */
export interface ConvertedRun {
  /** Those of a long run pooled (`pooledRows`). */
  readonly rows: UsableRows
  /** How many they were before. */
  readonly measuredRows: number
  /** Rows inside the window. */
  readonly range: RowRange
  readonly converted: Converted
  readonly told: ToldProgramme
  /** Of the rows as measured, pooled or not; unknown where time was rebuilt. */
  readonly steadiness: Steadiness
  readonly window: Window
  /** Temperature at which the main heating of the run begins. */
  readonly heatingStart_K: number
  /** NaN where the reaction rate has no maximum. */
  readonly peak_K: number
  readonly sampling: Sampling
  /** Where a hold begins, on the run's own clock, and the conversion lost by then to the heating up; NaN for other programmes. */
  readonly holdStart_s: number
  readonly conversionBeforeHold: number
}

export interface ConversionSettings {
  readonly quantity: SignalQuantity
  readonly signalIndex: number
  readonly window: Window | null
  readonly baseline: BaselineKind
}

/** Bump when a number that `convertRun` gives changes: remembered steps of another version are not used. */
export const convertRunVersion = 8

/**
 * Raw columns of one run to its conversion, programme and rate peak.
 *
 * @throws KineticsError where the run cannot be used; the message names the run and what to do. Cancelled, by `checkCancelled`
 */
export function convertRun(
  info: RunInfo,
  columns: RunColumns,
  settings: ConversionSettings,
  checkCancelled: () => void = () => undefined,
): ConvertedRun {
  const usable = usableRows(columns, settings.signalIndex, info.nominalHeatingRate, info.label)
  checkCancelled()
  const rows = pooledRows(usable)
  checkCancelled()
  const { range, converted } = convertedInWindow(rows, settings, info.label, checkCancelled)
  checkCancelled()
  const { reaction } = converted.curve
  const told = tellProgramme(rows.time_s, rows.temperature_K, range.first + reaction.first, range.first + reaction.last, rows.rebuiltFrom)
  return {
    rows,
    measuredRows: usable.time_s.length,
    range,
    converted,
    told,
    steadiness: steadinessWhileReacting(usable, converted, told),
    window: windowUsed(rows, range, settings.window, told.programme.kind === 'constant-heating-rate'),
    heatingStart_K: rows.temperature_K[foundWhole(settings) ? range.first : mainHeating(rows.temperature_K).first] ?? Number.NaN,
    peak_K: peakTemperature(converted.curve),
    sampling: samplingOf(rows, range.first, converted.curve, usable.time_s.length / rows.time_s.length, info.label),
    ...startOfTheHold(told, converted),
  }
}

function steadinessWhileReacting(usable: UsableRows, { curve }: Converted, { programme }: ToldProgramme): Steadiness {
  if (usable.rebuiltFrom !== null) return unknownSteadiness
  const [from, to] = [curve.time_s[curve.reaction.first] ?? Number.NaN, curve.time_s[curve.reaction.last] ?? Number.NaN]
  const rows = { first: lowerBound(usable.time_s, from), last: Math.min(usable.time_s.length - 1, lowerBound(usable.time_s, to)) }
  return steadinessOf(usable.time_s, usable.temperature_K, rows, programme)
}

function startOfTheHold(
  { programme }: ToldProgramme,
  { curve: { time_s, temperature_K, conversion } }: Converted,
): Pick<ConvertedRun, 'holdStart_s' | 'conversionBeforeHold'> {
  if (programme.kind !== 'isothermal') return { holdStart_s: Number.NaN, conversionBeforeHold: Number.NaN }
  const row = startOfHold(temperature_K, { first: 0, last: temperature_K.length - 1 }, programme.temperature)
  return {
    holdStart_s: timeOfHold(time_s, temperature_K, programme.temperature),
    conversionBeforeHold: conversion[row] ?? Number.NaN,
  }
}

/** Whether the window that is found is all of the main heating. */
const foundWhole = ({ quantity, window }: ConversionSettings): boolean => window === null && quantity !== 'heat-flow'

/**
 * The conversion in the window that was set, or in the one found. That for a straight baseline begins and ends close to the peak, and where it cuts the peak short although
 * the record goes on, the wider one for tangents is taken.
 */
function convertedInWindow(
  rows: UsableRows,
  settings: ConversionSettings,
  label: string,
  checkCancelled: () => void,
): Pick<ConvertedRun, 'range' | 'converted'> {
  const range = rowsToUse(rows, settings, label)
  checkCancelled()
  try {
    return { range, converted: convert(rows, range, settings, label) }
  } catch (error) {
    const isFound = settings.window === null && settings.quantity === 'heat-flow' && settings.baseline === 'straight'
    if (!isFound || !(error instanceof KineticsError) || error.details['standingAtEnd'] === undefined) throw error
    const wider = findWindow(rows.time_s, rows.temperature_K, rows.signal, 'peak-with-tangents')
    if (wider.first === range.first && wider.last === range.last) throw error
    return { range: wider, converted: convert(rows, wider, settings, label) }
  }
}

function rowsToUse(rows: UsableRows, { quantity, window, baseline }: ConversionSettings, label: string): RowRange {
  if (window !== null) return rowsInWindow(rows.time_s, rows.temperature_K, window, label)
  const kind = quantity !== 'heat-flow' ? 'whole' : baseline === 'straight' ? 'peak-alone' : 'peak-with-tangents'
  return findWindow(rows.time_s, rows.temperature_K, rows.signal, kind)
}

function convert(rows: UsableRows, range: RowRange, { quantity, baseline }: ConversionSettings, label: string): Converted {
  const time_s = column(rows.time_s.subarray(range.first, range.last + 1), 's')
  const temperature_K = column(rows.temperature_K.subarray(range.first, range.last + 1), 'K')
  const signal = rows.signal.subarray(range.first, range.last + 1)
  switch (quantity) {
    case 'mass':
      return fromMass(time_s, temperature_K, signal, label)
    case 'conversion':
      return fromColumn(time_s, temperature_K, signal)
    case 'heat-release':
      return fromHeatRelease(time_s, temperature_K, signal, label)
    case 'heat-flow':
      return fromHeatFlow(time_s, temperature_K, signal, isHold(rows.temperature_K, range) ? 'level-at-end' : baseline, label)
  }
}

/** The window in the terms of the run's programme; the bounds that were set where they lie inside the run. */
function windowUsed(
  { time_s, temperature_K }: UsableRows,
  { first, last }: RowRange,
  asked: Window | null,
  inTemperature: boolean,
): Window {
  if (inTemperature) {
    const start_K = temperature_K[first] ?? Number.NaN
    const end_K = temperature_K[last] ?? Number.NaN
    if (asked?.kind !== 'temperature') return { kind: 'temperature', start_K, end_K }
    return { kind: 'temperature', start_K: first > 0 ? asked.start_K : start_K, end_K: last < time_s.length - 1 ? asked.end_K : end_K }
  }
  const start_s = time_s[first] ?? Number.NaN
  const end_s = time_s[last] ?? Number.NaN
  if (asked?.kind !== 'time') return { kind: 'time', start_s, end_s }
  return { kind: 'time', start_s: first > 0 ? asked.start_s : start_s, end_s: last < time_s.length - 1 ? asked.end_s : end_s }
}
