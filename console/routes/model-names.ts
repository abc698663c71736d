import { useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import type { ModelNames } from '#console/lib/finding-words.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'

/** Names of a system's tokens and themes by id; an id that is not there answers with itself. */
export function useModelNames(system: string): ModelNames {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  return useMemo(() => {
    const tokenNames = new Map(tokens.map(({ id, name }) => [id, name]))
    const themeKeys = new Map(themes.map(({ id, key }) => [id, key]))
    return {
      token: (id) => tokenNames.get(id) ?? id,
      theme: (id) => themeKeys.get(id) ?? id,
    }
  }, [tokens, themes])
}
