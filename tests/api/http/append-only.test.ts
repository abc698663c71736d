import { createConnection, type Connection } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { APPEND_ONLY_TABLES } from '#drizzle/append-only.ts'
import { createTestDatabase, type TestDatabase } from '#tests/support/database.ts'

const TRIGGER_REFUSAL = 1644
const GRANT_REFUSAL = 1142

let database: TestDatabase
let admin: Connection
let service: Connection

beforeAll(async () => {
  database = await createTestDatabase()
  admin = await createConnection(database.adminUrl)
  service = await createConnection(database.serveUrl)
  for (const statement of ROWS) await admin.query(statement)
})

afterAll(async () => {
  await admin.end()
  await service.end()
  await database.drop()
})

const HASH = `'${'0'.repeat(64)}'`
const ROWS = [
  `insert into users (id, email, name, password_hash) values ('usr_1', 'a@b.example', 'A', 'x')`,
  `insert into systems (id, \`key\`, name) values ('sys_1', 'one', 'One')`,
  `insert into revisions (system_id, number, origin, verdict, counts, engine_version, gamut_map, rule_set, digest)
   values ('sys_1', 0, 'created', 'pass', '{}', '1', 'm', 'r', ${HASH})`,
  `insert into releases (id, system_id, version, major, minor, patch, revision, manifest, sha256, author_user_id)
   values ('rel_1', 'sys_1', '1.0.0', 1, 0, 0, 0, '{}', ${HASH}, 'usr_1')`,
  `insert into release_artifacts (release_id, theme, format, sha256, body, body_gzip, body_brotli)
   values ('rel_1', 'light', 'css', ${HASH}, 'x', 'x', 'x')`,
  `insert into release_withdrawals (release_id, reason, by_user_id) values ('rel_1', 'why', 'usr_1')`,
  `insert into audit_chains (chain_id, last_seq, last_hash) values ('sys_1', 1, ${HASH})`,
  `insert into audit_entries (chain_id, seq, at, actor_kind, action, subject, details, previous_hash, hash)
   values ('sys_1', 1, utc_timestamp(3), 'service', 'x', 'y', '{}', ${HASH}, ${HASH})`,
]

const errnoOf = (run: Promise<unknown>): Promise<number | undefined> =>
  run.then(
    () => undefined,
    (error: { errno: number }) => error.errno,
  )

describe.each(APPEND_ONLY_TABLES)('%s', (table) => {
  it('refuses UPDATE and DELETE to everybody by trigger', async () => {
    const [columns] = await admin.query<never[]>(`show columns from \`${table}\``)
    const column = (columns as { Field: string }[]).at(-1)?.Field
    expect(
      await errnoOf(admin.query(`update \`${table}\` set \`${column}\` = \`${column}\``)),
    ).toBe(TRIGGER_REFUSAL)
    expect(await errnoOf(admin.query(`delete from \`${table}\``))).toBe(TRIGGER_REFUSAL)
  })

  it('refuses UPDATE and DELETE to the service by grant', async () => {
    expect(await errnoOf(service.query(`delete from \`${table}\``))).toBe(GRANT_REFUSAL)
  })

  it('leaves its rows standing when a parent is deleted', async () => {
    const [keys] = await admin.query<never[]>(
      `select delete_rule as rule from information_schema.referential_constraints
        where constraint_schema = database() and table_name = ?`,
      [table],
    )
    expect(keys.length).toBeGreaterThan(0)
    for (const { rule } of keys as { rule: string }[]) expect(rule).toBe('RESTRICT')
  })
})

it('leaves names that differ in case or a trailing space apart', async () => {
  const [rows] = await admin.query<never[]>(
    `select table_collation as collation from information_schema.tables
      where table_schema = database() and table_name = 'token_versions'`,
  )
  expect(rows[0]).toMatchObject({ collation: 'utf8mb4_nopad_bin' })
})
