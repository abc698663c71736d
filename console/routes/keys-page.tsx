import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { type LoaderFunctionArgs, useParams } from 'react-router-dom'
import { commandFor, scopesInWords } from '#console/features/keys/key-words.ts'
import { keyQueries, makeKey, revokeKey } from '#console/features/keys/keys.queries.ts'
import { KeysTable } from '#console/features/keys/keys-table.tsx'
import { MakeKey } from '#console/features/keys/make-key.tsx'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { mayDo } from '#console/features/session/session.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { formatLongDay } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { CopySheet } from '#console/ui/copy-sheet.tsx'
import { NothingHere } from '#console/ui/page-states.tsx'
import type { KeyWire } from '#shared/contracts/keys.contract.ts'
import { useMe } from './account-items.tsx'
import { RefusedWrite } from './refused-write.tsx'
import { useWhoMay } from './who-may.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(keyQueries.all(system)),
    queryClient.ensureQueryData(memberQueries.list(system)),
  ])
  return null
}

/** Keys of pipelines and products: made, shown once, and revoked. */
export function Component() {
  const { system = '' } = useParams()
  const me = useMe()
  const who = useWhoMay(system)
  const { data: keys } = useSuspenseQuery(keyQueries.all(system))
  const mayMakeCi = mayDo(me, system, 'keys:ci')
  const readAgain = () =>
    queryClient.invalidateQueries({ queryKey: keyQueries.all(system).queryKey })
  const making = useMutation({ mutationFn: makeKey, onSuccess: readAgain })
  const refusal = making.isError ? writeRefusal(making.error) : undefined
  const faults = { name: faultAt(refusal, '/name'), days: faultAt(refusal, '/days') }
  return (
    <>
      <title>{`Keys of ${system} · Dyewright`}</title>
      <p className="pt-14 text-ink-soft">
        {mayMakeCi ? 'Every key of the system.' : 'Your own keys.'} A key may do what its scopes and
        its owner’s present role allow.
      </p>
      {keys.length === 0 ? (
        <NothingHere title="No key is in force." />
      ) : (
        <KeysInForce system={system} keys={keys} hasOwners={mayMakeCi} onRevoked={readAgain} />
      )}
      {making.isSuccess && <ShownOnce system={system} made={making.data} />}
      {refusal !== undefined && faults.name === undefined && faults.days === undefined && (
        <RefusedWrite refusal={refusal} />
      )}
      <MakeKey
        key={making.data?.id ?? 'making'}
        mayMakeCi={mayMakeCi}
        ciNote={`A key that checks or writes takes a maintainer.${who.oneOf('maintainer')}`}
        faults={faults}
        isMaking={making.isPending}
        onMake={(key) => !making.isPending && making.mutate({ system, ...key })}
      />
    </>
  )
}

/** A new key, here and never again, with the command that it is for. */
function ShownOnce({ system, made }: { system: string; made: KeyWire & { key?: string } }) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const command = commandFor(made.scopes, {
    origin: window.location.origin,
    system,
    theme: themes[0]?.key ?? 'light',
  })
  return (
    <section aria-label="The new key" className="mt-22 border-t border-ink pt-14">
      <h2 role="status" className="text-16 font-semibold">
        {made.name} is made. This is the only time the key is shown.
      </h2>
      <p className="mt-2 mb-10 text-ink-soft">
        It {scopesInWords(made.scopes)}, until {formatLongDay(made.expiresAt)}.
      </p>
      <CopySheet label="the key" text={made.key ?? ''} />
      <p className="mt-14 mb-10">
        Put it where the build keeps its secrets, as{' '}
        <span className="font-medium">DYEWRIGHT_KEY</span>, then run:
      </p>
      <CopySheet label="the command" text={command} />
    </section>
  )
}

function KeysInForce({
  system,
  keys,
  hasOwners,
  onRevoked,
}: {
  system: string
  keys: readonly KeyWire[]
  hasOwners: boolean
  onRevoked: () => Promise<void>
}) {
  const [asked, setAsked] = useState<KeyWire>()
  const revoking = useMutation({
    mutationFn: (key: KeyWire) => revokeKey({ system, id: key.id }),
    onSuccess: onRevoked,
    onSettled: () => setAsked(undefined),
  })
  return (
    <>
      <KeysTable keys={keys} hasOwners={hasOwners} onRevoke={setAsked} />
      <div aria-live="polite">
        {asked !== undefined && (
          <div className="mt-14 border-y border-ink py-12">
            <p>
              <span className="font-semibold">Revoke {asked.name}?</span> It answers nothing from
              that moment on, and cannot be brought back.
            </p>
            <p className="mt-8 flex gap-x-28">
              <WordButton onClick={() => !revoking.isPending && revoking.mutate(asked)}>
                Yes, revoke {asked.name}
              </WordButton>
              <WordButton onClick={() => setAsked(undefined)}>Keep</WordButton>
            </p>
          </div>
        )}
        {revoking.isSuccess && <p className="mt-12">{revoking.variables.name} is revoked.</p>}
      </div>
      {revoking.isError && <RefusedWrite refusal={writeRefusal(revoking.error)} />}
    </>
  )
}
