import type { ReactNode, RefObject } from 'react'
import { Choice } from '#console/ui/choice.tsx'
import { NameField } from './name-field.tsx'
import { MARK_CHOICES, ORDER_CHOICES, type TokenFilter } from './token-filter.ts'

/** The filter of the ledger, as a sentence. */
export function TokenSentence({
  filter,
  groups,
  themes,
  field,
  onChange,
  children,
}: {
  filter: TokenFilter
  groups: readonly string[]
  themes: readonly string[]
  field: RefObject<HTMLInputElement | null>
  onChange: (filter: TokenFilter) => void
  /** What was found, at the far end. */
  children: ReactNode
}) {
  const choices = (all: string, names: readonly string[]) => [
    { value: 'all', text: all },
    ...names.map((name) => ({ value: name, text: name })),
  ]
  return (
    <search className="flex min-h-48 flex-wrap items-center gap-x-8 gap-y-6 py-8">
      <label htmlFor="find">Tokens named</label>
      <NameField
        named={filter.named}
        field={field}
        onChange={(named) => onChange({ ...filter, named })}
      />
      in
      <Choice
        label="Group"
        value={filter.group}
        options={choices('all groups', groups)}
        onChange={(group) => onChange({ ...filter, group })}
      />
      with
      <Choice
        label="Mark"
        value={filter.mark}
        options={MARK_CHOICES}
        onChange={(mark) => onChange({ ...filter, mark })}
      />
      measured in
      <Choice
        label="Theme"
        value={filter.theme}
        options={choices('all themes', themes)}
        onChange={(theme) => onChange({ ...filter, theme })}
      />
      in
      <Choice
        label="Order"
        value={filter.order}
        options={ORDER_CHOICES}
        onChange={(order) => onChange({ ...filter, order })}
      />
      <p role="status" className="w-full text-ink-soft full:ml-auto full:w-auto">
        {children}
      </p>
    </search>
  )
}
