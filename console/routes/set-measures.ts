import { useSuspenseQuery } from '@tanstack/react-query'
import { useCallback, useMemo } from 'react'
import type { SetMeasure } from '#console/features/distinct-sets/set-measures.tsx'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import {
  type ClosestCouple,
  type DistinctMeasure,
  measureSetInTheme,
} from '#shared/checks/distinct-measure.ts'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'

/** Measures tokens, by name, as a distinct set of the head in every theme; nothing while the head is measured. */
export function useSetMeasures(system: string) {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: evaluation } = useEvaluation(system, settings.head.revision)
  const names = useModelNames(system)
  const ids = useMemo(() => new Map(tokens.map(({ id, name }) => [name, id])), [tokens])
  return useCallback(
    (members: readonly string[]): readonly SetMeasure[] => {
      const resolved = evaluation?.resolved
      const known = members.flatMap((name) => ids.get(name) ?? [])
      if (resolved === undefined || known.length < 2) return []
      const set = { id: '', name: '', tokens: known }
      const cellsOf = (id: string) => resolved.tokens.get(id)?.cells ?? []
      return resolved.model.themes.map(({ key, ground }, theme) => ({
        theme: key,
        couples: namedCouples(measureSetInTheme({ set, theme, ground, cellsOf }), names.token),
      }))
    },
    [evaluation, ids, names],
  )
}

function namedCouples(couples: DistinctMeasure, nameOf: (id: string) => string): DistinctMeasure {
  const named = ({ first, second, deltaE2000 }: ClosestCouple) => ({
    first: nameOf(first),
    second: nameOf(second),
    deltaE2000,
  })
  return {
    plain: named(couples.plain),
    protan: named(couples.protan),
    deutan: named(couples.deutan),
    tritan: named(couples.tritan),
  }
}
