import { countInWords } from '#shared/checks/finding-words.ts'
import { type ModelNames, whereInWords } from '#console/lib/finding-words.ts'
import { startSentence } from '#console/lib/format.ts'
import { MovedPart } from '#console/ui/moved-part.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import type { MovedGroups, MovedLine } from './moved-lines.ts'
import { JudgedRatio } from './judged-ratio.tsx'
import { RelationPhrase } from './relation-phrase.tsx'

/** Every pair, state and theme that the trial moves, newly breaching first. */
export function ConsequenceList({ moved, names }: { moved: MovedGroups; names: ModelNames }) {
  const { counts } = moved
  const itemOf = (line: MovedLine) => <MovedItem key={line.key} line={line} names={names} />
  const all = counts.breaching + counts.passing + counts.stillBreaching + counts.stillPassing
  if (all + counts.exempt === 0) {
    return <p className="mt-8 text-ink-soft">Nothing moves: every ratio stays as it is.</p>
  }
  return (
    <>
      <MovedPart
        title={`${counts.breaching === 0 ? 'None' : startSentence(countInWords(counts.breaching))} newly breaching`}
        lines={moved.breaching}
        isFirst
      >
        {itemOf}
      </MovedPart>
      <MovedPart
        title={`${startSentence(countInWords(counts.passing))} newly passing`}
        lines={moved.passing}
      >
        {itemOf}
      </MovedPart>
      <MovedPart
        title={`${startSentence(countInWords(counts.stillBreaching))} still breaching`}
        lines={moved.stillBreaching}
      >
        {itemOf}
      </MovedPart>
      <MovedPart
        title={`${startSentence(countInWords(counts.stillPassing))} still passing, nearest to their line first`}
        lines={moved.stillPassing}
      >
        {itemOf}
      </MovedPart>
      {counts.exempt > 0 && (
        <p className="mt-12 text-end text-13">
          <OutcomeMark kind="exempt">{counts.exempt} exempt</OutcomeMark>
        </p>
      )}
    </>
  )
}

function MovedItem({ line, names }: { line: MovedLine; names: ModelNames }) {
  return (
    <li className="flex min-h-34 flex-wrap items-center gap-x-16 gap-y-2 border-b border-feint py-4">
      <span className="min-w-0 flex-1 basis-200">
        <span className="mr-4">
          <RelationPhrase relation={line.relation} nameOf={names.token} />
        </span>{' '}
        <span className="text-13 text-ink-soft">
          {whereInWords(names.theme(line.theme), line.states)}
        </span>
      </span>
      <JudgedRatio
        before={line.before}
        ratio={line.ratio}
        required={line.required}
        outcome={line.outcome}
      />
    </li>
  )
}
