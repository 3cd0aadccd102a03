import type { SignalQuantity } from '../series/signal-quantity.ts'
import type { PeakRun } from './peak-run.ts'

const signalNames: Readonly<Record<SignalQuantity, string>> = {
  mass: 'the mass',
  conversion: 'a conversion column',
  'heat-release': 'the heat-release rate',
  'heat-flow': 'the heat flow',
}

/** What to know where a standard for DSC of exothermic reactions is used on another signal, or on heat flow of unknown direction. */
export function notByHeatFlow(signal: SignalQuantity, runs: readonly PeakRun[]): string[] {
  if (signal !== 'heat-flow') return [`The standard speaks of heat flow by DSC; this is its calculation, used on ${signalNames[signal]}.`]
  return runs.every((run) => run.heat === 'exothermic')
    ? []
    : ['The standard is made for exothermic reactions; the files do not say which way an exothermic event points.']
}
