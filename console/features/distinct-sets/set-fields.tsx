import type { ReactNode } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import type { SetDraft } from './set-draft.ts'

/** The name of a set and its tokens, each to be taken away, and one more to be added. */
export function SetFields({
  draft,
  names,
  cellOf,
  faults,
  onChange,
}: {
  draft: SetDraft
  /** Of every token there is. */
  names: readonly string[]
  cellOf: (name: string) => ReactNode
  faults: { readonly name: string | undefined; readonly tokens: string | undefined }
  onChange: (draft: SetDraft) => void
}) {
  const { tokens } = draft
  const add = (name: string) => {
    if (names.includes(name) && !tokens.includes(name)) {
      onChange({ ...draft, tokens: [...tokens, name] })
    }
  }
  return (
    <>
      <LineField
        label="Name of the set"
        value={draft.name}
        maxLength={120}
        autoComplete="off"
        fault={faults.name}
        onChange={(event) => onChange({ ...draft, name: event.target.value })}
        className="w-full wide:w-300"
      />
      <ul aria-label="Tokens of the set" className="mt-12 max-w-560">
        {tokens.map((name) => (
          <li
            key={name}
            className="flex min-h-38 flex-wrap items-center gap-x-16 gap-y-4 border-b border-feint py-4"
          >
            {cellOf(name)}
            <span className="min-w-0 flex-1 font-medium break-words">{name}</span>
            <WordButton
              aria-label={`Take ${name} away`}
              onClick={() => onChange({ ...draft, tokens: tokens.filter((one) => one !== name) })}
            >
              Take away
            </WordButton>
          </li>
        ))}
      </ul>
      <NameBox
        key={tokens.length}
        label="Add a token"
        value=""
        names={names.filter((name) => !tokens.includes(name))}
        fault={faults.tokens}
        onChange={add}
        className="mt-12 w-full wide:w-300"
      />
    </>
  )
}
