import { NavLink } from 'react-router-dom'
import type { Place } from './navigation.tsx'

/** Places within a place: words on the page's own ground, two px of ink under the present one. */
export function SubNavigation({ label, places }: { label: string; places: readonly Place[] }) {
  return (
    <nav aria-label={label}>
      <ul className="flex flex-wrap gap-x-28 gap-y-4 pt-14">
        {places.map(({ href, text, count }) => (
          <li key={href}>
            <NavLink
              to={href}
              className="flex min-h-26 items-center border-b-2 border-transparent text-ink-soft hover:text-ink aria-[current=page]:border-ink! aria-[current=page]:font-semibold aria-[current=page]:text-ink forced-colors:border-[Canvas] forced-colors:aria-[current=page]:border-[LinkText]!"
            >
              {text}
              {count !== undefined && <span className="ml-6 text-12 font-normal">{count}</span>}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  )
}
