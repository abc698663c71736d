import { and, asc, desc, eq, gt, gte, inArray, lt, not, or, type SQL, sql } from 'drizzle-orm'
import type { Executor } from '#api/platform/database.ts'
import { ciSightings } from '#drizzle/schema/breaches.ts'
import { naming, themesCalled } from './breach-matches.reads.ts'

export type SightingRow = typeof ciSightings.$inferSelect

export type SightingOrder = '-first-seen' | 'first-seen' | '-last-seen'

export interface SightingFilter {
  readonly repository?: string | undefined
  readonly branch?: string | undefined
  readonly isProtected?: boolean | undefined
  readonly theme?: string | undefined
  readonly token?: string | undefined
  /** Seen last then or later. */
  readonly since?: Date | undefined
}

/** Where a page ended. */
export interface SightingPlace {
  readonly at: Date
  readonly tie: string
}

export interface SightingPage {
  readonly order: SightingOrder
  readonly after: SightingPlace | undefined
  readonly limit: number
}

export type SightingsReads = ReturnType<typeof createSightingsReads>

/** Kept no longer: 30 days after it was seen last, where its branch was not protected then. */
export const LAPSED = and(
  eq(ciSightings.isProtected, false),
  lt(ciSightings.lastSeenAt, sql`utc_timestamp(3) - interval 30 day`),
) as SQL

export const createSightingsReads = (db: Executor) => ({
  list: (systemId: string, filter: SightingFilter, page: SightingPage) => {
    const at = TIME[page.order]
    return db
      .select({ sighting: ciSightings, tie: TIE.as('tie') })
      .from(ciSightings)
      .where(and(matching(systemId, filter), beyond(page)))
      .orderBy(page.order === 'first-seen' ? asc(at) : desc(at), asc(TIE))
      .limit(page.limit)
  },

  count: (systemId: string, filter: SightingFilter): Promise<number> =>
    db.$count(ciSightings, matching(systemId, filter)),
})

const TIME = {
  'first-seen': ciSightings.firstSeenAt,
  '-first-seen': ciSightings.firstSeenAt,
  '-last-seen': ciSightings.lastSeenAt,
} as const

/** What one check saw has one time: told apart by its key, in short. */
const TIE = sql<string>`sha2(concat_ws('\n', ${ciSightings.repository}, ${ciSightings.branch}, ${ciSightings.subjectHash}), 256)`

function beyond({ order, after }: SightingPage): SQL | undefined {
  if (after === undefined) return undefined
  const at = TIME[order]
  const later = order === 'first-seen' ? gt(at, after.at) : lt(at, after.at)
  return or(later, and(eq(at, after.at), gt(TIE, after.tie)))
}

function matching(systemId: string, filter: SightingFilter): SQL | undefined {
  const { repository, branch, isProtected, theme, token, since } = filter
  return and(
    eq(ciSightings.systemId, systemId),
    not(LAPSED),
    repository === undefined ? undefined : eq(ciSightings.repository, repository),
    branch === undefined ? undefined : eq(ciSightings.branch, branch),
    isProtected === undefined ? undefined : eq(ciSightings.isProtected, isProtected),
    theme === undefined ? undefined : inArray(ciSightings.themeId, themesCalled(systemId, theme)),
    token === undefined ? undefined : naming(ciSightings, systemId, token),
    since === undefined ? undefined : gte(ciSightings.lastSeenAt, since),
  )
}
