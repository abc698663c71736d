import { Link } from 'react-router-dom'
import { formatDay, joinWords } from '#console/lib/format.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { Use } from '#shared/checks/model.ts'
import type { CoverageWire } from '#shared/contracts/coverage.contract.ts'

type Observed = CoverageWire['observed'][number]

interface RowParts {
  readonly useInWords: (use: Use) => string
  readonly declareHref: (pair: Observed['pair']) => string
}

/** Pairs that pipelines sent with their checks and nobody has declared, the latest first. */
export function ObservedTable({
  observed,
  ...parts
}: RowParts & { observed: readonly Observed[] }) {
  return (
    <div className="ledger">
      <table aria-label="Pairs that nobody declared">
        <thead>
          <tr>
            <th>Pair</th>
            <th className="w-[24%] @max-[760px]:hidden">Last sent from</th>
            <th className="w-200 @max-[980px]:hidden">Seen</th>
            <th className="w-130 @max-[460px]:w-100">
              <span className="sr-only">Declare</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {observed.map((each) => (
            <ObservedRow key={JSON.stringify(each.pair)} observed={each} {...parts} />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function ObservedRow({ observed, useInWords, declareHref }: RowParts & { observed: Observed }) {
  const { pair, missing } = observed
  const { foreground, background, use, relation } = pair
  return (
    <tr>
      <td className="row-start py-6! pr-12! break-words">
        <span className="font-medium">{foreground}</span> on {background}
        <span className="block text-13 text-ink-soft">
          {useInWords(use)}, {relation}
        </span>
        <span className="hidden text-13 text-ink-soft @max-[760px]:block">
          {branchInWords(observed)}
        </span>
        <span className="hidden text-13 text-ink-soft @max-[980px]:block">
          {seenInWords(observed)}
        </span>
      </td>
      <td className="py-6! pr-12! break-words @max-[760px]:hidden">{branchInWords(observed)}</td>
      <td className="py-6! pr-20! text-13 text-ink-soft @max-[980px]:hidden">
        {seenInWords(observed)}
      </td>
      <td className="py-6! text-end!">
        {missing.length > 0 ? (
          <span className="text-13 break-words text-ink-soft">
            no token {joinWords(missing)} here
          </span>
        ) : (
          <Link
            to={declareHref(pair)}
            className="word"
            aria-label={`Declare ${foreground} on ${background}`}
          >
            Declare it
          </Link>
        )}
      </td>
    </tr>
  )
}

function branchInWords({ repository, branch }: Observed): string {
  if (repository === undefined) return 'no repository named'
  return branch === undefined ? repository : `${branch} of ${repository}`
}

/** `by three checks, 27 Nov to 30 Nov` */
function seenInWords({ count, firstSeenAt, lastSeenAt }: Observed): string {
  const [first, last] = [formatDay(firstSeenAt), formatDay(lastSeenAt)]
  return `by ${countOf(count, 'check')}, ${first === last ? first : `${first} to ${last}`}`
}
