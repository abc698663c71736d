import { parseArgs } from 'node:util'
import { applyMigrations } from '#drizzle/apply-migrations.ts'
import type { Grantee } from '#drizzle/grants.ts'

/** `node dist/drizzle/migrate.js [--grant-to user@host]`, the address in MIGRATE_DATABASE_URL or DATABASE_URL. */
const { values } = parseArgs({ options: { 'grant-to': { type: 'string' } } })
const url = process.env.MIGRATE_DATABASE_URL ?? process.env.DATABASE_URL
const grantTo = values['grant-to']

if (!url) {
  fail('MIGRATE_DATABASE_URL (or DATABASE_URL) is not set')
} else if (grantTo !== undefined && !isGrantee(grantTo)) {
  fail('--grant-to takes an account, user@host')
} else {
  try {
    const added = await applyMigrations({ url, grantTo })
    process.stdout.write(added === 0 ? 'up to date\n' : `${added} applied\n`)
  } catch (error) {
    fail(describeError(error))
  }
}

function isGrantee(text: string): text is Grantee {
  return /^.+@.+$/.test(text)
}

/** The driver's own words, without the statement: an address with its password never gets into a log. */
function describeError(error: unknown): string {
  const cause = error instanceof Error && error.cause instanceof Error ? error.cause : error
  return cause instanceof Error ? cause.message : String(cause)
}

function fail(reason: string): void {
  process.stderr.write(`migrate: ${reason}\n`)
  process.exitCode = 1
}
