import { stateInWords } from '#shared/checks/finding-words.ts'
import { useSuspenseQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { formatLongDay, formatMoment, startSentence } from '#console/lib/format.ts'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { useNarrow } from '#console/ui/window-size.ts'
import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'
import { breachQueries } from './breaches.queries.ts'
import { BreachSteps } from './breach-steps.tsx'
import { eventInWords, isMeasured, originInWords } from './breach-words.ts'

/** What happened to a breach: its ratio over time, who is on it, and each event with who and why. */
export function BreachHistory({
  system,
  id,
  tokenHref,
  handling,
  children,
}: {
  system: string
  id: string
  tokenHref: (name: string) => string
  /** Who is on it. */
  handling: (breach: BreachWire) => ReactNode
  /** The way to add to its history. */
  children: ReactNode
}) {
  const { data: breach } = useSuspenseQuery(breachQueries.one(system, id))
  const narrow = useNarrow()
  return (
    <div className="grid gap-x-44 gap-y-20 font-normal full:grid-cols-[620px_1fr]">
      <section>
        <h2 className="font-semibold">Since {formatLongDay(breach.firstSeenAt)}</h2>
        {!narrow && <BreachSteps breach={breach} events={breach.events} />}
        <Facts breach={breach} />
        <p className="mt-10 flex flex-wrap gap-x-28 gap-y-6">
          {[breach.foreground, breach.background].map((name) => (
            <Link key={name} to={tokenHref(name)} className="word-woad">
              Open {name}
            </Link>
          ))}
        </p>
        {handling(breach)}
      </section>
      <section className="border-feint full:border-l full:border-rule full:pl-44">
        <h2 className="font-semibold">History</h2>
        {children}
        <ol className="mt-12">
          {[...breach.events].reverse().map((event) => (
            <EventItem key={event.id} event={event} breach={breach} />
          ))}
        </ol>
      </section>
    </div>
  )
}

function Facts({ breach }: { breach: BreachWire }) {
  const { rendered, basis, use, lastSeenAt } = breach
  return (
    <p className="mt-10 max-w-620 text-13 text-ink-soft">
      {rendered.foreground} on {rendered.background} in {breach.theme}, {stateInWords(breach.state)}
      , as {use.replaceAll('-', ' ')}, measured in{' '}
      {basis === 'p3' ? 'Display P3, outside WCAG’s definition' : 'sRGB'}. Seen{' '}
      {originInWords(breach)}
      {lastSeenAt === null ? ', and it lasts.' : `, last ${formatMoment(lastSeenAt)}.`}
    </p>
  )
}

function EventItem({ event, breach }: { event: BreachEventWire; breach: BreachWire }) {
  const moment = startSentence(formatMoment(event.at))
  if (event.kind === 'commented') {
    return (
      <li className="border-b border-feint py-8">
        <p>
          <span className="font-semibold">{event.actor?.name ?? 'Somebody'}</span>{' '}
          <span className="text-13 text-ink-soft">{moment}</span>
        </p>
        <p className="max-w-640 break-words whitespace-pre-wrap">{event.body}</p>
      </li>
    )
  }
  return (
    <li className="border-b border-feint py-8">
      <p className="flex flex-wrap items-baseline justify-between gap-x-20">
        <span>
          <span className="font-medium">{eventInWords(event, breach)}</span>
          {event.revision !== undefined && ` in revision ${event.revision}`}
        </span>
        {isMeasured(event) && (
          <RatioColumns
            ratio={event.ratio}
            required={event.required}
            outcome={event.kind === 'resolved' ? 'pass' : 'breach'}
          />
        )}
      </p>
      <p className="text-13 text-ink-soft">
        {moment}
        {event.actor !== null && `, ${event.actor.name}`}
        {event.message !== undefined && `: ${event.message}`}
      </p>
    </li>
  )
}
