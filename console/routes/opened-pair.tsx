import { type Ref, useMemo } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { measuredLines } from '#console/features/pairs/measured-lines.ts'
import { MeasuredList } from '#console/features/pairs/measured-list.tsx'
import { fieldsOf } from '#console/features/pairs/pair-draft.ts'
import { findingsByPair } from '#console/features/pairs/pair-outcomes.ts'
import {
  backdropInWords,
  statesInWords,
  themesInWords,
  wordsOfUse,
} from '#console/features/pairs/pair-words.ts'
import { startSentence } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { Waiting } from '#console/ui/page-states.tsx'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { Finding } from '#shared/checks/model.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'
import { useModelNames } from './model-names.ts'
import { usePairEdit } from './pair-edit.ts'
import { PairForm } from './pair-form.tsx'
import { RemovePair } from './remove-pair.tsx'

export function OpenedPair({
  system,
  pair,
  evaluation,
  title,
}: {
  system: string
  pair: PairWire
  evaluation: Evaluation | undefined
  title: Ref<HTMLHeadingElement>
}) {
  const standing = useMemo(() => fieldsOf(pair), [pair])
  const edit = usePairEdit({ id: pair.id, standing }, evaluation)
  const names = useModelNames(system)
  const findings = useMemo(
    () => evaluation && (findingsByPair(evaluation).get(pair.id) ?? []),
    [evaluation, pair.id],
  )
  return (
    <>
      <PairTitle system={system} pair={pair} findings={findings} title={title} />
      <PairForm system={system} pair={pair} edit={edit} />
      <div className="grid gap-x-44 full:grid-cols-2">
        <EffectOnVerdicts tried={edit.tried} names={names} />
        <section className="pt-22 pb-36">
          <h2 className="text-16 font-semibold">What it measures now</h2>
          {evaluation === undefined || findings === undefined ? (
            <Waiting>Measuring every pair of the head</Waiting>
          ) : (
            <MeasuredList
              lines={measuredLines(findings, evaluation.resolved.model.themes)}
              themeOf={names.theme}
            />
          )}
        </section>
      </div>
      <RemovePair system={system} pair={pair} evaluation={evaluation} />
    </>
  )
}

function PairTitle({
  system,
  pair,
  findings,
  title,
}: {
  system: string
  pair: PairWire
  findings: readonly Finding[] | undefined
  title: Ref<HTMLHeadingElement>
}) {
  const breaches = findings?.filter(({ outcome }) => outcome === 'breach').length ?? 0
  return (
    <div className="flex flex-wrap items-start gap-x-36 gap-y-6 pt-16 pb-14">
      <h1 ref={title} className="text-28 font-semibold min-w-0 break-words">
        <Link to={paths.token(system, pair.foreground)} className="hover:underline">
          {pair.foreground}
        </Link>{' '}
        <span className="font-normal">on</span>{' '}
        <Link to={paths.token(system, pair.background)} className="hover:underline">
          {pair.background}
        </Link>
      </h1>
      <div className="min-w-0 flex-1 basis-280">
        <p>
          {startSentence(wordsOfUse(pair.use))},{' '}
          {pair.relation === 'inside' ? 'inside it' : 'together with it'}, in{' '}
          {themesInWords(pair.themes)} and {statesInWords(pair.states)}
          {pair.product !== undefined && `, for ${pair.product}`}
          {pair.backdrop !== undefined && `; under it ${backdropInWords(pair.backdrop)}`}
          {pair.anyOf !== undefined && `; one of ${pair.anyOf} is enough`}.
        </p>
        <p>
          {breaches > 0 ? (
            <Link
              to={paths.breaches(system, `?token=${encodeURIComponent(pair.foreground)}`)}
              className="hover:underline"
            >
              <OutcomeMark kind="breach">
                {startSentence(countOf(breaches, 'finding'))}{' '}
                {breaches === 1 ? 'breaches' : 'breach'}
              </OutcomeMark>
            </Link>
          ) : (
            <span className="text-ink-soft">
              {findings === undefined ? 'Measuring every pair of the head' : 'No finding breaches'}
            </span>
          )}
        </p>
      </div>
    </div>
  )
}
