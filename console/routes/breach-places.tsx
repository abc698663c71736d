import { paths } from '#console/app/paths.ts'
import { SubNavigation } from '#console/ui/sub-navigation.tsx'

/** The log of breaches, and what pipelines see beside it. */
export function BreachPlaces({ system }: { system: string }) {
  return (
    <SubNavigation
      label="Breaches"
      places={[
        { href: paths.breaches(system), text: 'The log' },
        { href: paths.sightings(system), text: 'Seen in CI' },
      ]}
    />
  )
}
