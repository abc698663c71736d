import type { ReactNode } from 'react'

export type MarkKind = 'breach' | 'waived' | 'exempt'

const WORD_STYLES = {
  breach: 'text-madder',
  waived: 'text-weld',
  exempt: 'text-ink-soft',
} as const

/** A mark beside its word: never one without the other. */
export function OutcomeMark({
  kind,
  calm = false,
  children,
}: {
  kind: MarkKind
  /** Where the whole list is made of breaches, the word need not shout. */
  calm?: boolean
  children: ReactNode
}) {
  return (
    <span
      className={`inline-flex items-baseline gap-7 ${WORD_STYLES[kind]} ${kind === 'breach' && !calm ? 'font-semibold' : 'font-normal'}`}
    >
      <MarkShape kind={kind} />
      <span>{children}</span>
    </span>
  )
}

function MarkShape({ kind }: { kind: MarkKind }) {
  return (
    <svg
      viewBox="0 0 12 12"
      width="12"
      height="12"
      aria-hidden="true"
      className="shrink-0 self-center overflow-visible"
    >
      {kind === 'breach' && (
        <path className="mark-shape fill-madder" d="M0 0h12v12H0v-2L5.5 6 0 2z" />
      )}
      {kind === 'waived' && (
        <circle
          className="mark-ring fill-none stroke-weld"
          cx="6"
          cy="6"
          r="5"
          strokeWidth="1.8"
          strokeDasharray="2.35 1.577"
        />
      )}
      {kind === 'exempt' && (
        <circle
          className="mark-ring fill-none stroke-ink-soft"
          cx="6"
          cy="6"
          r="5"
          strokeWidth="1.4"
        />
      )}
    </svg>
  )
}
