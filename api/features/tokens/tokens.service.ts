import * as z from 'zod'
import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadWriteService } from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { decodeCursor, encodeCursor, placeInListSchema } from '#api/paging.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { GovernedToken } from '#shared/checks/governed-model.ts'
import type { ParsedOf } from '#shared/contracts/route.ts'
import type { listTokens, TokenWire } from '#shared/contracts/tokens.contract.ts'
import { type Ledger, presentLedger } from './ledger.presenter.ts'
import { placeOf, startAfter } from './ledger-pages.ts'
import { selectEntries } from './ledger.rules.ts'
import { presentResolvedToken } from './tokens.presenter.ts'
import {
  type CreateTokenBody,
  decideCreate,
  decideDelete,
  decidePatch,
  type PatchTokenBody,
} from './tokens.rules.ts'

export interface TokensDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
  readonly newId: NewId
}

/** An edit of the token of one name, meant for one representation of it. */
export interface NamedEdit {
  readonly name: string
  readonly ifMatch: IfMatch
}

type ListQuery = ParsedOf<typeof listTokens>['query']
const PAGE = 100

const placeSchema = placeInListSchema.extend({
  name: z.string(),
  shortfall: z.number().nullable(),
})

/** Reads tokens off the head and writes them to it. */
export function createTokensService({ heads, writes, newId }: TokensDeps) {
  const readings = new WeakMap<Head, Reading>()
  const readingOf = (head: Head): Reading => {
    const reading = readings.get(head) ?? createReading(head)
    readings.set(head, reading)
    return reading
  }

  return {
    async list(system: SystemAccess, query: ListQuery) {
      const reading = readingOf(await heads.current(system.id))
      const entries = selectEntries(reading.entries(), query, query.sort)
      const place = decodeCursor(placeSchema, query.cursor)
      const start = place ? startAfter(entries, place, query.sort) : 0
      const limit = query.limit ?? (query.view === 'ledger' ? entries.length : PAGE)
      const shown = entries.slice(start, start + limit)
      const last = entries.length > start + limit ? placeOf(entries, start + limit - 1) : undefined
      const next = last && encodeCursor(last)
      if (query.view === 'ledger') {
        return { body: { items: shown.map(({ id }) => reading.ledger().strip(id)) }, next }
      }
      const items = shown.map(({ token, standing }) => ({ ...reading.wire(token), standing }))
      return { body: { items }, next }
    },

    async get(system: SystemAccess, name: string): Promise<TokenWire> {
      const head = await heads.current(system.id)
      return readingOf(head).wire(tokenNamed(head, name))
    },

    async create(system: SystemAccess, body: CreateTokenBody) {
      const id = newId('tok')
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        decide: ({ index }) => decideCreate(index, body, id),
        audit: { action: 'token.created', subject: id },
      })
      return { ...readingOf(head).wire(tokenOf(head, id)), effect }
    },

    async patch(system: SystemAccess, { name, ifMatch }: NamedEdit, body: PatchTokenBody) {
      const { id } = tokenNamed(await heads.current(system.id), name)
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch, current: (now) => readingOf(now).wire(tokenNamed(now, name)) },
        decide: (now) => decidePatch(now.index, tokenNamed(now, name), body),
        audit: { action: 'token.edited', subject: id },
      })
      const token = head.index.tokensByName.get(body.name ?? name)
      return { ...readingOf(head).wire(token ?? tokenOf(head, id)), effect }
    },

    async remove(
      system: SystemAccess,
      { name, ifMatch }: NamedEdit,
      message: string | undefined,
    ): Promise<void> {
      const { id } = tokenNamed(await heads.current(system.id), name)
      await writes.write({
        system,
        message,
        expected: { ifMatch, current: (now) => readingOf(now).wire(tokenNamed(now, name)) },
        decide: (now) => decideDelete(now.index, tokenNamed(now, name)),
        audit: { action: 'token.deleted', subject: id },
      })
    },
  }
}
export type TokensService = ReturnType<typeof createTokensService>

/** Names compare exactly, also where two differ by composition only. */
function tokenNamed({ index }: Head, name: string): GovernedToken {
  const token = index.tokensByName.get(name)
  if (token === undefined) throw new AppError('not-found', { detail: `No token ${name}` })
  return token
}

function tokenOf({ index }: Head, id: string): GovernedToken {
  const token = index.tokensById.get(id)
  if (token === undefined) throw new AppError('not-found', { detail: 'The token is gone again' })
  return token
}

interface Entry {
  readonly id: string
  readonly name: string
  readonly token: GovernedToken
  readonly standing: ReturnType<Ledger['standing']>
}

/** What is read off one head, each part made once. */
interface Reading {
  wire(token: GovernedToken): TokenWire
  ledger(): Ledger
  entries(): readonly Entry[]
}

function createReading(head: Head): Reading {
  const wires = new Map<string, TokenWire>()
  let ledger: Ledger | undefined
  let entries: readonly Entry[] | undefined
  const reading: Reading = {
    wire(token) {
      const known = wires.get(token.id)
      if (known) return known
      const wire = presentResolvedToken(token, head)
      const tagged = { ...wire, etag: etagOf(wire) }
      wires.set(token.id, tagged)
      return tagged
    },
    ledger() {
      ledger ??= presentLedger(head)
      return ledger
    },
    entries() {
      entries ??= head.model.tokens.map((token) => ({
        id: token.id,
        name: token.name,
        token,
        standing: reading.ledger().standing(token.id),
      }))
      return entries
    },
  }
  return reading
}
