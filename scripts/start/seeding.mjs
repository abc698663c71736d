// @ts-check
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { DATA, ROOT } from '#scripts/start/project.mjs'

/**
 * @typedef {{ email: string, name: string, role: string, listed: boolean }} DemoAccount
 * @typedef {{ password: string, accounts: DemoAccount[] }} DemoPeople
 */

/** @returns {DemoPeople} */
export function demoPeople() {
  return JSON.parse(readFileSync(join(ROOT, 'scripts/demo/demo-accounts.json'), 'utf8'))
}

/**
 * A file that is there from before the first demo row until after the last: the service is not ready
 * meanwhile, and a start that finds it knows that seeding broke off.
 * @param {string | undefined} externalUrl the address of a database that is not ours
 */
export function pendingSeed(externalUrl) {
  const suffix = externalUrl === undefined ? '' : `-${digest(withoutPassword(externalUrl))}`
  const file = join(DATA, `demo-pending${suffix}`)
  return {
    file,
    /** The key of a pipeline, for the commands that are shown when all is ready. */
    keyFile: join(DATA, `demo-ci-key${suffix}`),
    isPending: () => existsSync(file),
    begin: () => {
      mkdirSync(DATA, { recursive: true })
      writeFileSync(file, '')
    },
    end: () => rmSync(file, { force: true }),
  }
}

/**
 * @param {string} url
 * @returns {Promise<'empty' | 'demo' | 'in use'>}
 */
export async function contentsOf(url) {
  const { createConnection } = await import('mysql2/promise')
  const connection = await createConnection(url)
  try {
    const emails = demoPeople().accounts.map((account) => account.email)
    const [[row]] = /** @type {[import('mysql2').RowDataPacket[], unknown]} */ (
      await connection.query(
        `select (select count(*) from users) + (select count(*) from systems) as everything,
                (select count(*) from users where email in (?) and deactivated_at is null) as demo`,
        [emails],
      )
    )
    if (Number(row?.everything) === 0) return 'empty'
    return Number(row?.demo) > 0 ? 'demo' : 'in use'
  } finally {
    await connection.end()
  }
}

/** @param {string} url */
function withoutPassword(url) {
  const { username, host, pathname } = new URL(url)
  return `${username}@${host}${pathname}`
}

/** @param {string} text */
function digest(text) {
  return createHash('sha256').update(text).digest('hex').slice(0, 12)
}
