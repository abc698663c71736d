import { ApiError, type Call } from '#shared/client/client.ts'
import { createDistinctSet } from '#shared/contracts/distinct-sets.contract.ts'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { listMembers, putMembers } from '#shared/contracts/members.contract.ts'
import { createPair, getPair, patchPair } from '#shared/contracts/pairs.contract.ts'
import { getRules, putRules } from '#shared/contracts/rules.contract.ts'
import { createSystem, getSystem } from '#shared/contracts/systems.contract.ts'
import { putTheme } from '#shared/contracts/themes.contract.ts'
import { createToken, getToken, patchToken } from '#shared/contracts/tokens.contract.ts'
import { larkhaven } from './larkhaven/larkhaven.ts'
import type { Step } from './larkhaven/step.ts'
import { pairKey } from './larkhaven/whole-system.ts'
import { createPeople, members, type Service } from './people.ts'
import { seedHandling } from './seed-handling.ts'

const SYSTEM = 'larkhaven'
const inSystem = { system: SYSTEM }

const isThere = async (admin: Call): Promise<boolean> => {
  try {
    await admin(getSystem, { params: inSystem })
    return true
  } catch (error) {
    if (error instanceof ApiError && error.status === 404) return false
    throw error
  }
}

const found = async (admin: Call): Promise<void> => {
  await admin(createSystem, { body: { key: SYSTEM, name: 'Larkhaven Ferries' } })
  const { body } = await admin(listMembers, { params: inSystem })
  await admin(putMembers, { params: inSystem, body: { items: members }, ifMatch: body.etag })
}

/** Does one step as its author; `pairIds` remembers what was declared. */
const take = async (step: Step, call: Call, pairIds: Map<string, string>): Promise<void> => {
  switch (step.kind) {
    case 'create-token':
      await call(createToken, { params: inSystem, body: step.body })
      return
    case 'patch-token': {
      const params = { ...inSystem, name: step.name }
      const { body } = await call(getToken, { params })
      await call(patchToken, { params, body: step.body, ifMatch: body.etag })
      return
    }
    case 'put-theme': {
      const { key, ...body } = step.theme
      await call(putTheme, { params: { ...inSystem, theme: key }, body, ifNoneMatch: '*' })
      return
    }
    case 'put-rules': {
      const { body } = await call(getRules, { params: inSystem })
      await call(putRules, { params: inSystem, body: step.body, ifMatch: body.etag })
      return
    }
    case 'create-distinct-set':
      await call(createDistinctSet, { params: inSystem, body: step.body })
      return
    case 'create-pair': {
      const { body } = await call(createPair, { params: inSystem, body: step.body })
      pairIds.set(pairKey(step.body), body.id)
      return
    }
    case 'patch-pair': {
      const id = pairIds.get(pairKey(step.pair))
      if (id === undefined) throw new TypeError(`Not declared: ${pairKey(step.pair)}`)
      const params = { ...inSystem, id }
      const { body } = await call(getPair, { params })
      await call(patchPair, { params, body: step.body, ifMatch: body.etag })
    }
  }
}

/**
 * Makes the demo system over HTTP, revision by revision, as the people of the demo; they must have accounts.
 * @returns the number of revisions made, 0 where the system is there already
 * @throws {ApiError} (rejects) where the service refuses a step
 */
export async function seedDemo(service: Service): Promise<number> {
  const as = createPeople(service)
  const admin = await as('admin')
  if (await isThere(admin)) return 0
  await found(admin)
  const pairIds = new Map<string, string>()
  for (const step of larkhaven) await take(step, await as(step.by), pairIds)
  await seedHandling({ service, as, inSystem })
  return larkhaven.length
}

/** Makes a CI key for the printed gate command: it checks, and reads the themes. */
export async function createDemoKey(service: Service): Promise<string> {
  const maintainer = await createPeople(service)('maintainer')
  const { body } = await maintainer(createKey, {
    params: inSystem,
    body: { name: 'Demo pipeline', scopes: ['checks:write', 'themes:read'], days: 90 },
  })
  if (body.key === undefined) throw new TypeError('A key that was just made is shown')
  return body.key
}
