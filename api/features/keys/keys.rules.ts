import type { Scope } from '#shared/contracts/permissions.ts'
import type { Fault } from '#shared/contracts/problems.ts'

const MOST_DAYS_OF_A_WRITING_KEY = 90

/** A key that only reads themes is a read key; any other belongs to a pipeline. */
export const kindOfKey = (scopes: readonly Scope[]): 'read' | 'ci' =>
  scopes.every((scope) => scope === 'themes:read') ? 'read' : 'ci'

export function keyFaults(scopes: readonly Scope[], days: number): Fault[] {
  if (kindOfKey(scopes) === 'read' || days <= MOST_DAYS_OF_A_WRITING_KEY) return []
  return [
    {
      pointer: '/days',
      detail: `A key that writes lasts ${MOST_DAYS_OF_A_WRITING_KEY} days at most`,
    },
  ]
}
