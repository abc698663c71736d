import type { ReactNode } from 'react'

/** One setting: what it is, its words to choose or write, and who may change it. */
export function Setting({
  title,
  who,
  fault,
  children,
}: {
  title: string
  who: string
  fault?: string | undefined
  children: ReactNode
}) {
  return (
    <div className="grid gap-x-36 gap-y-6 border-b border-feint py-14 wide:grid-cols-[160px_1fr] full:grid-cols-[200px_1fr_300px]">
      <h2 className="font-semibold">{title}</h2>
      <div className="min-w-0">
        {children}
        {fault !== undefined && <p className="mt-4 text-13 font-semibold text-madder">{fault}</p>}
      </div>
      <p className="text-13 text-ink-soft wide:col-start-2 full:col-start-3">{who}</p>
    </div>
  )
}
