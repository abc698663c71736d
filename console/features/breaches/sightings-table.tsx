import { Link } from 'react-router-dom'
import { formatDay } from '#console/lib/format.ts'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { countOf, stateInWords } from '#shared/checks/finding-words.ts'
import type { SightingWire } from '#shared/contracts/sightings.contract.ts'

/** What pipelines found short: one row a repository, branch and identity. */
export function SightingsTable({
  sightings,
  breachHref,
}: {
  sightings: readonly SightingWire[]
  breachHref: (id: string) => string
}) {
  return (
    <div className="ledger">
      <table aria-label="Seen in CI">
        <thead>
          <tr>
            <th className="w-108 @max-[760px]:hidden">Seen as</th>
            <th>Pair</th>
            <th className="w-[20%] @max-[900px]:hidden">Branch</th>
            <th className="w-122">
              <span className="block w-64 text-end">Ratio</span>
            </th>
            <th className="w-200 @max-[1060px]:hidden">Seen</th>
            <th className="w-110 @max-[560px]:hidden">In the log</th>
          </tr>
        </thead>
        <tbody>
          {sightings.map((sighting) => (
            <SightingRow
              key={`${sighting.repository} ${sighting.branch} ${sighting.fingerprint}`}
              sighting={sighting}
              breachHref={breachHref}
            />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function SightingRow({
  sighting,
  breachHref,
}: {
  sighting: SightingWire
  breachHref: (id: string) => string
}) {
  const { breach } = sighting
  const log =
    breach === undefined ? (
      <span className="text-ink-soft">no entry</span>
    ) : (
      <Link to={breachHref(breach.id)} className="word">
        Breach {breach.number}
      </Link>
    )
  return (
    <tr>
      <td className="row-start @max-[760px]:hidden">
        <PairSample {...sighting.rendered} breaches />
      </td>
      <td className="py-6! pr-12! break-words">
        <span className="font-medium">{sighting.foreground}</span> on {sighting.background}
        <span className="block text-13 text-ink-soft">
          {sighting.theme}, {stateInWords(sighting.state)}
          {sighting.basis === 'p3' && ', in Display P3'}
          {!sighting.gating && ', reported only'}
        </span>
        <span className="hidden text-13 text-ink-soft @max-[900px]:block">
          <BranchWords sighting={sighting} />
        </span>
        <span className="hidden text-13 text-ink-soft @max-[1060px]:block">
          {seenInWords(sighting)}
        </span>
        <span className="hidden text-13 @max-[560px]:block">{log}</span>
      </td>
      <td className="py-6! pr-12! break-words @max-[900px]:hidden">
        <BranchWords sighting={sighting} />
      </td>
      <td>
        <RatioColumns ratio={sighting.ratio} required={sighting.required} outcome="breach" />
      </td>
      <td className="py-6! pr-20! text-13 text-ink-soft @max-[1060px]:hidden">
        {seenInWords(sighting)}
      </td>
      <td className="@max-[560px]:hidden">{log}</td>
    </tr>
  )
}

function BranchWords({ sighting }: { sighting: SightingWire }) {
  return (
    <>
      <span className="font-medium">{sighting.branch}</span> of {sighting.repository}
      {sighting.protected && <span className="text-ink-soft">, protected</span>}
    </>
  )
}

/** `by three checks, 27 Nov to 30 Nov, last in 4f2a91c` */
function seenInWords({ count, firstSeenAt, lastSeenAt, lastCommit }: SightingWire): string {
  const [first, last] = [formatDay(firstSeenAt), formatDay(lastSeenAt)]
  const days = first === last ? first : `${first} to ${last}`
  const commit = lastCommit === undefined ? '' : `, last in ${lastCommit.slice(0, 7)}`
  return `by ${countOf(count, 'check')}, ${days}${commit}`
}
