import type { ReactNode } from 'react'
import { Link, NavLink } from 'react-router-dom'

export interface Place {
  readonly href: string
  readonly text: string
  readonly count?: number
  /** Whether the present page is one of several that stand under it. */
  readonly holdsPage?: boolean
}

const PLACE =
  'flex h-40 items-center border-b-4 border-transparent pt-2 forced-colors:border-[Canvas] text-ink-soft hover:text-ink aria-[current]:border-ink! forced-colors:aria-[current]:border-[LinkText]! aria-[current]:font-semibold aria-[current]:text-ink'

/** The places of a system, over one ink line; four px of ink under the present one. */
export function Navigation({
  label,
  places,
  children,
}: {
  label: string
  places: readonly Place[]
  /** Actions of the page, at the far end. */
  children?: ReactNode
}) {
  return (
    <div className="flex flex-wrap items-end justify-between gap-x-28 border-b border-ink">
      <nav aria-label={label}>
        <ul className="-mb-1 flex flex-wrap gap-x-30">
          {places.map((place) => (
            <li key={place.href}>
              <PlaceLink {...place} />
            </li>
          ))}
        </ul>
      </nav>
      {children !== undefined && <div className="flex items-center gap-x-22 pb-8">{children}</div>}
    </div>
  )
}

function PlaceLink({ href, text, count, holdsPage = false }: Place) {
  const words = (
    <>
      {text}
      {count !== undefined && <span className="ml-6 text-12 font-normal">{count}</span>}
    </>
  )
  return holdsPage ? (
    <Link to={href} aria-current="true" className={PLACE}>
      {words}
    </Link>
  ) : (
    <NavLink to={href} className={PLACE}>
      {words}
    </NavLink>
  )
}
