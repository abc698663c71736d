import { type ReactNode, useState } from 'react'
import { Link } from 'react-router-dom'
import { WordButton } from '#console/ui/button.tsx'
import type { CoverageWire } from '#shared/contracts/coverage.contract.ts'

const SHOWN_AT_FIRST = 200

interface RowParts {
  readonly cellOf: (name: string) => ReactNode
  readonly href: (name: string) => string
  readonly declareHref: (name: string) => string
}

/** Tokens that stand in no pair, in ledger order, each with the way into one. */
export function UncoveredTable({
  tokens,
  ...parts
}: RowParts & { tokens: CoverageWire['uncovered'] }) {
  const [all, setAll] = useState(false)
  const shown = all ? tokens : tokens.slice(0, SHOWN_AT_FIRST)
  return (
    <>
      <div className="ledger">
        <table aria-label="Tokens in no pair">
          <thead>
            <tr>
              <th className="w-132 @max-[460px]:hidden">Colour</th>
              <th>Token</th>
              <th className="w-130 @max-[460px]:w-100">
                <span className="sr-only">Declare</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {shown.map((token) => (
              <UncoveredRow key={token.id} token={token} {...parts} />
            ))}
          </tbody>
        </table>
      </div>
      {shown.length < tokens.length && (
        <p className="py-16">
          <WordButton onClick={() => setAll(true)}>Show all {tokens.length}</WordButton>
        </p>
      )}
    </>
  )
}

function UncoveredRow({
  token: { name, deprecated },
  cellOf,
  href,
  declareHref,
}: RowParts & { token: CoverageWire['uncovered'][number] }) {
  return (
    <tr>
      <td className="row-start @max-[460px]:hidden">{cellOf(name)}</td>
      <td className="py-6! pr-12! break-words">
        <Link to={href(name)} className="font-medium">
          {name}
        </Link>
        {deprecated && <span className="text-ink-soft">, deprecated</span>}
      </td>
      <td className="text-end!">
        <Link to={declareHref(name)} className="word" aria-label={`Declare a pair with ${name}`}>
          Declare a pair
        </Link>
      </td>
    </tr>
  )
}
