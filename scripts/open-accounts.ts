import { createAccountsService } from '#api/features/accounts/accounts.service.ts'
import { createDatabase } from '#api/platform/database.ts'
import { createNewId } from '#api/platform/ids.ts'
import { createPasswords } from '#api/platform/passwords.ts'
import { createRepositories, createTransactOver } from '#api/repositories.ts'

/** The service's own way of making accounts, for people at the machine. */
export function openAccounts(databaseUrl: string) {
  const database = createDatabase({ url: databaseUrl, connections: 2 })
  const accounts = createAccountsService({
    transact: createTransactOver(database.transact),
    reads: createRepositories(database.db),
    newId: createNewId(),
    passwords: createPasswords(),
  })
  return { accounts, close: () => database.close() }
}
