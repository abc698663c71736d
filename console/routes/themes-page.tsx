import { useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { Link, type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { breachesByTheme } from '#console/features/checks/breaches-by-theme.ts'
import { themeRuleInWords } from '#console/features/rules/rule-words.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { derivationOrder } from '#console/features/themes/derivation.ts'
import { FetchHead } from '#console/features/themes/fetch-head.tsx'
import { ThemesTable } from '#console/features/themes/themes-table.tsx'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import { NothingHere } from '#console/ui/page-states.tsx'
import { useEvaluation } from './evaluation.ts'
import { themeSpan } from './theme-span.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(tokenQueries.ledger(system))
  return null
}

/** Every theme of a system, in order of derivation. */
export function Component() {
  const { system = '' } = useParams()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: evaluation } = useEvaluation(system, settings.head.revision)
  const breaches = useMemo(() => evaluation && breachesByTheme(evaluation), [evaluation])
  const [base] = themes
  if (base === undefined) return <NoTheme system={system} />
  return (
    <>
      <title>{`Themes of ${system} · Dyewright`}</title>
      <p className="flex flex-wrap items-baseline justify-between gap-x-28 gap-y-6 pt-14">
        <span className="text-ink-soft">
          {startSentence(countOf(themes.length, 'theme'))}, eight at most. Each but the base follows
          from its parent by a rule, and may set colours of its own.
        </span>
        <Link to={paths.newTheme(system, base.key)} className="word">
          Make a theme
        </Link>
      </p>
      <ThemesTable
        themes={derivationOrder(themes)}
        href={(key) => paths.theme(system, key)}
        spanOf={(theme) => themeSpan(theme, tokens)}
        ruleInWords={({ from, rule }) =>
          from === undefined
            ? 'are what the tokens say'
            : themeRuleInWords({ kind: 'keep', ...rule })
        }
        levelInWords={({ level }) => level ?? settings.level}
        breachesIn={({ id }) => breaches && (breaches.get(id) ?? 0)}
      />
      <FetchHead system={system} themes={themes} origin={window.location.origin} />
    </>
  )
}

function NoTheme({ system }: { system: string }) {
  return (
    <NothingHere title="This system has no theme yet.">
      The first theme is its base; it comes with{' '}
      <Link to={paths.importFile(system)} className="word-woad">
        a file that holds themes
      </Link>
      , or by the API.
    </NothingHere>
  )
}
