import type { ReactNode } from 'react'
import { Choice } from '#console/ui/choice.tsx'
import { type BreachFilter, ORIGIN_CHOICES, SORT_CHOICES, STATUS_CHOICES } from './breach-filter.ts'

/** The filter of the log, as a sentence. */
export function BreachSentence({
  filter,
  themes,
  onChange,
  children,
}: {
  filter: BreachFilter
  themes: readonly string[]
  onChange: (filter: BreachFilter) => void
  children: ReactNode
}) {
  const themeChoices = [
    { value: 'all', text: 'all themes' },
    ...themes.map((theme) => ({ value: theme, text: theme })),
  ]
  return (
    <search className="flex min-h-48 flex-wrap items-center gap-x-8 gap-y-6 py-8">
      Breaches that are
      <Choice
        label="Status"
        value={filter.status}
        options={STATUS_CHOICES}
        onChange={(status) => onChange({ ...filter, status })}
      />
      in
      <Choice
        label="Theme"
        value={filter.theme}
        options={themeChoices}
        onChange={(theme) => onChange({ ...filter, theme })}
      />
      seen
      <Choice
        label="Where seen"
        value={filter.origin}
        options={ORIGIN_CHOICES}
        onChange={(origin) => onChange({ ...filter, origin })}
      />
      <Choice
        label="Order"
        value={filter.sort}
        options={SORT_CHOICES}
        onChange={(sort) => onChange({ ...filter, sort })}
      />
      <p role="status" className="w-full text-ink-soft full:ml-auto full:w-auto">
        {children}
      </p>
    </search>
  )
}
