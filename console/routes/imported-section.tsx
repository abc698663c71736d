import { useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { useSearchParams } from 'react-router-dom'
import { changeCells } from '#console/features/imports/change-cells.ts'
import { type ChangeFilter, readChangeFilter } from '#console/features/imports/change-filter.ts'
import { ImportResult } from '#console/features/imports/import-result.tsx'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { sideOf } from '#console/features/tokens/strip-bands.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import { WeakeningNote } from './weakening-note.tsx'
import { useStripBands } from './system-frame.tsx'

const MOST_WEAKENINGS = 6

/** What an import changed, or would change. */
export function ImportedSection({ system, outcome }: { system: string; outcome: ImportWire }) {
  const { filter, setFilter } = useChangeFilter()
  const halfOf = useHalfOf(system)
  const cells = useMemo(() => changeCells(outcome, halfOf), [outcome, halfOf])
  return (
    <ImportResult outcome={outcome} cells={cells} filter={filter} onFilter={setFilter}>
      {outcome.dryRun && <WeakeningNote system={system} weakenings={weakeningsInWords(outcome)} />}
    </ImportResult>
  )
}

function weakeningsInWords({ weakens, more }: ImportWire): string[] {
  const told = weakens.slice(0, MOST_WEAKENINGS).map(({ detail }) => detail)
  const rest = weakens.length - told.length + (more?.weakens ?? 0)
  return rest > 0 ? [...told, `and ${rest} more`] : told
}

/** The half of a cell that a breach cuts in a theme that the cell does not show. */
function useHalfOf(system: string) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { shown } = useStripBands(system)
  return useMemo(
    () => (key: string) => {
      const theme = themes.find((each) => each.key === key)
      return theme === undefined || shown === undefined ? 'light' : sideOf(theme, shown)
    },
    [themes, shown],
  )
}

function useChangeFilter() {
  const [search, setSearch] = useSearchParams()
  const filter = useMemo(() => readChangeFilter(search), [search])
  const setFilter = ({ show, did }: ChangeFilter) =>
    setSearch(
      (present) => {
        for (const [name, value] of Object.entries({ show, did })) {
          if (value === 'all') present.delete(name)
          else present.set(name, value)
        }
        return present
      },
      { replace: true, preventScrollReset: true },
    )
  return { filter, setFilter }
}
