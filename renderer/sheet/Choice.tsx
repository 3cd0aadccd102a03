import type { ReactNode } from 'react'
import { ToggleButton, ToggleButtonGroup } from 'react-aria-components'

export interface ChoiceOption<Id extends string> {
  readonly id: Id
  readonly text: ReactNode
  /** The whole name where `text` is short for it. */
  readonly name?: string
  /** Why it cannot be chosen. */
  readonly refused?: string | null
}

/** One of a few, all in sight. */
export function Choice<Id extends string>({
  label,
  options,
  value,
  onChange,
}: {
  readonly label: string
  readonly options: readonly ChoiceOption<Id>[]
  readonly value: Id | null
  readonly onChange: (id: Id) => void
}) {
  return (
    <div className="choice">
      <span className="choice-label" aria-hidden="true">
        {label}
      </span>
      <ToggleButtonGroup
        className="choice-group"
        aria-label={label}
        selectionMode="single"
        disallowEmptySelection={value !== null}
        selectedKeys={value === null ? [] : [value]}
        onSelectionChange={(keys) => {
          const chosen = options.find((option) => keys.has(option.id))
          if (chosen !== undefined) onChange(chosen.id)
        }}
      >
        {options.map((option) => (
          <ToggleButton
            key={option.id}
            id={option.id}
            className="choice-option"
            isDisabled={(option.refused ?? null) !== null}
            {...nameOf(option)}
          >
            {option.text}
          </ToggleButton>
        ))}
      </ToggleButtonGroup>
    </div>
  )
}

/** Any of a few, all in sight. */
export function Choices<Id extends string>({
  label,
  options,
  values,
  onChange,
}: {
  readonly label: string
  readonly options: readonly ChoiceOption<Id>[]
  readonly values: readonly Id[]
  readonly onChange: (ids: readonly Id[]) => void
}) {
  return (
    <div className="choice">
      <span className="choice-label" aria-hidden="true">
        {label}
      </span>
      <ToggleButtonGroup
        className="choice-group"
        aria-label={label}
        selectionMode="multiple"
        selectedKeys={values}
        onSelectionChange={(keys) => onChange(options.map((option) => option.id).filter((id) => keys.has(id)))}
      >
        {options.map((option) => (
          <ToggleButton key={option.id} id={option.id} className="choice-option" {...nameOf(option)}>
            {option.text}
          </ToggleButton>
        ))}
      </ToggleButtonGroup>
    </div>
  )
}

const nameOf = (option: ChoiceOption<string>): { readonly 'aria-label'?: string } =>
  option.name === undefined ? {} : { 'aria-label': option.name }
