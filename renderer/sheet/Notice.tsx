import { Button } from 'react-aria-components'

/** One sentence about what was done or what went wrong, until it is dismissed. */
export function Notice({
  kind,
  text,
  onDismiss,
}: {
  readonly kind: 'failure' | 'done'
  readonly text: string
  readonly onDismiss: () => void
}) {
  return (
    <div className={`notice notice-${kind}`} role={kind === 'failure' ? 'alert' : 'status'}>
      <p>{text}</p>
      <Button className="text-button" onPress={onDismiss}>
        Dismiss
      </Button>
    </div>
  )
}
