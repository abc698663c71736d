import { useLocation, useNavigate, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { OwnStrip } from '#console/features/session/own-strip.tsx'
import { SignInForm } from '#console/features/session/sign-in-form.tsx'
import { sessionQueries } from '#console/features/session/session.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { DyewrightMark } from '#console/ui/dyewright-mark.tsx'

export function Component() {
  const navigate = useNavigate()
  const [search] = useSearchParams()
  const { state } = useLocation()
  return (
    <div className="flex min-h-dvh">
      <title>Sign in · Dyewright</title>
      <OwnStrip />
      <main className="flex min-w-0 flex-1 flex-col py-44 pr-16 pl-14 wide:pr-44 wide:pl-188 full:pt-120 full:pb-36 full:pl-292">
        <div className="my-auto w-full max-w-400">
          <h1 className="flex items-center gap-18 text-34 font-semibold tracking-tight full:text-[2.5rem]/[3rem]">
            <DyewrightMark height={64} />
            Dyewright
          </h1>
          <p className="mt-22 max-w-380 text-16/24">
            Keeps the colours of a product family fast: in light, in dark, in every state.
          </p>
          <SignInForm
            onSignedIn={async (me) => {
              // Nothing that was fetched for who was here before.
              queryClient.clear()
              queryClient.setQueryData(sessionQueries.me().queryKey, me)
              await navigate(placeAfter(search.get('next')), { replace: true, state })
            }}
          />
          <p className="mt-36 border-t border-feint pt-14 text-ink-soft">
            People join by invitation.
          </p>
        </div>
        <p className="mt-44 max-w-340 text-12 text-ink-soft">
          The strip is this console’s own colours on its own grounds, measured by the engine that
          will measure yours.
        </p>
      </main>
    </div>
  )
}

/** Only an address of this console: a path that no other host can be read into. */
function placeAfter(next: string | null): string {
  return next !== null && /^\/(?![/\\])/.test(next) ? next : paths.systems()
}
