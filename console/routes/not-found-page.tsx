import { Link } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { DyewrightMark } from '#console/ui/dyewright-mark.tsx'
import { NothingHere } from '#console/ui/page-states.tsx'

export function Component() {
  return (
    <main className="mr-16 ml-42 py-44 wide:mr-44 wide:ml-116">
      <title>Nothing here · Dyewright</title>
      <DyewrightMark height={48} />
      <h1 className="large-name mt-20">Nothing here</h1>
      <NothingHere title="No page of the console has this address.">
        <Link to={paths.systems()} className="word text-ink">
          All systems
        </Link>
      </NothingHere>
    </main>
  )
}
