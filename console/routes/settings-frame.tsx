import { useSuspenseQuery } from '@tanstack/react-query'
import { Outlet, useOutletContext, useParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { SubNavigation } from '#console/ui/sub-navigation.tsx'

/** What governs a system beside its tokens and pairs, each part at an address of its own. */
export function Component() {
  const { system = '' } = useParams()
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const context = useOutletContext()
  return (
    <>
      <SubNavigation
        label="Settings"
        places={[
          { href: paths.settings(system), text: 'System' },
          { href: paths.themes(system), text: 'Themes', count: settings.counts.themes },
          { href: paths.rules(system), text: 'Rules' },
          { href: paths.members(system), text: 'Members' },
          { href: paths.keys(system), text: 'Keys' },
        ]}
      />
      <Outlet context={context} />
    </>
  )
}
