import type { RecentStudy } from '../../shared-kinetics/contract/host-api.ts'

/** What was changed a moment ago was not left: a page that is loaded again, another window, files named as the program was started. */
const leastAge_ms = 10 * 60_000

/** The stored study that is gone on with, where it holds something and was left some time ago; null where nobody could take it for a new one. */
export function continuedStudy(recent: readonly RecentStudy[], studyId: string | undefined, now: Date): RecentStudy | null {
  const stored = recent.find((study) => study.studyId === studyId)
  if (stored === undefined || (stored.runs === 0 && stored.rateConstants === 0)) return null
  return now.getTime() - new Date(stored.changedAt).getTime() >= leastAge_ms ? stored : null
}
