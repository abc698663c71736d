import type { ReactNode } from 'react'

/** A write that was not taken: what is wrong, in sentences, and the way on. What was typed stays. */
export function RefusalNote({
  title,
  details = [],
  children,
}: {
  title: string
  details?: readonly string[]
  children?: ReactNode
}) {
  return (
    <div role="alert" className="mt-14 border-t border-ink pt-10">
      <p className="font-semibold">{title}</p>
      {details.length > 0 && (
        <ul className="mt-2 max-w-640">
          {details.map((detail) => (
            <li key={detail}>{detail}</li>
          ))}
        </ul>
      )}
      {children !== undefined && children !== false && <div className="mt-4">{children}</div>}
    </div>
  )
}
