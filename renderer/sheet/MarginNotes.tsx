import { Button } from 'react-aria-components'
import type { Finding } from '../../shared-kinetics/contract/study-result.ts'
import { formatLevel } from './format.ts'

const severityWords = { stop: 'Stop', caution: 'Caution', note: 'Note' } as const

export const findingElementId = (finding: Finding, findings: readonly Finding[]): string => `finding-${findings.indexOf(finding)}`

/** Findings of this stage as notes in the margin. */
export function MarginNotes({
  findings,
  all,
  settled,
  onShow,
}: {
  readonly findings: readonly Finding[]
  readonly all: readonly Finding[]
  /** Whether the runs have been looked at yet. */
  readonly settled: boolean
  readonly onShow: (finding: Finding) => void
}) {
  // It scrolls, so it must be reached by keyboard (WCAG 2.1.1); a note that leads somewhere is reached anyhow.
  const isReached = findings.some((finding) => finding.run !== null || finding.level !== null)
  return (
    <aside className="margin" aria-labelledby="margin-title" tabIndex={isReached ? undefined : 0}>
      <h2 id="margin-title" className="margin-title">
        Findings on this stage
      </h2>
      {findings.length === 0 && <p className="margin-empty">{settled ? 'Nothing to remark.' : 'They follow with the results.'}</p>}
      <ul className="notes">
        {findings.map((finding, i) => {
          const id = findingElementId(finding, all)
          return (
            <li key={id} id={id} className={`note note-${finding.severity}`} tabIndex={-1}>
              <h3>
                <span className="severity">{severityWords[finding.severity]}</span> {finding.title}
              </h3>
              {isRepeat(findings, i) ? (
                <details>
                  <summary>the same in detail</summary>
                  <NoteText finding={finding} />
                </details>
              ) : (
                <NoteText finding={finding} />
              )}
              {(finding.run !== null || finding.level !== null) && (
                <Button className="link-button" onPress={() => onShow(finding)} aria-label={`${placeOf(finding)}: ${finding.title}`}>
                  {placeOf(finding)}
                </Button>
              )}
            </li>
          )
        })}
      </ul>
    </aside>
  )
}

/** Where a finding leads. */
function placeOf({ run, level }: Finding): string {
  const at = level === null ? '' : `α ${formatLevel(level)}`
  if (run === null) return `show ${at}`
  return at === '' ? 'show run' : `show run at ${at}`
}

/** What one run after another gets is read once; each further one shows its number and folds the rest. */
const isRepeat = (findings: readonly Finding[], i: number): boolean => findings[i]?.code === findings[i - 1]?.code

function NoteText({ finding }: { readonly finding: Finding }) {
  return (
    <>
      <p>{finding.message}</p>
      <p className="basis">{finding.basis}</p>
    </>
  )
}
