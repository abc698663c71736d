import { useQuery } from '@tanstack/react-query'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { loadWholeSystem } from './whole-system.ts'

/** How the tokens stand in one theme, measured in the browser; nothing where all themes count. */
export function useThemeStandings(system: string, theme: string) {
  return useQuery({
    queryKey: ['system', system, 'standings', theme],
    enabled: theme !== 'all',
    queryFn: async () => {
      const [whole, tokens, engine] = await Promise.all([
        loadWholeSystem(system),
        queryClient.ensureQueryData(tokenQueries.ledger(system)),
        import('#console/features/tokens/measure-theme.ts'),
      ])
      return engine.measureTheme(whole, tokens, theme)
    },
  })
}
