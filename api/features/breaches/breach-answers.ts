import { etagOf } from '#api/precondition.ts'
import type { BreachWire, BreachWithEvents } from '#shared/contracts/breaches.contract.ts'
import { presentBreach, presentEvents } from './breaches.presenter.ts'
import type { BreachesReads, ListedBreach } from './breaches.reads.ts'

type Reading = Pick<BreachesReads, 'find' | 'listEvents' | 'tokenNames'>

/** Entries as they are answered. Their history is part of the version, so that a comment moves the tag too. */
export async function breachAnswers(
  reads: Pick<Reading, 'tokenNames'>,
  systemId: string,
  rows: readonly ListedBreach[],
): Promise<BreachWire[]> {
  const ids = rows.flatMap(({ breach: { foregroundTokenId, backgroundTokenId, metBy } }) => [
    foregroundTokenId,
    backgroundTokenId,
    ...(metBy === null ? [] : [metBy.foreground, metBy.background]),
  ])
  const names = await reads.tokenNames(systemId, [...new Set(ids)])
  return rows.map((row) => {
    const breach = presentBreach(row, names)
    return { ...breach, etag: etagOf({ ...breach, version: row.breach.version }) }
  })
}

/** One entry with its history; nothing where there is none. */
export async function wholeBreach(
  reads: Reading,
  systemId: string,
  id: string,
): Promise<BreachWithEvents | undefined> {
  const row = await reads.find(systemId, id)
  if (row === undefined) return undefined
  const [breach] = await breachAnswers(reads, systemId, [row])
  if (breach === undefined) throw new TypeError('One row presents as one breach')
  return { ...breach, events: presentEvents(await reads.listEvents(id)) }
}
