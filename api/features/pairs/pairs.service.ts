import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadWriteService } from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { decodeCursor, encodeCursor, placeAt, placeInListSchema, startBehind } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { PairModel } from '#shared/checks/model.ts'
import type { listPairs, PairWire } from '#shared/contracts/pairs.contract.ts'
import { presentPair } from '#shared/contracts/present-items.ts'
import type { ParsedOf } from '#shared/contracts/route.ts'
import {
  type CreatePairBody,
  decideCreate,
  decideDelete,
  decidePatch,
  type PairAuthority,
  type PatchPairBody,
} from './pairs.rules.ts'

export interface PairsDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
  readonly newId: NewId
}

/** An edit of one pair, meant for one representation of it. */
export interface PairEdit {
  readonly id: string
  readonly ifMatch: IfMatch
}

type ListQuery = ParsedOf<typeof listPairs>['query']

/** Reads declared pairs off the head and writes them to it. */
export function createPairsService({ heads, writes, newId }: PairsDeps) {
  return {
    async list(system: SystemAccess, query: ListQuery) {
      const head = await heads.current(system.id)
      const pairs = head.model.pairs.filter((pair) => isWanted(head, pair, query))
      const place = decodeCursor(placeInListSchema, query.cursor)
      const start = place ? startBehind(pairs, place) : 0
      const shown = pairs.slice(start, start + query.limit)
      const end = start + query.limit
      const body = { items: shown.map((pair) => taggedPair(head, pair)) }
      return { body, next: pairs.length > end ? encodeCursor(placeAt(pairs, end - 1)) : undefined }
    },

    async get(system: SystemAccess, id: string): Promise<PairWire> {
      const head = await heads.current(system.id)
      return taggedPair(head, pairOf(head, id))
    },

    async create(system: SystemAccess, body: CreatePairBody) {
      const id = newId('pair')
      const authority = authorityIn(system)
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        decide: ({ index }) => decideCreate(index, body, { id, authority }),
        audit: { action: 'pair.created', subject: id },
      })
      return { ...taggedPair(head, pairOf(head, id)), effect }
    },

    async patch(system: SystemAccess, { id, ifMatch }: PairEdit, body: PatchPairBody) {
      const authority = authorityIn(system)
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch, current: (now) => taggedPair(now, pairOf(now, id)) },
        decide: (now) => decidePatch(now.index, pairOf(now, id), { body, authority }),
        audit: { action: 'pair.edited', subject: id },
      })
      return { ...taggedPair(head, pairOf(head, id)), effect }
    },

    async remove(
      system: SystemAccess,
      { id, ifMatch }: PairEdit,
      message: string | undefined,
    ): Promise<void> {
      await writes.write({
        system,
        message,
        expected: { ifMatch, current: (now) => taggedPair(now, pairOf(now, id)) },
        decide: (now) => decideDelete(pairOf(now, id), authorityIn(system)),
        audit: { action: 'pair.deleted', subject: id },
      })
    },
  }
}
export type PairsService = ReturnType<typeof createPairsService>

const authorityIn = ({ role }: SystemAccess): PairAuthority => ({
  declares: role === 'maintainer' || role === 'admin',
  exempts: role === 'accessibility-lead' || role === 'admin',
})

function isWanted({ index }: Head, pair: PairModel, { token, use, product }: ListQuery): boolean {
  const id = token === undefined ? undefined : index.names.tokenId(token)
  if (token !== undefined && pair.foreground !== id && pair.background !== id) return false
  return (
    (use === undefined || pair.use === use) && (product === undefined || pair.product === product)
  )
}

function pairOf({ index }: Head, id: string): PairModel {
  const pair = index.pairsById.get(id)
  if (pair === undefined) throw new AppError('not-found', { detail: `No pair ${id}` })
  return pair
}

function taggedPair({ index }: Head, pair: PairModel): PairWire {
  const wire = presentPair(pair, index.names)
  return { ...wire, etag: etagOf(wire) }
}
