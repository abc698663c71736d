import { useQuery, useSuspenseQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import { type LoaderFunctionArgs, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { productsOf } from '#console/features/pairs/pair-filter.ts'
import { PairSheet } from '#console/features/pairs/pair-sheet.tsx'
import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { sheetBands } from '#console/features/pairs/sheet-bands.ts'
import { SheetChoices } from '#console/features/pairs/sheet-choices.tsx'
import {
  readSheetView,
  type SheetView,
  writeSheetView,
} from '#console/features/pairs/sheet-view.ts'
import { revisionQueries } from '#console/features/revisions/revisions.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere, Trouble, Waiting } from '#console/ui/page-states.tsx'
import { ENGINE_STAMP } from '#shared/checks/engine.ts'
import { useEvaluation } from './evaluation.ts'
import { PairViews } from './pair-views.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(pairQueries.all(system))
  return null
}

/** Every pair as a specimen on one ratio ruler, in one theme and state. */
export function Component() {
  const { system = '' } = useParams()
  const navigate = useNavigate()
  const [search] = useSearchParams()
  const { data: pairs } = useSuspenseQuery(pairQueries.all(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const evaluation = useEvaluation(system, settings.head.revision)
  const keys = useMemo(() => themes.map(({ key }) => key), [themes])
  const view = useMemo(() => readSheetView(search, keys), [search, keys])
  const href = (next: SheetView) => paths.pairSheet(system, writeSheetView(next, keys[0] ?? ''))
  const bands = useMemo(
    () => evaluation.data && sheetBands(evaluation.data, view),
    [evaluation.data, view],
  )
  return (
    <>
      <title>{`Pair sheet of ${system}, ${view.theme}, ${view.state} · Dyewright`}</title>
      <PairViews system={system}>
        <WordButton onClick={() => window.print()}>Print the sheet</WordButton>
      </PairViews>
      <SheetChoices
        view={view}
        themes={keys}
        products={productsOf(pairs)}
        href={href}
        onChange={(next) => void navigate(href(next), { replace: true, preventScrollReset: true })}
      />
      <p className="hidden pb-10 print:block">
        Pairs of {system} in {view.theme}, {view.state}
      </p>
      {evaluation.isPending && <Waiting>Measuring every pair of the head</Waiting>}
      {evaluation.isError && (
        <Trouble title="The pairs cannot be measured here.">
          <p>{evaluation.error.message}</p>
        </Trouble>
      )}
      {bands?.length === 0 && (
        <NothingHere title="Nothing stands on anything here.">
          No pair is measured in {view.theme}, {view.state}, for this use.
        </NothingHere>
      )}
      {bands !== undefined && bands.length > 0 && (
        <PairSheet
          bands={bands}
          tokenHref={(name) => paths.token(system, name)}
          pairHref={(id) => paths.pair(system, id)}
        />
      )}
      <SheetFoot system={system} revision={settings.head.revision} />
    </>
  )
}

/** Stands on every printed page: what was measured, and with what. */
function SheetFoot({ system, revision }: { system: string; revision: number }) {
  const { data } = useQuery(revisionQueries.head(system))
  const { version, ruleSet } = ENGINE_STAMP
  return (
    <p className="sheet-foot">
      {system}, revision {revision}, engine {version}, {ruleSet}
      {data?.number === revision && `, digest ${data.digest.slice(0, 16)}`}
    </p>
  )
}
