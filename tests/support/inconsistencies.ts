import type { Pool, RowDataPacket } from 'mysql2/promise'
import { findTampering, type SealedEntry } from '#api/platform/audit/audit-chain.ts'

const VERSIONED = [
  ['token_versions', 'token_id'],
  ['pair_versions', 'pair_id'],
  ['theme_versions', 'theme_id'],
  ['distinct_set_versions', 'set_id'],
] as const

const QUERIES: readonly (readonly [what: string, sql: string])[] = [
  [
    'the head is not the last revision, or one is missing',
    `select h.system_id from system_heads h left join revisions r on r.system_id = h.system_id
     group by h.system_id, h.revision
     having max(r.number) is null or max(r.number) <> h.revision
       or count(*) <> h.revision + 1 - min(r.number)`,
  ],
  [
    'a revision has no audit entry',
    `select r.system_id, r.number from revisions r
     where r.origin <> 'created' and not exists (select 1 from audit_entries e
       where e.chain_id = r.system_id and json_value(e.details, '$.revision') = r.number)`,
  ],
  [
    'a breach number is missing',
    'select system_id from breaches group by system_id having count(*) <> max(number)',
  ],
  [
    'a breach has no event',
    'select id from breaches b where not exists (select 1 from breach_events where breach_id = b.id)',
  ],
  ...VERSIONED.flatMap(([table, id]) => [
    [
      `${table} reach beyond the head, or end before they begin`,
      `select v.${id} from ${table} v join system_heads h on h.system_id = v.system_id
       where v.from_revision > h.revision or v.to_revision <= v.from_revision`,
    ] as const,
    [
      `${table} overlap`,
      `select a.${id} from ${table} a join ${table} b on a.${id} = b.${id}
         and a.from_revision < b.from_revision and b.from_revision < a.to_revision`,
    ] as const,
  ]),
]

/** Answers everything in the database that no sequence of requests may bring about. */
export async function findInconsistencies(pool: Pool): Promise<string[]> {
  const rowsOf = async (sql: string, values: unknown[] = []) =>
    (await pool.query<RowDataPacket[]>(sql, values))[0]
  const found: string[] = []
  for (const [what, sql] of QUERIES) {
    for (const row of await rowsOf(sql)) found.push(`${what}: ${JSON.stringify(row)}`)
  }
  for (const chain of await rowsOf('select * from audit_chains')) {
    const sql = 'select * from audit_entries where chain_id = ? order by seq'
    const entries = (await rowsOf(sql, [chain.chain_id])).map(entryOf)
    const isWhole = findTampering(entries) === undefined
    if (!isWhole || entries.at(-1)?.hash !== chain.last_hash) {
      found.push(`the audit chain of ${chain.chain_id} is broken`)
    }
  }
  return found
}

const entryOf = (row: RowDataPacket): SealedEntry => ({
  chainId: row.chain_id,
  seq: Number(row.seq),
  at: row.at,
  actor: { kind: row.actor_kind, id: row.actor_id },
  action: row.action,
  subject: row.subject,
  details: row.details,
  previousHash: row.previous_hash,
  hash: row.hash,
})
