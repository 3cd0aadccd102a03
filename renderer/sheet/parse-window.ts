import type { Window } from '../../shared-kinetics/contract/study-result.ts'
import { parseTemperature, parseTime, type Parsed } from '../../shared-kinetics/units/parse-quantity.ts'

const namesTime = /(s|sec|min|h|hr|d)\s*$/i

/** A window from its two ends as typed: temperatures (°C where no unit stands) or, each with its unit, times. */
export function parseWindow(start: string, end: string): Parsed<Window> {
  const times = [start, end].map((text) => namesTime.test(text))
  if (times[0] !== times[1]) return { ok: false, reason: 'Give both ends in temperature (250 C) or both in time (12 min).' }
  return times[0] === true
    ? timeWindow(parseTime(start), parseTime(end))
    : temperatureWindow(parseTemperature(start), parseTemperature(end))
}

function timeWindow(start: Parsed<number>, end: Parsed<number>): Parsed<Window> {
  if (!start.ok) return start
  if (!end.ok) return end
  return end.value > start.value ? { ok: true, value: { kind: 'time', start_s: start.value, end_s: end.value } } : notAbove
}

function temperatureWindow(start: Parsed<number>, end: Parsed<number>): Parsed<Window> {
  if (!start.ok) return start
  if (!end.ok) return end
  return end.value > start.value ? { ok: true, value: { kind: 'temperature', start_K: start.value, end_K: end.value } } : notAbove
}

const notAbove: Parsed<Window> = { ok: false, reason: 'The end must lie above the start.' }
