import { useSuspenseQuery } from '@tanstack/react-query'
import { type ReactNode, type Ref, useMemo, useState } from 'react'
import { useLocation, useNavigate } from 'react-router-dom'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { keptTrial } from '#console/features/tokens/kept-trial.ts'
import { presentColor, presentText } from '#console/features/tokens/present-value.ts'
import { ShipsTable } from '#console/features/tokens/ships-table.tsx'
import { useTried } from '#console/features/tokens/token-trial.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { readTrial } from '#console/features/tokens/trial.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { findingsOf } from '#shared/checks/token-standing.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import { useModelNames } from './model-names.ts'
import { TokenMoves } from './token-moves.tsx'
import { SaveForm } from './save-form.tsx'
import { TitleWithCells } from './title-with-cells.tsx'

/** One token: try a colour, see what moves, save it, and read what ships. */
export function OpenedToken({
  system,
  token,
  title,
  evaluation,
  children,
}: {
  system: string
  token: TokenWire
  title: Ref<HTMLHeadingElement>
  evaluation: Evaluation | undefined
  /** What to say while there is no evaluation. */
  children: ReactNode
}) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const base = themes[0]?.key ?? ''
  const { kept, drop } = useKept(token.id)
  const [draft, setDraft] = useState(kept?.text)
  const present = presentText(token, base)
  const text = draft ?? present
  const isTried = text.trim() !== present
  const reading = useMemo(() => {
    const ids = new Map(tokens.map(({ name, id }) => [name, id]))
    return readTrial(text, (name) => ids.get(name))
  }, [text, tokens])
  const value = isTried && reading.kind !== 'unread' ? reading.value : undefined
  const tried = useTried(evaluation, token.id, value)
  const findings = useMemo(
    () => evaluation && findingsOf(evaluation, token.id).map(({ finding }) => finding),
    [evaluation, token.id],
  )
  const names = useModelNames(system)
  const ships = themes.map(({ id, key, ground }) => ({
    id,
    key,
    ground: tokens.find(({ name }) => name === ground)?.resolved[key]?.rest.hex ?? '#ffffff',
  }))
  return (
    <>
      <TitleWithCells
        system={system}
        token={token}
        title={title}
        tried={tried?.ok === true ? tried.evaluation : undefined}
      />
      <SaveForm
        system={system}
        token={token}
        text={text}
        reading={reading}
        present={presentColor(token, base)}
        base={base}
        isTried={isTried}
        keptMessage={kept?.message ?? ''}
        onText={setDraft}
        onPutBack={() => {
          setDraft(undefined)
          drop()
        }}
      />
      {children}
      {evaluation !== undefined && (
        <TokenMoves
          evaluation={evaluation}
          token={token.id}
          names={names}
          tried={tried}
          text={isTried ? text.trim() : undefined}
          isUnread={reading.kind === 'unread'}
          onText={setDraft}
        />
      )}
      <section className="pt-36 pb-44">
        <h2 className="pb-8 text-16 font-semibold">As it ships</h2>
        {isTried && (
          <p className="-mt-6 pb-8 text-13 text-ink-soft">The present colour, not the tried one.</p>
        )}
        <ShipsTable token={token} themes={ships} findings={findings ?? []} names={names} />
      </section>
    </>
  )
}

/** What was kept of a trial through signing in; dropped, it does not come back. */
function useKept(token: string) {
  const { state, pathname, search } = useLocation()
  const navigate = useNavigate()
  const kept = keptTrial(state, token)
  const drop = () => {
    if (kept !== undefined) {
      void navigate(pathname + search, { replace: true, state: null, preventScrollReset: true })
    }
  }
  return { kept, drop }
}
