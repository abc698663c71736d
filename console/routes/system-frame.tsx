import { useSuspenseQuery } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import {
  Link,
  type LoaderFunctionArgs,
  Outlet,
  useMatch,
  useOutletContext,
  useParams,
} from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { roleIn } from '#console/features/session/session.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { SystemName, SystemTitle } from '#console/features/systems/system-title.tsx'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { bandsOf, stripThemes } from '#console/features/tokens/strip-bands.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { Navigation } from '#console/ui/navigation.tsx'
import { Strip } from '#console/ui/strip.tsx'
import { stripGroups } from '#console/ui/strip-geometry.ts'
import type { LeaderTarget } from '#console/ui/strip-gutter.tsx'
import { TopLine } from '#console/ui/top-line.tsx'
import { PlaceItems, SignOutItem, useMe } from './account-items.tsx'
import { FindItem } from './find-item.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(systemQueries.one(system)),
    queryClient.ensureQueryData(themeQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.strip(system)),
  ])
  return null
}

/** What a page of a system may tell its frame. */
export interface FrameContext {
  /** Runs the strip's leader to what stands for a token on the page. */
  readonly lead: (target: LeaderTarget | undefined) => void
  /** The first and last token whose rows are in view. */
  readonly view: (names: readonly [string, string] | undefined) => void
}

export const useFrame = () => useOutletContext<FrameContext>()

/** The bands of the strip, and the themes that it shows. */
export function useStripBands(system: string) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.strip(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  return useMemo(() => {
    const shown = stripThemes(tokens, themes)
    const href = (name: string) => paths.token(system, name)
    return { shown, bands: shown === undefined ? [] : bandsOf(tokens, themes, shown, href) }
  }, [tokens, themes, system])
}

export function Component() {
  const { system = '' } = useParams()
  const me = useMe()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { shown, bands } = useStripBands(system)
  const [leader, lead] = useState<LeaderTarget>()
  const [view, setView] = useState<readonly [string, string]>()
  const groups = useMemo(
    () =>
      stripGroups(bands, (group) => paths.tokens(system, `?group=${encodeURIComponent(group)}`)),
    [bands, system],
  )
  const context = useMemo<FrameContext>(() => ({ lead, view: setView }), [])
  const isInSettings = useIsIn(SETTINGS)
  const isAmongTokens = useIsIn(TOKENS)
  const takesFiles = useIsIn(TAKING_FILES)
  const isAmongPairs = useIsIn(PAIRS)
  const isAmongBreaches = useIsIn(BREACHES)
  const token = useMatch('/systems/:system/tokens/:name')
  const theme = useMatch('/systems/:system/themes/:theme')
  const pair = useMatch('/systems/:system/pairs/:id')
  const opened = token !== null || theme !== null || pair !== null
  return (
    <>
      {shown !== undefined && (
        <Strip groups={groups} grounds={shown.grounds} view={view} leader={leader} />
      )}
      <div className="mr-16 ml-42 wide:mr-44 wide:ml-116">
        <TopLine
          home={paths.systems()}
          where={opened ? <SystemName system={settings} href={paths.tokens(system)} /> : undefined}
          person={me.user.name}
          role={roleIn(me, system)}
          signOut={<SignOutItem />}
        >
          <PlaceItems />
          <FindItem system={system} />
        </TopLine>
        {!opened && <SystemTitle system={settings} breaches={paths.breaches(system)} />}
        <Navigation
          label={settings.key}
          places={[
            {
              href: paths.tokens(system),
              text: 'Tokens',
              count: settings.counts.tokens,
              holdsPage: isAmongTokens,
            },
            {
              href: paths.pairs(system),
              text: 'Pairs',
              count: settings.counts.pairs,
              holdsPage: isAmongPairs,
            },
            {
              href: paths.breaches(system),
              text: 'Breaches',
              count: settings.counts.openBreaches,
              holdsPage: isAmongBreaches,
            },
            { href: paths.settings(system), text: 'Settings', holdsPage: isInSettings },
          ]}
        >
          {takesFiles && (
            <Link to={paths.importFile(system)} className="word inline-block pt-4">
              Import a file
            </Link>
          )}
        </Navigation>
        <main id="content" tabIndex={-1} className="outline-none">
          <Outlet context={context} />
        </main>
      </div>
    </>
  )
}

const SETTINGS = new Set(['settings', 'themes', 'new-theme', 'rules', 'members', 'keys'])
const TOKENS = new Set(['import'])
/** Pages beside which the way to an import stands. */
const TAKING_FILES = new Set(['tokens', 'settings'])
const BREACHES = new Set(['breaches', 'sightings'])
const PAIRS = new Set(['pairs', 'pair-sheet', 'coverage', 'new-pair', 'distinct-sets'])

/** Whether the page stands under a place of the navigation, beside which it has a place of its own. */
function useIsIn(places: ReadonlySet<string>): boolean {
  return places.has(useMatch('/systems/:system/:place/*')?.params.place ?? '')
}
