import { type ModelNames, whereInWords } from '#console/lib/finding-words.ts'
import { startSentence } from '#console/lib/format.ts'
import { MovedPart } from '#console/ui/moved-part.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { Trouble, Waiting } from '#console/ui/page-states.tsx'
import { RatioMove } from '#console/ui/ratio-text.tsx'
import { countInWords, countOf } from '#shared/checks/finding-words.ts'
import { type Effect, EFFECT_PARTS, type EffectLine, passesByGroup } from './effect-lines.ts'
import type { TriedEffect } from './tried-effect.ts'

/** What an edit would do to every verdict, before it is saved. */
export function EffectOnVerdicts({
  tried,
  names,
  unmoved = 'No verdict moves: every ratio stays as it is.',
}: {
  tried: TriedEffect
  names: ModelNames
  /** What to say where nothing moves. */
  unmoved?: string
}) {
  return (
    <section aria-label="Effect on the verdicts" className="pt-22 pb-36">
      <h2 className="text-16 font-semibold">What this would move</h2>
      <div aria-live="polite">
        <Body tried={tried} names={names} unmoved={unmoved} />
      </div>
    </section>
  )
}

function Body({
  tried,
  names,
  unmoved,
}: {
  tried: TriedEffect
  names: ModelNames
  unmoved: string
}) {
  switch (tried.kind) {
    case 'none':
      return (
        <p className="mt-6 max-w-560 text-ink-soft">
          Nothing is edited yet. Every verdict that an edit would move is listed here before it is
          saved.
        </p>
      )
    case 'measuring':
      return <Waiting>Measuring every pair again</Waiting>
    case 'unresolvable':
      return (
        <div className="mt-12">
          <Trouble title="The colours cannot be resolved with this edit.">
            {tried.faults.slice(0, MOST_FAULTS).map(({ detail }) => (
              <p key={detail}>{startSentence(detail)}.</p>
            ))}
            {tried.faults.length > MOST_FAULTS && (
              <p>And {tried.faults.length - MOST_FAULTS} more.</p>
            )}
          </Trouble>
        </div>
      )
    case 'measured':
      return <EffectList effect={tried.effect} names={names} unmoved={unmoved} />
  }
}

const MOST_FAULTS = 5

function EffectList({
  effect,
  names,
  unmoved,
}: {
  effect: Effect
  names: ModelNames
  unmoved: string
}) {
  const { parts, exempt } = effect
  const all = EFFECT_PARTS.reduce((sum, part) => sum + parts[part].count, exempt)
  if (all === 0) {
    return <p className="mt-6 max-w-560 text-ink-soft">{unmoved}</p>
  }
  return (
    <>
      <p className="mt-4">{sumInWords(effect, all)}</p>
      {EFFECT_PARTS.map((part) => (
        <MovedPart
          key={part}
          title={titleOf(effect, part)}
          lines={parts[part].lines}
          isFirst={part === 'breaching'}
        >
          {(line) => (
            <EffectItem key={line.key} line={line} names={names} isGone={part === 'gone'} />
          )}
        </MovedPart>
      ))}
      {exempt > 0 && (
        <p className="mt-12 text-13">
          <OutcomeMark kind="exempt">{countOf(exempt, 'exempt finding')} moved as well</OutcomeMark>
        </p>
      )}
    </>
  )
}

/** `Two newly breaching, eight newly passing, 412 findings moved in all.` */
function sumInWords({ parts }: Effect, all: number): string {
  const breaching = countInWords(parts.breaching.count)
  const passing = countInWords(parts.passing.count)
  return `${startSentence(breaching)} newly breaching, ${passing} newly passing, ${countOf(all, 'finding')} moved in all.`
}

function titleOf({ parts, goneBreaches }: Effect, part: keyof Effect['parts']): string {
  const { count, lines } = parts[part]
  const number = startSentence(countInWords(count))
  switch (part) {
    case 'breaching':
      return `${count === 0 ? 'None' : number} newly breaching`
    case 'passing':
      return `${number} newly passing`
    case 'stillBreaching':
      return `${number} breaching as before`
    case 'stillPassing':
      return lines.every(({ before }) => before === undefined)
        ? `${number} measured for the first time, passing`
        : `${number} still passing, nearest to their line first`
    case 'gone':
      return `${number} measured no longer${goneBreaches > 0 ? `, ${countInWords(goneBreaches)} of them breaching now` : ''}`
  }
}

function EffectItem({
  line,
  names,
  isGone,
}: {
  line: EffectLine
  names: ModelNames
  isGone: boolean
}) {
  const { required, requiredBefore, outcome } = line
  const isAskedFor = requiredBefore !== undefined && requiredBefore !== required
  return (
    <li className="flex min-h-34 flex-wrap items-center gap-x-16 gap-y-2 border-b border-feint py-4">
      <span className="min-w-0 flex-1 basis-240 break-words">
        <span className="font-medium">{names.token(line.foreground)}</span> on{' '}
        {names.token(line.background)}{' '}
        <span className="ml-4 text-13 text-ink-soft">
          {whereInWords(names.theme(line.theme), line.states)}
          {!line.gating && ', reported only'}
        </span>
      </span>
      <span className="ml-auto flex flex-wrap items-baseline justify-end gap-x-16">
        {outcome === 'breach' && !isGone && <OutcomeMark kind="breach">breach</OutcomeMark>}
        {passesByGroup(line) && <span className="text-13 text-ink-soft">its group passes</span>}
        {isAskedFor && (
          <span className="text-13 text-ink-soft">asked for {requiredBefore} before</span>
        )}
        <RatioMove
          before={isGone ? undefined : line.before}
          ratio={line.ratio}
          required={required}
          outcome={isGone && outcome === 'breach' ? 'pass' : outcome}
        />
      </span>
    </li>
  )
}
