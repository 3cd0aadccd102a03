import { Button } from 'react-aria-components'
import { intervalRemarks } from '../../../shared-kinetics/figure/interval-status.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { useServices, useStudy } from '../../state/services.ts'
import { isStale } from '../../state/study-state.ts'
import { intervalQualities, shortKinds, type IntervalOffer, type ShownOfMethod } from './shown-interval.ts'

/** Which of the intervals is shown; what is not to be had says why. */
export function IntervalChoice({ shown }: { readonly shown: ShownOfMethod }) {
  const { view } = useServices()
  // The F-type interval belongs to minimising methods: with a line method it is no choice at all.
  const offers = shown.offers.filter(({ kind }) => kind !== 'vyazovkin-wight-f' || shown.profile.evidence === 'minimum')
  const refused = reasons(offers)
  return (
    <>
      <Choice
        label="Interval"
        options={offers.map(({ kind, reason }) => ({ id: kind, text: capital(shortKinds[kind]), refused: reason }))}
        value={shown.kind}
        onChange={(interval) => view.setState({ interval })}
      />
      {refused !== '' && <p className="choice-reasons">{refused}</p>}
    </>
  )
}

/** `Jackknife, bootstrap: needs four runs, here 3.` */
function reasons(offers: readonly IntervalOffer[]): string {
  const byReason = new Map<string, string[]>()
  for (const { kind, reason } of offers) {
    if (reason !== null) byReason.set(reason, [...(byReason.get(reason) ?? []), shortKinds[kind]])
  }
  return [...byReason].map(([reason, names]) => `${capital(names.join(', '))}: ${reason}.`).join(' ')
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

/** Names the interval for what it is. */
export function IntervalName({ shown }: { readonly shown: ShownOfMethod }) {
  const { profile, interval, kind } = shown
  if (interval !== null) {
    return (
      <>
        {interval.label}, {interval.kind === 'student-t' && `n − 2 degrees of freedom (${profile.interval.dof} here), `}
        {intervalQualities(interval)}.{interval.kind !== kind && ` ${capital(shortKinds[kind])}: not worked out yet.`}
      </>
    )
  }
  if (kind === 'student-t') return <>No interval: it needs runs at three distinct programmes or more.</>
  return <>{capital(shortKinds[kind])}: not worked out yet.</>
}

/** How the interval was made; the regression's own says it in its name. */
export function IntervalMaking({ shown: { interval } }: { readonly shown: ShownOfMethod }) {
  return interval === null || interval.kind === 'student-t' ? null : <p className="chart-note">{interval.note}</p>
}

/** At which levels the interval says less than its numbers do, or nothing, and why; what holds at the current level stands out. */
export function IntervalRemarks({
  shown: { interval },
  levels,
  levelIndex,
}: {
  readonly shown: ShownOfMethod
  readonly levels: readonly number[]
  readonly levelIndex: number
}) {
  const remarks = interval === null ? [] : intervalRemarks(interval.status, levels)
  if (remarks.length === 0) return null
  return (
    <ul className="interval-remarks" aria-label="Remarks on the interval">
      {remarks.map(({ at, levels: where, words }) => (
        <li key={words} className={at.includes(levelIndex) ? 'is-current' : undefined}>
          Interval at α {where}: {words}.
        </li>
      ))}
    </ul>
  )
}

/** The slow intervals on their way, or the way to have them worked out. Nothing stands here when they are there, or are there in a moment. */
export function UncertaintyWork() {
  const { session } = useServices()
  const work = useStudy((state) => state.uncertaintyWork)
  const isThere = useStudy(({ uncertain, evaluated }) => uncertain !== null && uncertain.about === evaluated)
  const isWaiting = useStudy((state) => state.evaluation.kind !== 'settled' || isStale(state))
  const what = 'intervals by resampling and from measured sources'
  if (work.kind === 'running') {
    const share = work.total > 0 ? `: ${Math.floor((100 * work.done) / work.total)} %` : ''
    return (
      <p className="quiet-work work-late">
        <span>
          Working out {what}
          {share}
        </span>
        <Button className="text-button" onPress={() => void session.uncertainty.cancel()}>
          Cancel
        </Button>
      </p>
    )
  }
  if (isThere || isWaiting) return null
  return (
    <p className="quiet-work">
      <span>{work.kind === 'failed' ? work.message : `${capital(what)} were not worked out.`}</span>
      <Button className="text-button" onPress={session.uncertainty.again}>
        Work out
      </Button>
    </p>
  )
}
