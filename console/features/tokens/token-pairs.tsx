import { whereInWords } from '#console/lib/finding-words.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioMove } from '#console/ui/ratio-text.tsx'
import type { ModelNames } from './consequence-list.tsx'
import { passesByGroup } from './lowest-finding.ts'
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
            className="flex min-h-38 flex-wrap items-center gap-x-16 gap-y-2 border-b border-feint py-4"
          >
            <PairSample {...shown.rendered} breaches={shown.outcome === 'breach'} />
            <span className="min-w-0 flex-1 basis-220">
              <RelationPhrase relation={relation} nameOf={names.token} />{' '}
              <span className="block text-13 text-ink-soft">
                {use}, lowest in {whereInWords(names.theme(shown.theme), [states])}
              </span>
            </span>
            <span className="ml-auto flex items-baseline gap-16">
              {shown.outcome === 'breach' && <OutcomeMark kind="breach">breach</OutcomeMark>}
              {passesByGroup(shown) && (
                <span className="text-13 text-ink-soft">its group passes</span>
              )}
              {shown.outcome === 'exempt' && <OutcomeMark kind="exempt">exempt</OutcomeMark>}
              <RatioMove
                before={after === undefined ? undefined : before.ratio}
                ratio={shown.ratio}
                required={shown.required}
                outcome={shown.outcome}
              />
            </span>
          </li>
        )
      })}
    </ul>
  )
}
