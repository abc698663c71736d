import { type Call, createClient } from '#shared/client/client.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import {
  createBreachComment,
  getBreach,
  listBreaches,
  patchBreach,
} from '#shared/contracts/breaches.contract.ts'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { listMembers } from '#shared/contracts/members.contract.ts'
import { getSystem, patchSystem } from '#shared/contracts/systems.contract.ts'
import {
  type Handling,
  handling,
  type LoggedPair,
  type Pipeline,
  pipelines,
  protectedBranches,
  type Run,
  type Speaker,
} from './larkhaven/handling.ts'
import type { Service } from './people.ts'

interface Seeding {
  readonly service: Service
  readonly as: (account: Speaker) => Promise<Call>
  readonly inSystem: { readonly system: string }
}

/** Protects a branch, lets two pipelines check, and lets people handle what the log holds. */
export async function seedHandling(seeding: Seeding): Promise<void> {
  await protect(seeding)
  for (const pipeline of pipelines) await run(pipeline, seeding)
  for (const one of handling) await handle(one, seeding)
}

async function protect({ as, inSystem: params }: Seeding): Promise<void> {
  const admin = await as('admin')
  const { body } = await admin(getSystem, { params })
  await admin(patchSystem, {
    params,
    body: { protectedBranches: [...protectedBranches] },
    ifMatch: body.etag,
  })
}

async function run({ name, repository, runs }: Pipeline, seeding: Seeding): Promise<void> {
  const { as, inSystem: params, service } = seeding
  const maintainer = await as('maintainer')
  const { body } = await maintainer(createKey, {
    params,
    body: { name, scopes: ['checks:write'], days: 90 },
  })
  const pipeline = createClient({ ...service, headers: { authorization: `Bearer ${body.key}` } })
  for (const { branch, commit, color } of runs) {
    await pipeline(createCheck, {
      params,
      body: {
        ...(color === undefined ? {} : { tokens: documentOf(color) }),
        source: { repository, branch, commit },
      },
    })
  }
}

/** A token file with one color in it. */
function documentOf({ token, oklch }: NonNullable<Run['color']>): Record<string, unknown> {
  const value = {
    $type: 'color',
    $value: { colorSpace: 'oklch', components: [...oklch] },
  }
  return token
    .split('.')
    .reduceRight<Record<string, unknown>>((inner, segment) => ({ [segment]: inner }), value)
}

async function handle({ of, assignee, comments }: Handling, seeding: Seeding): Promise<void> {
  const { as, inSystem } = seeding
  const lead = await as('a11y')
  const { id } = await entryOf(of, lead, inSystem)
  const params = { ...inSystem, id }
  if (assignee !== undefined) {
    const { body } = await lead(getBreach, { params })
    const member = await memberOf(assignee, lead, inSystem)
    await lead(patchBreach, { params, body: { assignee: member }, ifMatch: body.etag })
  }
  for (const { by, body } of comments) {
    const speaker = await as(by)
    await speaker(createBreachComment, { params, body: { body } })
  }
}

async function entryOf(
  { state, ...pair }: LoggedPair,
  call: Call,
  params: Seeding['inSystem'],
): Promise<BreachWire> {
  const { body } = await call(listBreaches, { params, query: { ...pair, origin: 'head' } })
  const entry = body.items.find((breach) => breach.state === state)
  if (entry === undefined) throw new TypeError(`Not in the log: ${pair.foreground}, ${state}`)
  return entry
}

async function memberOf(account: Speaker, call: Call, params: Seeding['inSystem']) {
  const { body } = await call(listMembers, { params })
  const member = body.items.find(({ email }) => email.startsWith(`${account}@`))
  if (member === undefined) throw new TypeError(`Not a member: ${account}`)
  return member.id
}
