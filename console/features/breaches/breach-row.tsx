import { stateInWords } from '#shared/checks/finding-words.ts'
import { Link, useNavigate } from 'react-router-dom'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import type { RowLinkProps } from '#console/ui/row-walk.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import type { BreachColumns } from './breach-columns.ts'
import { BreachStatus } from './breach-status.tsx'
import { asideInWords, firstSeenInWords, outcomeOf } from './breach-words.ts'

export interface BreachRowProps {
  readonly breach: BreachWire
  /** Where the row leads: to the opened breach, or back where it is open. */
  readonly href: string
  readonly link: RowLinkProps
  readonly isOpened: boolean
}

export function BreachRow({ columns, ...row }: BreachRowProps & { columns: BreachColumns }) {
  const { breach, href, isOpened } = row
  const navigate = useNavigate()
  return (
    <tr
      data-opens
      data-opened={isOpened || undefined}
      onClick={(event) => {
        if (!(event.target instanceof HTMLAnchorElement)) {
          void navigate(href, { preventScrollReset: true })
        }
      }}
    >
      <td className="row-start number figures font-normal! text-ink-soft">{breach.number}</td>
      <td>
        <span className="block pl-16">
          <PairSample {...breach.rendered} breaches={breach.status === 'open'} />
        </span>
      </td>
      <td>
        <BreachLink {...row} />
        <BreachAside breach={breach} />
      </td>
      {columns.where && (
        <td className="truncate font-normal! text-ink-soft">
          {breach.theme}, {stateInWords(breach.state)}
        </td>
      )}
      <td>
        <span className="flex justify-end pr-6 font-normal">
          <RatioColumns
            ratio={breach.ratio}
            required={breach.required}
            outcome={outcomeOf(breach)}
          />
        </span>
      </td>
      {columns.firstSeen && (
        <td className="figures truncate font-normal! text-ink-soft">
          <span className="pl-16">{firstSeenInWords(breach)}</span>
        </td>
      )}
      <td>
        <BreachStatus breach={breach} />
      </td>
      {columns.assignee && (
        <td className="truncate font-normal! text-ink-soft">{breach.assignee?.name}</td>
      )}
    </tr>
  )
}

/** Where it was seen beside the head, and that it is short in Display P3. */
export function BreachAside({ breach }: { breach: BreachWire }) {
  const words = asideInWords(breach)
  return (
    words !== undefined && (
      <span className="block pr-10 pb-4 text-12 font-normal break-words text-ink-soft">
        {words}
      </span>
    )
  )
}

/** The pair in words; it opens the row, or closes it. */
export function BreachLink({ breach, href, link, isOpened }: BreachRowProps) {
  return (
    <Link
      to={href}
      preventScrollReset
      {...link}
      aria-expanded={isOpened}
      aria-label={`Breach ${breach.number}: ${breach.foreground} on ${breach.background}`}
      className="block py-6 pr-10 break-words wide:py-1 wide:leading-18"
    >
      <span className={isOpened ? 'font-semibold' : 'font-medium'}>{breach.foreground}</span>
      {' on '}
      <span className={isOpened ? 'font-semibold' : ''}>{breach.background}</span>
    </Link>
  )
}
