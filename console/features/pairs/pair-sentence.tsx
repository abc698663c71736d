import type { ReactNode } from 'react'
import { Choice } from '#console/ui/choice.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import { ORDER_CHOICES, OUTCOME_CHOICES, type PairFilter } from './pair-filter.ts'
import { USE_CHOICES } from './pair-words.ts'

const USES_OR_ANY = [{ value: 'any', text: 'any use' }, ...USE_CHOICES] as const

/** The filter of the pairs, as a sentence. */
export function PairSentence({
  filter,
  products,
  themes,
  tokens,
  onChange,
  children,
}: {
  filter: PairFilter
  products: readonly string[]
  themes: readonly string[]
  tokens: readonly string[]
  onChange: (filter: PairFilter) => void
  /** What was found, at the far end. */
  children: ReactNode
}) {
  return (
    <search className="flex min-h-48 flex-wrap items-center gap-x-8 gap-y-6 py-8">
      Pairs for
      <Choice
        label="Use"
        value={filter.use}
        options={USES_OR_ANY}
        onChange={(use) => onChange({ ...filter, use })}
      />
      of
      <Choice
        label="Product"
        value={filter.product}
        options={[
          { value: 'all', text: 'all products' },
          ...products.map((name) => ({ value: name, text: name })),
          { value: 'none', text: 'no product' },
        ]}
        onChange={(product) => onChange({ ...filter, product })}
      />
      with
      <NameBox
        label="Token"
        placeholder="any token"
        isLabelHidden
        value={filter.token}
        names={tokens}
        onChange={(token) => onChange({ ...filter, token })}
        className="w-180"
      />
      measured in
      <Choice
        label="Theme"
        value={filter.theme}
        options={[
          { value: 'all', text: 'all themes' },
          ...themes.map((key) => ({ value: key, text: key })),
        ]}
        onChange={(theme) => onChange({ ...filter, theme })}
      />
      <Choice
        label="Outcome"
        value={filter.outcome}
        options={OUTCOME_CHOICES}
        onChange={(outcome) => onChange({ ...filter, outcome })}
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
