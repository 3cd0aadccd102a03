import type { HostEvent } from '../../shared-kinetics/contract/host-api.ts'

/** Whether something that came over an event stream is an event this version knows. */
export function isHostEvent(value: unknown): value is HostEvent {
  if (typeof value !== 'object' || value === null || !('kind' in value)) return false
  if (value.kind === 'study-changed') return 'revision' in value && typeof value.revision === 'number'
  if (value.kind === 'not-saved') return 'message' in value && typeof value.message === 'string'
  if (value.kind !== 'progress') return false
  return 'done' in value && typeof value.done === 'number' && 'total' in value && typeof value.total === 'number'
}
