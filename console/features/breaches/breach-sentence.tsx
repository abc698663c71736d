import { type ReactNode, useEffect, useState } from 'react'
import { Choice } from '#console/ui/choice.tsx'
import {
  AGE_CHOICES,
  type BreachFilter,
  ORIGIN_CHOICES,
  SORT_CHOICES,
  STATUS_CHOICES,
  USE_CHOICES,
} from './breach-filter.ts'

/** Somebody who may be on a breach. */
export interface Handler {
  readonly id: string
  readonly name: string
}

/** The filter of the log, as a sentence. */
export function BreachSentence({
  filter,
  themes,
  people,
  onChange,
  children,
}: {
  filter: BreachFilter
  themes: readonly string[]
  people: readonly Handler[]
  onChange: (filter: BreachFilter) => void
  children: ReactNode
}) {
  const put = (part: Partial<BreachFilter>) => onChange({ ...filter, ...part })
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
        onChange={(status) => put({ status })}
      />
      in
      <Choice
        label="Theme"
        value={filter.theme}
        options={themeChoices}
        onChange={(theme) => put({ theme })}
      />
      for
      <Choice
        label="Use"
        value={filter.use}
        options={USE_CHOICES}
        onChange={(use) => put({ use })}
      />
      <label htmlFor="breach-token">of</label>
      <TokenField token={filter.token} onChange={(token) => put({ token })} />
      with
      <Choice
        label="Assignee"
        value={filter.person}
        options={personChoices(people, filter.person)}
        onChange={(person) => put({ person })}
      />
      seen
      <Choice
        label="Where seen"
        value={filter.origin}
        options={ORIGIN_CHOICES}
        onChange={(origin) => put({ origin })}
      />
      first
      <Choice
        label="When seen first"
        value={filter.age}
        options={AGE_CHOICES}
        onChange={(age) => put({ age })}
      />
      <Choice
        label="Order"
        value={filter.sort}
        options={SORT_CHOICES}
        onChange={(sort) => put({ sort })}
      />
      <p role="status" className="w-full text-ink-soft full:ml-auto full:w-auto">
        {children}
      </p>
    </search>
  )
}

function personChoices(people: readonly Handler[], chosen: string) {
  const choices = [
    { value: 'anybody', text: 'anybody or nobody' },
    { value: 'me', text: 'me' },
    { value: 'none', text: 'nobody' },
    ...people.map(({ id, name }) => ({ value: id, text: name })),
  ]
  return choices.some(({ value }) => value === chosen)
    ? choices
    : [...choices, { value: chosen, text: 'somebody who is no member' }]
}

/** What is typed waits a little for the next letter before the log is asked. */
const PAUSE_MS = 250

/** Part of a name; it follows the address only while nobody writes. */
function TokenField({ token, onChange }: { token: string; onChange: (token: string) => void }) {
  const [written, setWritten] = useState<string>()
  useEffect(() => {
    if (written === undefined) return
    const pause = setTimeout(() => {
      if (written !== token) onChange(written)
    }, PAUSE_MS)
    return () => clearTimeout(pause)
  }, [written, token, onChange])
  return (
    <input
      id="breach-token"
      type="text"
      value={written ?? token}
      placeholder="any token"
      autoComplete="off"
      spellCheck={false}
      maxLength={120}
      onChange={(event) => setWritten(event.target.value)}
      onBlur={() => {
        if (written !== undefined && written !== token) onChange(written)
        setWritten(undefined)
      }}
      className="line-input w-130"
    />
  )
}
