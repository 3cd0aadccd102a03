import { useEffect } from 'react'
import { Button } from 'react-aria-components'

/** How long the word that something was done stays; what went wrong stays until it is dismissed. */
const doneStays_ms = 6000

export interface NoticeProps {
  readonly kind: 'failure' | 'done'
  readonly text: string
  readonly onDismiss: () => void
}

/** One sentence about what was done or what went wrong. What was done has a place at the foot of the margin, so that it covers nothing. */
export function Notice({ kind, text, onDismiss }: NoticeProps) {
  useEffect(() => {
    if (kind === 'failure') return
    const timer = setTimeout(onDismiss, doneStays_ms)
    return () => clearTimeout(timer)
  }, [kind, onDismiss])

  return (
    <div className={`notice notice-${kind}`} role={kind === 'failure' ? 'alert' : 'status'}>
      <p title={text}>{text}</p>
      <Button className="text-button" onPress={onDismiss}>
        Dismiss
      </Button>
    </div>
  )
}
