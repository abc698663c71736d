import { type ReactNode, useState } from 'react'
import { Link } from 'react-router-dom'
import { DyewrightMark } from './dyewright-mark.tsx'
import { useCompact } from './window-size.ts'

/** The first line of every page: the product, where one is, and the ways out. */
export function TopLine({
  home,
  where,
  person,
  role,
  signOut,
  children,
}: {
  home: string
  /** The system, where an opened thing has the title. */
  where?: ReactNode
  person: string
  role?: string | undefined
  signOut: ReactNode
  /** Links, as list items. */
  children: ReactNode
}) {
  const compact = useCompact()
  const [open, setOpen] = useState(false)
  return (
    <header className="flex min-h-44 flex-wrap items-center gap-x-14 wide:gap-x-28">
      <Link to={home} className="flex items-center gap-10 font-semibold">
        <DyewrightMark />
        Dyewright
      </Link>
      {where !== undefined && (
        <div className="min-w-0 truncate border-rule wide:border-l wide:pl-20">{where}</div>
      )}
      {compact && (
        <button
          type="button"
          aria-expanded={open}
          className="word ml-auto"
          onClick={() => setOpen(!open)}
        >
          Menu
        </button>
      )}
      {(!compact || open) && (
        <ul className="flex w-full flex-wrap items-center gap-x-28 gap-y-10 py-8 min-[901px]:ml-auto min-[901px]:w-auto min-[901px]:py-0">
          {children}
          <li>
            {person} {role !== undefined && <span className="text-ink-soft">{role}</span>}
          </li>
          <li>{signOut}</li>
        </ul>
      )}
    </header>
  )
}
