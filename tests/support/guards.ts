import {
  ROLE_PERMISSIONS,
  type Role,
  SCOPE_PERMISSIONS,
  type Scope,
} from '#shared/contracts/permissions.ts'
import type { Contract } from '#shared/contracts/route.ts'
import type { Agent } from './people.ts'

/** The path of an operation, its parameters filled in; those not given take the example of their schema. */
export function pathOf(contract: Contract, given: Readonly<Record<string, string>>): string {
  return contract.path.replace(/\{(\w+)\}/g, (_, name: string) =>
    encodeURIComponent(given[name] ?? exampleOf(contract, name)),
  )
}

function exampleOf(contract: Contract, name: string): string {
  const example = contract.params?.shape[name]?.meta()?.example
  return String(example ?? (name === 'number' ? 0 : 'nothing'))
}

/** Sends the operation as its contract's example has it. */
export function call(agent: Agent, contract: Contract, params: Readonly<Record<string, string>>) {
  const method = contract.method.toLowerCase() as 'get'
  const request = agent[method](pathOf(contract, params))
  if (contract.precondition !== undefined) request.set('If-Match', '"stale"')
  return contract.body === undefined ? request : request.send(contract.bodyExample as object)
}

export const isAboutSystem = ({ path }: Contract): boolean => path.includes('{system}')

/** Whether a role holds a permission, read from the table afresh. */
export const roleHolds = (role: Role, access: Contract['access']): boolean =>
  access === 'known' || (ROLE_PERMISSIONS[role] as readonly string[]).includes(access)

/** Whether a scope carries a permission, also in its `-own` form. */
export const scopeHolds = (scope: Scope, access: Contract['access']): boolean => {
  const carried: readonly string[] = SCOPE_PERMISSIONS[scope]
  return access === 'known' || carried.includes(access) || carried.includes(`${access}-own`)
}
