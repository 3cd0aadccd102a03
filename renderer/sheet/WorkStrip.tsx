import { Button, Label, ProgressBar } from 'react-aria-components'

/** Long work: what it is, how far it is, and the way to stop it. */
export function WorkStrip({
  label,
  done,
  total,
  onCancel,
}: {
  readonly label: string
  readonly done: number
  readonly total: number
  readonly onCancel: () => void
}) {
  const known = total > 0
  return (
    <div className="work-strip">
      <ProgressBar className="progress" value={done} maxValue={known ? total : 1} isIndeterminate={!known}>
        {({ percentage }) => (
          <>
            <Label>{label}</Label>
            <span className="progress-track">
              <span
                className={known ? 'progress-done' : 'progress-done is-unknown'}
                style={known ? { width: `${percentage ?? 0}%` } : undefined}
              />
            </span>
          </>
        )}
      </ProgressBar>
      <Button className="text-button" onPress={onCancel}>
        Cancel
      </Button>
    </div>
  )
}
