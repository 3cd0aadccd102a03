/**
 * Makes a mutable draft equal to `target` by touching only what differs, so that the patches recorded on the way stay small.
 * Lists of another length are replaced as a whole: patches by index would name every run behind the one removed.
 */
export function reconcile(draft: object, target: object): void {
  const into = draft as Record<string, unknown>
  const from = target as Readonly<Record<string, unknown>>
  for (const key of Object.keys(into)) if (!(key in from)) delete into[key]
  for (const key of Object.keys(from)) {
    const now = into[key]
    const next = from[key]
    if (Object.is(now, next)) continue
    if (isObject(now) && isObject(next) && isSameShape(now, next)) reconcile(now, next)
    else into[key] = next
  }
}

const isObject = (value: unknown): value is object => typeof value === 'object' && value !== null

function isSameShape(now: object, next: object): boolean {
  if (Array.isArray(now) || Array.isArray(next)) return Array.isArray(now) && Array.isArray(next) && now.length === next.length
  return true
}
