import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { contracts } from '#shared/contracts/contracts.ts'
import { ROLES, type Role, rolesWith, SCOPES } from '#shared/contracts/permissions.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { call, isAboutSystem, roleHolds, scopeHolds } from '#tests/support/guards.ts'
import type { Agent, PersonName } from '#tests/support/people.ts'

const OWN = { system: 'larkhaven' }
const PERSON_OF: Record<Role, PersonName> = {
  engineer: 'engineer',
  maintainer: 'maintainer',
  'accessibility-lead': 'lead',
}

let test: TestApp
const keys = new Map<string, Agent>()

beforeAll(async () => {
  test = await createTestApp()
  await test.createSystem('elsewhere')
  for (const scope of SCOPES) {
    const { body } = await test.people.maintainer
      .post('/v1/systems/larkhaven/keys')
      .send({ name: scope, scopes: [scope] })
      .expect(201)
    keys.set(scope, test.withKey(body.key))
  }
})
afterAll(() => test.close())

const guarded = contracts.filter(({ access }) => access !== 'anyone')
const ofSystems = guarded.filter(isAboutSystem)
const named = <T extends { operationId: string }>(list: readonly T[]) =>
  list.map((contract) => [contract.operationId, contract] as const)

describe('without credentials', () => {
  it.each(named(guarded))('%s refuses', async (_, contract) => {
    const { body, headers } = await call(test.anonymous, contract, OWN).expect(401)
    expect(body.type).toBe('/problems/sign-in-required')
    expect(headers['www-authenticate']).toMatch(/^Bearer/)
  })

  it.each(named(guarded))('%s refuses a key that nobody has', async (_, contract) => {
    const stranger = test.withKey(`dyw_ci_${'a'.repeat(38)}`)
    const { body } = await call(stranger, contract, OWN).expect(401)
    expect(body.type).toBe('/problems/key-refused')
  })

  it.each(named(contracts.filter(({ access }) => access === 'anyone')))(
    '%s answers',
    async (_, contract) => {
      const { status } = await call(test.anonymous, contract, OWN)
      expect([200, 401]).toContain(status)
    },
  )
})

describe.each(ROLES)('as %s', (role) => {
  const agent = () => test.people[PERSON_OF[role]]

  it.each(named(ofSystems.filter(({ access }) => !roleHolds(role, access))))(
    '%s refuses and names who may',
    async (_, contract) => {
      const { body } = await call(agent(), contract, OWN).expect(403)
      expect(body.type).toBe('/problems/role-missing')
      expect(body.roles).toEqual(rolesWith(contract.access as 'tokens:read'))
      for (const name of body.roles) expect(body.detail).toContain(name)
    },
  )

  it.each(named(ofSystems.filter(({ access }) => roleHolds(role, access))))(
    '%s lets through',
    async (_, contract) => {
      const { status, body } = await call(agent(), contract, OWN)
      expect(status).not.toBe(401)
      // A service may still refuse single members of an edit to a lead; the door itself names the permission's roles.
      if (status === 403)
        expect(body.roles).not.toEqual(rolesWith(contract.access as 'tokens:read'))
    },
  )

  it.each(named(ofSystems))('%s refuses an absent system', async (_, contract) => {
    await call(agent(), contract, { system: 'nowhere' }).expect(404)
  })
})

describe('as a stranger', () => {
  it.each(named(ofSystems))('%s refuses as if there were no such system', async (_, contract) => {
    const { body: foreign } = await call(test.people.stranger, contract, OWN).expect(404)
    const { body: absent } = await call(test.people.stranger, contract, { system: 'nowhere' })
    expect({ ...foreign, requestId: '' }).toEqual({ ...absent, requestId: '' })
  })

  it.each(
    named(guarded.filter(({ access, path }) => access !== 'known' && !path.includes('{system}'))),
  )('%s refuses for the missing role', async (_, contract) => {
    const { body } = await call(test.people.stranger, contract, OWN).expect(403)
    expect(body.detail).toContain('admin')
  })
})

describe('as admin', () => {
  it.each(named(ofSystems))('%s lets through', async (_, contract) => {
    const { status } = await call(test.people.admin, contract, OWN)
    expect([401, 403]).not.toContain(status)
  })
})

describe.each(SCOPES)('with a key for %s', (scope) => {
  const agent = () => keys.get(scope) as Agent

  it.each(named(ofSystems.filter(({ access }) => !scopeHolds(scope, access))))(
    '%s refuses and names the scopes',
    async (_, contract) => {
      const { body } = await call(agent(), contract, OWN).expect(403)
      expect(body.type).toBe('/problems/scope-missing')
      expect(body.scopes).toEqual(SCOPES.filter((other) => scopeHolds(other, contract.access)))
      for (const name of body.scopes) expect(body.detail).toContain(name)
    },
  )

  it.each(named(ofSystems.filter(({ access }) => scopeHolds(scope, access))))(
    '%s lets through',
    async (_, contract) => {
      const { status } = await call(agent(), contract, OWN)
      expect([401, 403]).not.toContain(status)
    },
  )

  it.each(named(ofSystems))('%s refuses another system of its owner', async (_, contract) => {
    await call(agent(), contract, { system: 'elsewhere' }).expect(404)
  })
})
