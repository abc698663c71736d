import { useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { breachesByTheme } from '#console/features/checks/breaches-by-theme.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { startSentence } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { countOf } from '#shared/checks/finding-words.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { useModelNames } from './model-names.ts'
import { RemoveTheme } from './remove-theme.tsx'
import { useThemeEdit } from './theme-edit.ts'
import { ThemeForm } from './theme-form.tsx'
import { themeSpan } from './theme-span.ts'
import { ThemeValues } from './theme-values.tsx'

export function OpenedTheme({
  system,
  theme,
  evaluation,
}: {
  system: string
  theme: ThemeWire
  evaluation: Evaluation | undefined
}) {
  const edit = useThemeEdit(theme, evaluation)
  const names = useModelNames(system)
  return (
    <>
      <ThemeTitle system={system} theme={theme} evaluation={evaluation} />
      <ThemeForm system={system} theme={theme} edit={edit} />
      <div className="grid gap-x-44 full:grid-cols-2">
        <EffectOnVerdicts tried={edit.tried} names={names} />
        <ThemeValues system={system} theme={theme} edit={edit} />
      </div>
      <RemoveTheme system={system} theme={theme} evaluation={evaluation} />
    </>
  )
}

function ThemeTitle({
  system,
  theme,
  evaluation,
}: {
  system: string
  theme: ThemeWire
  evaluation: Evaluation | undefined
}) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const span = themeSpan(theme, tokens)
  const own = Object.keys(theme.values).length
  const breaches = useMemo(
    () => evaluation && (breachesByTheme(evaluation).get(theme.id) ?? 0),
    [evaluation, theme.id],
  )
  return (
    <div className="flex flex-wrap items-start gap-x-36 gap-y-6 pt-16 pb-14">
      <h1 className="large-name min-w-0 break-words">{theme.key}</h1>
      <div className="min-w-0 flex-1 basis-240">
        <p>
          {theme.from === undefined ? 'The base: its colours are what the tokens say' : 'A theme'}
          {theme.from !== undefined && (
            <>
              {' '}
              that derives from <Link to={paths.theme(system, theme.from)}>{theme.from}</Link>
            </>
          )}
          {own > 0 && `, with values of its own for ${countOf(own, 'token')}`}.
        </p>
        <p>
          {breaches === undefined ? (
            <span className="text-ink-soft">Measuring every pair of the head</span>
          ) : breaches === 0 ? (
            <span className="text-ink-soft">No finding breaches in it</span>
          ) : (
            <Link to={paths.breaches(system, `?theme=${theme.key}`)} className="hover:underline">
              <OutcomeMark kind="breach">
                {startSentence(countOf(breaches, 'finding'))}{' '}
                {breaches === 1 ? 'breaches' : 'breach'} in it
              </OutcomeMark>
            </Link>
          )}
        </p>
      </div>
      <figure>
        <PairSample foreground={span.ink} background={span.ground} breaches={false} />
        <figcaption className="mt-4 text-12 text-ink-soft">ink on ground</figcaption>
      </figure>
    </div>
  )
}
