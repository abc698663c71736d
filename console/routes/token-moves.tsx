import { useMemo, useState } from 'react'
import type { CardChip } from '#console/features/shade-card/card-cut.ts'
import { ConsequenceList } from '#console/features/tokens/consequence-list.tsx'
import type { ModelNames } from '#console/lib/finding-words.ts'
import type { MovedGroups } from '#console/features/tokens/moved-lines.ts'
import { TokenPairs } from '#console/features/tokens/token-pairs.tsx'
import { useTokenFindings, useTried } from '#console/features/tokens/token-trial.ts'
import { startSentence } from '#console/lib/format.ts'
import { Trouble } from '#console/ui/page-states.tsx'
import type { Checked, Evaluation } from '#shared/checks/evaluation.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import { ShadeCardSection } from './shade-card-section.tsx'

/** The shade card, and beside it what the chip that is looked at, or else the tried colour, would move. */
export function TokenMoves({
  evaluation,
  token,
  names,
  tried,
  text,
  isUnread,
  onText,
}: {
  evaluation: Evaluation
  token: string
  names: ModelNames
  tried: Checked | undefined
  /** What is tried, as written. */
  text: string | undefined
  isUnread: boolean
  onText: (text: string) => void
}) {
  const [looked, setLooked] = useState<CardChip>()
  const value = useMemo(() => looked && { kind: 'color' as const, color: looked.color }, [looked])
  const seen = useTried(evaluation, token, value)
  const shown = looked === undefined ? tried : seen
  const known = useTokenFindings(evaluation, shown, token)
  if (known === undefined) return null
  return (
    <div className="grid gap-x-44 gap-y-28 pt-22 full:grid-cols-[minmax(0,733px)_minmax(0,1fr)]">
      <ShadeCardSection
        evaluation={evaluation}
        token={token}
        names={names}
        tried={text}
        looked={looked}
        onTry={onText}
        onLook={setLooked}
      />
      <section aria-live={looked === undefined ? 'polite' : 'off'}>
        <h2 className="text-16 font-semibold">
          What {looked === undefined ? 'the tried colour' : 'this shade'} would move
        </h2>
        <Moves shown={shown} moved={known.moved} isUnread={isUnread} names={names} />
      </section>
      <section>
        <h2 className="text-16 font-semibold">Its pairs</h2>
        <p className="text-13 text-ink-soft">{dependInWords(known.findings.length)}</p>
        <TokenPairs pairs={known.pairs} names={names} />
      </section>
    </div>
  )
}

/** What is moved by what is shown, or why nothing is. */
function Moves({
  shown,
  moved,
  isUnread,
  names,
}: {
  shown: Checked | undefined
  moved: MovedGroups | undefined
  isUnread: boolean
  names: ModelNames
}) {
  if (shown?.ok === false) {
    return (
      <Trouble title="This cannot be resolved.">
        {shown.faults.map((fault) => (
          <p key={fault.detail}>{fault.detail}</p>
        ))}
      </Trouble>
    )
  }
  if (moved !== undefined) return <ConsequenceList moved={moved} names={names} />
  return (
    <p className="mt-8 max-w-460 text-ink-soft">
      {isUnread ? 'What is written is not a colour.' : 'Nothing is tried.'} Take a chip, write
      another colour, or step a component with the arrow keys: every ratio it moves is listed here
      before anything is saved.
    </p>
  )
}

function dependInWords(count: number): string {
  const depend = count === 1 ? 'depends' : 'depend'
  return `${startSentence(countOf(count, 'finding'))} ${depend} on this token, by itself and through what follows it.`
}
