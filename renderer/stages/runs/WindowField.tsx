import { useEffect, useRef, useState } from 'react'
import { Button, Input, Label, TextField } from 'react-aria-components'
import type { Window } from '../../../shared-kinetics/contract/study-result.ts'
import { formatWindow } from '../../sheet/format.ts'
import { parseWindow } from '../../sheet/parse-window.ts'

/** The window of all runs: found in the data, or set here. */
export function WindowField({ window, onSet }: { readonly window: Window | null; readonly onSet: (window: Window | null) => void }) {
  const [editing, setEditing] = useState(false)
  const [ends, setEnds] = useState<readonly [string, string]>(['', ''])
  const firstRef = useRef<HTMLInputElement>(null)
  const [reason, setReason] = useState<string | null>(null)

  useEffect(() => {
    if (editing) firstRef.current?.focus()
  }, [editing])

  const save = (): void => {
    const parsed = parseWindow(ends[0], ends[1])
    if (!parsed.ok) {
      setReason(parsed.reason)
      return
    }
    setReason(null)
    setEditing(false)
    onSet(parsed.value)
  }

  if (!editing) {
    return (
      <div className="choice">
        <span className="choice-label">Window</span>
        <span className="window-text">{window === null ? 'found in the data' : formatWindow(window)}</span>
        <Button className="link-button" onPress={() => setEditing(true)}>
          {window === null ? 'Set window…' : 'Change window…'}
        </Button>
        {window !== null && (
          <Button className="link-button" onPress={() => onSet(null)}>
            Find in the data
          </Button>
        )}
      </div>
    )
  }
  return (
    <form
      className="window-form"
      onSubmit={(event) => {
        event.preventDefault()
        save()
      }}
    >
      <TextField className="typed-field" value={ends[0]} onChange={(start) => setEnds([start, ends[1]])}>
        <Label>Window from</Label>
        <Input placeholder="e.g. 150 C" ref={firstRef} />
      </TextField>
      <TextField className="typed-field" value={ends[1]} onChange={(end) => setEnds([ends[0], end])}>
        <Label>to</Label>
        <Input placeholder="e.g. 700 K" />
      </TextField>
      <Button className="button" type="submit">
        Set
      </Button>
      <Button
        className="text-button"
        onPress={() => {
          setReason(null)
          setEditing(false)
        }}
      >
        Leave as it is
      </Button>
      {reason !== null && (
        <p className="field-error" role="alert">
          {reason}
        </p>
      )}
    </form>
  )
}
