import { Link } from 'react-router-dom'
import { Choice } from '#console/ui/choice.tsx'
import { STATES } from '#shared/checks/model.ts'
import { SHEET_ORDERS, SHEET_USES, type SheetView } from './sheet-view.ts'

/** Theme, state and use of the sheet, each a place of its own; and its order. */
export function SheetChoices({
  view,
  themes,
  products,
  href,
  onChange,
}: {
  view: SheetView
  themes: readonly string[]
  products: readonly string[]
  href: (view: SheetView) => string
  onChange: (view: SheetView) => void
}) {
  return (
    <search className="flex min-h-48 flex-wrap items-center gap-x-36 gap-y-6 py-8 print:hidden">
      <Words
        label="Theme"
        words={themes}
        current={view.theme}
        href={(theme) => href({ ...view, theme })}
      />
      <Words
        label="State"
        words={STATES}
        current={view.state}
        href={(state) => href({ ...view, state })}
      />
      <Words
        label="Use"
        words={SHEET_USES}
        current={view.use}
        href={(use) => href({ ...view, use })}
      />
      <span className="flex flex-wrap items-baseline gap-x-8 gap-y-4 full:ml-auto">
        Backgrounds
        <Choice
          label="Order"
          value={view.order}
          options={SHEET_ORDERS}
          onChange={(order) => onChange({ ...view, order })}
        />
        of
        <Choice
          label="Product"
          value={view.product}
          options={[
            { value: 'all', text: 'all products' },
            ...products.map((name) => ({ value: name, text: name })),
          ]}
          onChange={(product) => onChange({ ...view, product })}
        />
      </span>
    </search>
  )
}

/** Words of which one is current: each is an address, so that a view can be kept and sent. */
function Words<Word extends string>({
  label,
  words,
  current,
  href,
}: {
  label: string
  words: readonly Word[]
  current: Word
  href: (word: Word) => string
}) {
  return (
    <nav aria-label={label} className="flex flex-wrap items-baseline gap-x-16">
      <span className="text-ink-soft">{label}</span>
      {words.map((word) => (
        <Link
          key={word}
          to={href(word)}
          replace
          preventScrollReset
          aria-current={word === current ? 'true' : undefined}
          className="flex min-h-26 items-center border-b-2 border-transparent text-ink-soft hover:text-ink aria-[current]:border-ink aria-[current]:font-semibold aria-[current]:text-ink forced-colors:border-[Canvas] forced-colors:aria-[current]:border-[LinkText]"
        >
          {word}
        </Link>
      ))}
    </nav>
  )
}
