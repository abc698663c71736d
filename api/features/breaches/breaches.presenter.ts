import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'
import { BREACH_EVENTS } from '#shared/contracts/breaches.contract.ts'
import type { ListedBreach, ListedBreachEvent } from './breaches.reads.ts'

/** What tokens are called now; those of a candidate have no other name than the row's. */
export type TokenNames = ReadonlyMap<string, string>

/** An entry of the log; a theme's key never changes, so the row's own stands. */
export function presentBreach(
  { breach, assignee }: ListedBreach,
  names: TokenNames,
): Omit<BreachWire, 'etag'> {
  const { foregroundTokenId, backgroundTokenId, resolvedAt, closingReason } = breach
  return {
    id: breach.id,
    number: breach.number,
    origin: breach.origin,
    ...(breach.origin === 'ci' ? { repository: breach.repository, branch: breach.branch } : {}),
    foreground: names.get(foregroundTokenId) ?? breach.names.foreground,
    background: names.get(backgroundTokenId) ?? breach.names.background,
    kind: breach.kind,
    use: breach.use,
    theme: breach.names.theme,
    state: `${breach.fgState}/${breach.bgState}`,
    basis: breach.basis,
    status: breach.status,
    gating: breach.gating,
    ratio: breach.ratio,
    required: breach.required,
    lowestRatio: breach.lowestRatio,
    rendered: { foreground: breach.foregroundHex, background: breach.backgroundHex },
    firstSeenAt: breach.firstSeenAt.toISOString(),
    ...(breach.firstSeenRevision === null ? {} : { firstSeenRevision: breach.firstSeenRevision }),
    lastSeenAt: breach.lastSeenAt?.toISOString() ?? null,
    ...(resolvedAt === null ? {} : { resolvedAt: resolvedAt.toISOString() }),
    ...(closingReason === null ? {} : { closingReason }),
    ...(breach.metBy === null ? {} : { metBy: standInOf(breach.metBy, names) }),
    assignee,
  }
}

const standInOf = (
  { foreground, background, names: then }: NonNullable<ListedBreach['breach']['metBy']>,
  names: TokenNames,
) => ({
  foreground: names.get(foreground) ?? then.foreground,
  background: names.get(background) ?? then.background,
})

/** The history of an entry, oldest first. */
export function presentEvents(rows: readonly ListedBreachEvent[]): BreachEventWire[] {
  return rows.flatMap(({ event, actor, assignee, message }) => {
    const kind = BREACH_EVENTS.find((known) => known === event.kind)
    if (kind === undefined) return []
    return {
      id: event.id,
      kind,
      at: event.at.toISOString(),
      ratio: event.ratio,
      required: event.required,
      ...(event.revision === null ? {} : { revision: event.revision }),
      ...(message === null ? {} : { message }),
      ...(event.checkId === null ? {} : { check: event.checkId }),
      ...(assignee === null ? {} : { assignee }),
      ...(event.body === null ? {} : { body: event.body }),
      actor,
    }
  })
}
