import type { Finding, Severity } from '../../shared-kinetics/contract/study-result.ts'

/**
 * The finding that a count leads to: from one to the next of its severity, and round. It begins with the first that stands on the stage one is on, so that nobody is taken
 * away from it while it has one.
 *
 * @param last - where the count led before; it counts only while it still stands on this stage
 * @param isHere - whether a finding stands on the stage one is on
 */
export function nextFinding(
  findings: readonly Finding[],
  severity: Severity,
  last: Finding | null,
  isHere: (finding: Finding) => boolean,
): Finding | null {
  const same = findings.filter((finding) => finding.severity === severity)
  const at = last === null || !isHere(last) ? -1 : same.indexOf(last)
  if (at < 0) return same.find(isHere) ?? same[0] ?? null
  return same[(at + 1) % same.length] ?? null
}
