import type { ReactNode } from 'react'

/** While something is fetched: what is being fetched, and a line that is still being drawn. */
export function Waiting({ children }: { children: ReactNode }) {
  return (
    <div role="status" className="py-24">
      <p className="text-ink-soft">{children}</p>
      <div aria-hidden="true" className="mt-10 h-2 w-240 max-w-full overflow-hidden bg-feint">
        <div className="waiting-line h-2 w-1/4 bg-ink-soft" />
      </div>
    </div>
  )
}

/** Where a list has nothing to show, and what to do about it. */
export function NothingHere({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="max-w-560 py-32">
      <p className="text-16 font-semibold">{title}</p>
      {children !== undefined && <div className="mt-6 text-ink-soft">{children}</div>}
    </div>
  )
}

/** What went wrong, plainly, with the ways on. */
export function Trouble({
  title,
  children,
  level = 'h2',
}: {
  title: string
  children?: ReactNode
  level?: 'h1' | 'h2'
}) {
  const Heading = level
  return (
    <div role="alert" className="max-w-560 border-y border-ink py-20">
      <Heading className="text-16 font-semibold">{title}</Heading>
      {children !== undefined && <div className="mt-6 space-y-10 text-ink">{children}</div>}
    </div>
  )
}
