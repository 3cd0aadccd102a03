import { Button } from 'react-aria-components'
import { Notice } from '../sheet/Notice.tsx'
import { RefusedFiles } from '../sheet/RefusedFiles.tsx'
import { WorkStrip } from '../sheet/WorkStrip.tsx'
import { useServices, useStudy } from '../state/services.ts'
import type { Evaluation, ImportWork } from '../state/study-state.ts'

/** Between top line and halves: work under way, what was refused, what went wrong. Nothing stands here when there is nothing to say. */
export function Messages({ stale }: { readonly stale: boolean }) {
  const { session } = useServices()
  const importing = useStudy((state) => state.importing)
  const evaluation = useStudy((state) => state.evaluation)
  const refused = useStudy((state) => state.refused)
  const notice = useStudy((state) => state.notice)
  return (
    <div className="messages">
      {importing !== null && (
        <WorkStrip
          label={importLabel(importing)}
          done={importing.done}
          total={importing.total}
          onCancel={() => void session.cancelImport()}
        />
      )}
      {importing === null && <EvaluationMessage evaluation={evaluation} stale={stale} />}
      {refused.length > 0 && <RefusedFiles files={refused} onDismiss={session.dismissRefused} />}
      {notice?.kind === 'failure' && <Notice key={notice.text} kind={notice.kind} text={notice.text} onDismiss={session.dismissNotice} />}
    </div>
  )
}

/** What was just done: at the foot of the margin or, where that stands beneath the halves, on a line of its own at the foot of the stage. */
export function DoneNotice() {
  const { session } = useServices()
  const notice = useStudy((state) => state.notice)
  if (notice?.kind !== 'done') return null
  return <Notice key={notice.text} kind="done" text={notice.text} onDismiss={session.dismissNotice} />
}

function EvaluationMessage({ evaluation, stale }: { readonly evaluation: Evaluation; readonly stale: boolean }) {
  const { session } = useServices()
  switch (evaluation.kind) {
    case 'settled':
      return null
    case 'running':
      return (
        <div className="work-late">
          <WorkStrip
            label={evaluationLabel(evaluation, stale)}
            done={evaluation.done}
            total={evaluation.total}
            onCancel={() => void session.cancelEvaluation()}
          />
        </div>
      )
    case 'stopped':
    case 'failed':
      return (
        <div className="notice notice-failure" role="alert">
          <p>
            {evaluation.kind === 'stopped' ? 'The evaluation was stopped.' : evaluation.message}
            {stale && ' The numbers below belong to the study as it was before.'}
          </p>
          <Button className="text-button" onPress={session.evaluateAgain}>
            Evaluate again
          </Button>
        </div>
      )
  }
}

function importLabel(work: ImportWork): string {
  if (work.phase === 'sending') return `Taking in ${work.what}`
  return work.what === '' ? 'Reading the files' : `Reading ${work.what}`
}

function evaluationLabel(evaluation: Extract<Evaluation, { kind: 'running' }>, stale: boolean): string {
  const what = evaluation.what === '' ? 'Evaluating the runs' : `Evaluating: ${evaluation.what}`
  return stale ? `${what}. The numbers below belong to the study as it was before.` : what
}
