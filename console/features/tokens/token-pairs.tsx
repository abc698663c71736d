import { whereInWords } from '#console/lib/finding-words.ts'
import { PairSample } from '#console/ui/pair-sample.tsx'
import type { ModelNames } from '#console/lib/finding-words.ts'
import { JudgedRatio } from './judged-ratio.tsx'
import type { PairStanding } from './pair-standings.ts'
import { RelationPhrase } from './relation-phrase.tsx'

/** The pairs that depend on a token, furthest short first; before and after while something is tried. */
export function TokenPairs({
  pairs,
  names,
}: {
  pairs: readonly PairStanding[]
  names: ModelNames
}) {
  if (pairs.length === 0) {
    return <p className="mt-8 text-ink-soft">No declared pair names this token.</p>
  }
  return (
    <ul className="double-top mt-10">
      {pairs.map(({ key, relation, use, before, after }) => {
        const shown = after ?? before
        const states = `${shown.foregroundState}/${shown.backgroundState}`
        return (
          <li
            key={key}
            className="flex min-h-38 flex-wrap items-center gap-x-8 gap-y-4 border-b border-feint py-6 wide:gap-x-16 wide:py-4"
          >
            <PairSample {...shown.rendered} breaches={shown.outcome === 'breach'} />
            <span className="order-first min-w-0 flex-1 basis-full wide:order-none wide:basis-160">
              <RelationPhrase relation={relation} nameOf={names.token} />{' '}
              <span className="block text-13 text-ink-soft">
                {use}, lowest in {whereInWords(names.theme(shown.theme), [states])}
              </span>
            </span>
            <JudgedRatio
              before={after === undefined ? undefined : before.ratio}
              ratio={shown.ratio}
              required={shown.required}
              outcome={shown.outcome}
            />
          </li>
        )
      })}
    </ul>
  )
}
