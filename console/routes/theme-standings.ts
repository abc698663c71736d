import { useQuery } from '@tanstack/react-query'
import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { isUnexplained } from '#console/features/tokens/ledger-rows.ts'
import type { MeasuredTokens } from '#console/features/tokens/measure-theme.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { loadWholeSystem } from './whole-system.ts'

/**
 * What the service's standings do not say, measured in the browser: how the tokens stand in one theme alone, and
 * which of them pass by their group. Over all themes that is measured only where a token of a group needs it.
 */
export function useMeasuredTokens(system: string, theme: string) {
  return useQuery({
    queryKey: ['system', system, 'standings', theme],
    queryFn: async (): Promise<MeasuredTokens> => {
      const tokens = await queryClient.ensureQueryData(tokenQueries.ledger(system))
      const open = new Set(tokens.filter(isUnexplained).map(({ name }) => name))
      const isAll = theme === 'all'
      if (isAll && !(await hasGroupOf(system, open))) return { byGroup: new Set() }
      const [whole, engine] = await Promise.all([
        loadWholeSystem(system),
        import('#console/features/tokens/measure-theme.ts'),
      ])
      return isAll ? engine.measureGroups(whole) : engine.measureTheme(whole, tokens, theme)
    },
  })
}

/** Whether one of the tokens stands in a pair of a group. */
async function hasGroupOf(system: string, names: ReadonlySet<string>): Promise<boolean> {
  if (names.size === 0) return false
  const pairs = await queryClient.ensureQueryData(pairQueries.all(system))
  return pairs.some(
    ({ anyOf, foreground, background }) =>
      anyOf !== undefined && (names.has(foreground) || names.has(background)),
  )
}
