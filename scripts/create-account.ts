import { createInterface } from 'node:readline'
import { Writable } from 'node:stream'
import { parseArgs } from 'node:util'
import { AppError } from '#api/errors.ts'
import { openAccounts } from '#scripts/open-accounts.ts'

const USAGE = `usage: node dist/scripts/create-account.js --email ADDRESS --name NAME [--admin]

Makes an account in the database of DATABASE_URL: the way to a first administrator.
The password, at least 15 characters, is asked for, or taken from DYEWRIGHT_PASSWORD.
`

interface Wanted {
  readonly email: string
  readonly name: string
  readonly isAdmin: boolean
}

try {
  const wanted = readWanted()
  if (wanted === undefined) fail(USAGE)
  else await createAccount(wanted)
} catch (error) {
  fail(`${reasonOf(error)}\n`)
}

function readWanted(): Wanted | undefined {
  const { values } = parseArgs({
    options: {
      email: { type: 'string' },
      name: { type: 'string' },
      admin: { type: 'boolean', default: false },
    },
  })
  const { email, name, admin: isAdmin } = values
  return email === undefined || name === undefined ? undefined : { email, name, isAdmin }
}

async function createAccount(wanted: Wanted): Promise<void> {
  const { DATABASE_URL, DYEWRIGHT_PASSWORD } = process.env
  if (!DATABASE_URL) throw new Error('DATABASE_URL is not set')
  const password = DYEWRIGHT_PASSWORD ?? (await askPassword())
  const { accounts, close } = openAccounts(DATABASE_URL)
  try {
    const id = await accounts.create({ ...wanted, password })
    if (id === undefined) throw new Error('this address has an account already')
    process.stdout.write(`${id} ${wanted.isAdmin ? 'administrator' : 'account'} made\n`)
  } finally {
    await close()
  }
}

/** Twice, and never shown. */
async function askPassword(): Promise<string> {
  if (!process.stdin.isTTY) throw new Error('no terminal to ask on: set DYEWRIGHT_PASSWORD')
  const password = await ask('password  ')
  if ((await ask('again     ')) === password) return password
  throw new Error('the two are not the same')
}

function ask(question: string): Promise<string> {
  const silent = new Writable({ write: (_chunk, _encoding, done) => done() })
  const reader = createInterface({ input: process.stdin, output: silent, terminal: true })
  process.stderr.write(question)
  return new Promise((resolve) => {
    reader.question('', (answer) => {
      reader.close()
      process.stderr.write('\n')
      resolve(answer)
    })
  })
}

function reasonOf(error: unknown): string {
  if (error instanceof AppError) {
    const faults = error.options.faults?.map(({ pointer, detail }) => `${pointer}: ${detail}`)
    return faults?.join('\n') ?? error.message
  }
  return error instanceof Error ? error.message : String(error)
}

function fail(text: string): void {
  process.stderr.write(text)
  process.exitCode = 1
}
