import type * as z from 'zod'
import { type ModelFault, type PairModel, STATES } from '#shared/checks/model.ts'
import {
  type Decision,
  memberOf,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type { createPairBody, PairInput, patchPairBody } from '#shared/contracts/pairs.contract.ts'
import { presentPair } from '#shared/contracts/present-items.ts'
import { pairFromWire } from '#shared/contracts/system-model.ts'
import type { Reading } from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { declarationOf } from '#shared/checks/pair-declaration.ts'

export type CreatePairBody = z.output<typeof createPairBody>
export type PatchPairBody = z.output<typeof patchPairBody>

/** What the caller's roles allow: to declare pairs at will, and to exempt them. */
export interface PairAuthority {
  readonly declares: boolean
  readonly exempts: boolean
}

/** A pair to be declared. An accessibility lead declares exempt ones only. */
export function decideCreate(
  index: SystemIndex,
  { message: _, ...wire }: CreatePairBody,
  { id, authority }: { readonly id: string; readonly authority: PairAuthority },
): Decision {
  if (wire.exempt && !authority.exempts) return exemptRefusal
  if (!wire.exempt && !authority.declares) return declareRefusal
  return decidePut(index, wire, id)
}

/** An edit of a pair; what the body does not name stays, `null` removes. */
export function decidePatch(
  index: SystemIndex,
  before: PairModel,
  { body, authority }: { readonly body: PatchPairBody; readonly authority: PairAuthority },
): Decision {
  const { id, ...present } = presentPair(before, index.names)
  const { message: _, ...members } = body
  const merged = Object.fromEntries(
    Object.entries({ ...present, ...definedOnly(members) }).filter(([, value]) => value !== null),
  ) as PairInput
  const decision = decidePut(index, merged, id)
  const after = decision.ok ? decision.edits.pairs?.put?.[0] : undefined
  if (after === undefined) return decision
  if (!authority.exempts && moved(before, after, exemptionOf)) return exemptRefusal
  if (!authority.declares && moved(before, after, declaredOf)) return declareRefusal
  return decision
}

/** The removal of a pair. */
export function decideDelete(pair: PairModel, authority: PairAuthority): Decision {
  return authority.declares ? { ok: true, edits: { pairs: { remove: [pair.id] } } } : declareRefusal
}

const exemptRefusal = refuse('role-missing', 'Only an accessibility-lead may exempt a pair')
const declareRefusal = refuse(
  'role-missing',
  'A maintainer declares and removes pairs; an accessibility-lead edits exemption and level only',
)

function decidePut(index: SystemIndex, wire: PairInput, id: string): Decision {
  const reading: Reading = { names: index.names, faults: [] }
  const pair = normal(index, pairFromWire({ ...wire, id }, '', reading))
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  const declaration = declarationOf(pair)
  const twin = index.model.pairs.find(
    (other) =>
      other.id !== id &&
      other.foreground === pair.foreground &&
      other.background === pair.background &&
      declarationOf(other) === declaration,
  )
  if (twin) {
    const detail = `${wire.foreground} on ${wire.background} is declared so already (${twin.id})`
    return refuse('pair-already-declared', detail)
  }
  return {
    ok: true,
    edits: { pairs: { put: [pair] } },
    pointerOf: pointersOf(id),
    weakenedAt: memberOf({ kind: 'pair', id }),
  }
}

/** Lists that are sets, in one order and without doubles. */
function normal({ model }: SystemIndex, pair: PairModel): PairModel {
  const { states, themes, ...rest } = pair
  return {
    ...rest,
    ...(states ? { states: STATES.filter((state) => states.includes(state)) } : {}),
    ...(themes
      ? { themes: model.themes.flatMap(({ id }) => (themes.includes(id) ? [id] : [])) }
      : {}),
  }
}

const definedOnly = (members: object) =>
  Object.fromEntries(Object.entries(members).filter(([, value]) => value !== undefined))

const exemptionOf = ({ exempt }: PairModel) => exempt ?? null
const declaredOf = ({ exempt: _, level: __, ...rest }: PairModel) => rest

const moved = (before: PairModel, after: PairModel, part: (pair: PairModel) => unknown) =>
  canonicalJson(part(before)) !== canonicalJson(part(after))

const POINTERS: { readonly [code in ModelFault['code']]?: string } = {
  'level-lower': '/level',
  'minimum-lower': '/minimum',
}

const pointersOf = (id: string) => (fault: ModelFault) =>
  fault.pair === id ? POINTERS[fault.code] : undefined
