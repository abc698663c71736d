import { openAccounts } from '#scripts/open-accounts.ts'
import demo from './demo-accounts.json' with { type: 'json' }

/**
 * `node dist/demo/accounts.js`: makes the people of the demo in the database of DATABASE_URL. Those who are there
 * already stay as they are; their roles in the system are given by the seed, over HTTP.
 */
async function makeDemoAccounts(databaseUrl: string): Promise<void> {
  const { accounts, close } = openAccounts(databaseUrl)
  try {
    for (const { email, name, role } of demo.accounts) {
      await accounts.create({ email, name, password: demo.password, isAdmin: role === 'admin' })
    }
  } finally {
    await close()
  }
}

const { DATABASE_URL, NODE_ENV } = process.env
if (NODE_ENV === 'production') fail('the demo never loads in production')
else if (!DATABASE_URL) fail('DATABASE_URL is not set')
else await makeDemoAccounts(DATABASE_URL).catch((error: Error) => fail(error.message))

function fail(reason: string): void {
  process.stderr.write(`accounts: ${reason}\n`)
  process.exitCode = 1
}
