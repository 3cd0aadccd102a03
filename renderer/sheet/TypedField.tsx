import { Fragment, useRef, useState, type ReactNode } from 'react'
import { FieldError, Input, Label, TextArea, TextField } from 'react-aria-components'
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
  wraps = false,
  countsUnchanged = false,
  parse,
  onCommit,
}: {
  readonly label: string
  readonly hideLabel?: boolean
  /** What stands in the field as long as nobody types. */
  readonly text: string
  readonly placeholder?: string
  /** Long text goes on in further lines instead of being cut. */
  readonly wraps?: boolean
  /** Typing what stands there already says something, as where it was only assumed. */
  readonly countsUnchanged?: boolean
  readonly parse: (text: string) => Parsed<T>
  readonly onCommit: (value: T) => void
}) {
  const [draft, setDraft] = useState<string | null>(null)
  const [reason, setReason] = useState<string | null>(null)

  // React tells of no change where the same text is put over itself.
  const isTypedRef = useRef(false)

  const commit = (): void => {
    const isUnchanged = draft === null || draft.trim() === text.trim()
    if (isUnchanged && !(countsUnchanged && isTypedRef.current)) {
      revert()
      return
    }
    const parsed = parse(draft ?? text)
    if (!parsed.ok) {
      setReason(parsed.reason)
      return
    }
    revert()
    onCommit(parsed.value)
  }

  const revert = (): void => {
    isTypedRef.current = false
    setDraft(null)
    setReason(null)
  }

  return (
    <TextField
      className={wraps ? 'typed-field is-wrapping' : 'typed-field'}
      {...(hideLabel ? { 'aria-label': label } : {})}
      value={draft ?? text}
      isInvalid={reason !== null}
      validationBehavior="aria"
      onChange={setDraft}
      onInput={() => {
        isTypedRef.current = true
      }}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') {
          // In a field of several lines it would begin a new one.
          if (wraps) event.preventDefault()
          commit()
        } else if (event.key === 'Escape') revert()
        else event.continuePropagation()
      }}
    >
      {!hideLabel && <Label>{label}</Label>}
      {wraps ? (
        <>
          {/* The copy gives the field the size of its text, and is what is seen while nobody types: it can break after an underscore. */}
          <span className="typed-field-size" aria-hidden="true">
            {breakable(draft ?? text)}
          </span>
          <TextArea placeholder={placeholder} rows={1} />
        </>
      ) : (
        <Input placeholder={placeholder} />
      )}
      <FieldError className="field-error">{reason}</FieldError>
    </TextField>
  )
}

/** A text that may break after the marks by which file names are put together. */
function breakable(text: string): ReactNode {
  return text.split(/(?<=[_.-])/).map((part, i) => (
    // oxlint-disable-next-line react/no-array-index-key -- parts of a text have no other name
    <Fragment key={i}>
      {i > 0 && <wbr />}
      {part}
    </Fragment>
  ))
}
