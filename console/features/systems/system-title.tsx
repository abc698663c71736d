import { countOf } from '#shared/checks/finding-words.ts'
import { Link } from 'react-router-dom'
import { formatMoment, startSentence } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import type { SystemWire } from '#shared/contracts/systems.contract.ts'

/** The title of a list page: the system's key, large, and where it stands. */
export function SystemTitle({ system, breaches }: { system: SystemWire; breaches: string }) {
  const { counts, head, latestRelease } = system
  return (
    <div className="flex min-h-62 flex-wrap items-start gap-x-36 gap-y-4 pt-6 pb-8">
      <h1 className="large-name mt-2 min-w-0 break-words" title={system.name}>
        {system.key}
      </h1>
      <div className="min-w-0">
        <p>
          Head is revision {head.revision}, made {formatMoment(head.at)}
          {head.author !== null && ` by ${head.author.name}`}.
          {latestRelease !== null && ` Latest release ${latestRelease}.`}
        </p>
        <p>
          {counts.openBreaches === 0 ? (
            <span className="text-ink-soft">No breach is open</span>
          ) : (
            <Link to={breaches} className="hover:underline hover:decoration-madder">
              <OutcomeMark kind="breach">
                {startSentence(countOf(counts.openBreaches, 'breach', 'breaches'))} open
              </OutcomeMark>
            </Link>
          )}
        </p>
      </div>
    </div>
  )
}

/** The same in the top line, where an opened thing has the title. */
export function SystemName({ system, href }: { system: SystemWire; href: string }) {
  return (
    <>
      <Link to={href} className="font-semibold hover:underline">
        {system.key}
      </Link>
      <span className="ml-12 hidden text-ink-soft wide:inline">
        revision {system.head.revision}
        {system.latestRelease !== null && `, release ${system.latestRelease}`}
      </span>
    </>
  )
}
