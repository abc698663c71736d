import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { SubNavigation } from '#console/ui/sub-navigation.tsx'

/** The ways to look at the pairs and at what they leave out, and the way to declare one. */
export function PairViews({ system, children }: { system: string; children?: ReactNode }) {
  return (
    <div className="flex flex-wrap items-end justify-between gap-x-28 gap-y-4 print:hidden">
      <SubNavigation
        label="Pairs"
        places={[
          { href: paths.pairs(system), text: 'Table' },
          { href: paths.pairSheet(system), text: 'Sheet' },
          { href: paths.coverage(system), text: 'Coverage' },
          { href: paths.distinctSets(system), text: 'Distinct sets' },
        ]}
      />
      <div className="flex flex-wrap items-center gap-x-22 gap-y-4 pb-2">
        {children}
        <Link to={paths.newPair(system)} className="word">
          Declare a pair
        </Link>
      </div>
    </div>
  )
}
