import { useState } from 'react'
import { FieldError, Input, Label, TextField } from 'react-aria-components'
import type { Parsed } from '../../shared-kinetics/units/parse-quantity.ts'

/**
 * A field that takes a quantity as people type it. What is typed counts on Enter or when the field is left; Escape takes it back; what cannot
 * be meant stays in the field with the reason beneath it.
 */
export function TypedField<T>({
  label,
  hideLabel = false,
  text,
  placeholder = '',
  parse,
  onCommit,
}: {
  readonly label: string
  readonly hideLabel?: boolean
  /** What stands in the field as long as nobody types. */
  readonly text: string
  readonly placeholder?: string
  readonly parse: (text: string) => Parsed<T>
  readonly onCommit: (value: T) => void
}) {
  const [draft, setDraft] = useState<string | null>(null)
  const [reason, setReason] = useState<string | null>(null)

  const commit = (): void => {
    if (draft === null || draft.trim() === text.trim()) {
      revert()
      return
    }
    const parsed = parse(draft)
    if (!parsed.ok) {
      setReason(parsed.reason)
      return
    }
    revert()
    onCommit(parsed.value)
  }

  const revert = (): void => {
    setDraft(null)
    setReason(null)
  }

  return (
    <TextField
      className="typed-field"
      {...(hideLabel ? { 'aria-label': label } : {})}
      value={draft ?? text}
      isInvalid={reason !== null}
      validationBehavior="aria"
      onChange={setDraft}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') commit()
        else if (event.key === 'Escape') revert()
        else event.continuePropagation()
      }}
    >
      {!hideLabel && <Label>{label}</Label>}
      <Input placeholder={placeholder} />
      <FieldError className="field-error">{reason}</FieldError>
    </TextField>
  )
}
