import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { ruleQueries } from '#console/features/rules/rules.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import type { WholeSystem } from '#shared/contracts/system-model.ts'

/** All that the engine needs of a system: what is held and still fresh, else fetched now. */
export async function loadWholeSystem(system: string): Promise<WholeSystem> {
  const [settings, tokens, pairs, themes, rules] = await Promise.all([
    queryClient.fetchQuery(systemQueries.one(system)),
    queryClient.fetchQuery(tokenQueries.ledger(system)),
    queryClient.fetchQuery(pairQueries.all(system)),
    queryClient.fetchQuery(themeQueries.all(system)),
    queryClient.fetchQuery(ruleQueries.all(system)),
  ])
  return { system: settings, tokens, pairs, themes, rules }
}
