import { countOf } from '#shared/checks/finding-words.ts'
import { useSuspenseQuery } from '@tanstack/react-query'
import { paths } from '#console/app/paths.ts'
import { SystemsTable } from '#console/features/systems/systems-table.tsx'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { roleIn } from '#console/features/session/session.queries.ts'
import { startSentence } from '#console/lib/format.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { NothingHere } from '#console/ui/page-states.tsx'
import { TopLine } from '#console/ui/top-line.tsx'
import { PlaceItems, SignOutItem, useMe } from './account-items.tsx'

export async function loader() {
  await queryClient.ensureQueryData(systemQueries.all())
  return null
}

export function Component() {
  const me = useMe()
  const { data: systems } = useSuspenseQuery(systemQueries.all())
  return (
    <div className="mr-16 ml-42 wide:mr-44 wide:ml-116">
      <title>Systems · Dyewright</title>
      <TopLine home={paths.systems()} person={me.user.name} signOut={<SignOutItem />}>
        <PlaceItems />
      </TopLine>
      <main id="content">
        <div className="flex flex-wrap items-baseline gap-x-36 gap-y-4 pt-8 pb-10">
          <h1 className="large-name">Systems</h1>
          <p className="text-ink-soft">
            {startSentence(countOf(systems.length, 'system'))} you may open
          </p>
        </div>
        {systems.length === 0 ? (
          <NothingHere title="No system is open to you.">
            An administrator makes systems and gives roles in them.
          </NothingHere>
        ) : (
          <SystemsTable
            systems={systems}
            href={(key) => paths.tokens(key)}
            role={(key) => roleIn(me, key)}
          />
        )}
      </main>
    </div>
  )
}
