import { stateInWords } from '#shared/checks/finding-words.ts'
import { useSuspenseQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { formatLongDay, formatMoment, startSentence } from '#console/lib/format.ts'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { useNarrow } from '#console/ui/window-size.ts'
import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'
import { breachQueries } from './breaches.queries.ts'
import { BreachSteps } from './breach-steps.tsx'
import { eventInWords, originInWords } from './breach-words.ts'

/** What happened to a breach: its ratio over time, and each event with who and why. */
export function BreachHistory({
  system,
  id,
  tokenHref,
}: {
  system: string
  id: string
  tokenHref: (name: string) => string
}) {
  const { data: breach } = useSuspenseQuery(breachQueries.one(system, id))
  const narrow = useNarrow()
  return (
    <div className="grid gap-x-44 gap-y-20 full:grid-cols-[620px_1fr]">
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
      </section>
      <section className="border-feint full:border-l full:border-rule full:pl-44">
        <h2 className="font-semibold">History</h2>
        <ol className="mt-8">
          {[...breach.events].reverse().map((event) => (
            <EventItem key={event.id} event={event} breach={breach} />
          ))}
        </ol>
      </section>
    </div>
  )
}

function Facts({ breach }: { breach: BreachWire }) {
  const { rendered, basis, kind, lastSeenAt } = breach
  return (
    <p className="mt-10 max-w-620 text-13 text-ink-soft">
      {rendered.foreground} on {rendered.background} in {breach.theme}, {stateInWords(breach.state)}
      , as {kind}, measured in {basis === 'p3' ? 'Display P3' : 'sRGB'}. Seen{' '}
      {originInWords(breach)}
      {lastSeenAt === null ? ', and it lasts.' : `, last ${formatMoment(lastSeenAt)}.`}
    </p>
  )
}

function EventItem({ event, breach }: { event: BreachEventWire; breach: BreachWire }) {
  return (
    <li className="border-b border-feint py-8">
      <p className="flex flex-wrap items-baseline justify-between gap-x-20">
        <span>
          <span className="font-medium">{eventInWords(event, breach)}</span>
          {event.revision !== undefined && ` in revision ${event.revision}`}
        </span>
        <RatioColumns
          ratio={event.ratio}
          required={event.required}
          outcome={event.kind === 'resolved' ? 'pass' : 'breach'}
        />
      </p>
      <p className="text-13 text-ink-soft">
        {startSentence(formatMoment(event.at))}
        {event.actor !== null && `, ${event.actor.name}`}
        {event.message !== undefined && `: ${event.message}`}
      </p>
    </li>
  )
}
