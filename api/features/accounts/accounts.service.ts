import { invalidRequest } from '#api/errors.ts'
import { isDuplicate } from '#api/platform/database-error.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Passwords } from '#api/platform/passwords.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import { normalizeEmail } from '#shared/contracts/email-address.ts'
import { accountFaults, type NewAccount } from './accounts.rules.ts'

export interface AccountsDependencies {
  readonly transact: Transact<'accounts' | 'audit'>
  readonly reads: Pick<Repositories, 'accounts'>
  readonly newId: NewId
  readonly passwords: Passwords
}

/** Nobody's real address ends so. @see https://www.rfc-editor.org/rfc/rfc2606#section-2 */
const DEMO_DOMAIN = '.example'

/** Makes accounts. Only people at the machine call it; nothing on the wire does. */
export const createAccountsService = ({
  transact,
  reads,
  newId,
  passwords,
}: AccountsDependencies) => ({
  /** Accounts of the demo, whose password everybody can read: why production does not start on them. */
  demoRefusals: async (): Promise<string[]> => {
    const count = await reads.accounts.countByDomain(DEMO_DOMAIN)
    return count === 0 ? [] : [`the database has ${count} accounts of the demo (…${DEMO_DOMAIN})`]
  },

  /** @returns the new account's id; nothing where the address has an account already */
  create: async (account: NewAccount): Promise<string | undefined> => {
    const faults = accountFaults(account)
    if (faults.length > 0) throw invalidRequest(faults)
    const id = newId('usr')
    const row = {
      id,
      email: normalizeEmail(account.email),
      name: account.name.trim(),
      passwordHash: await passwords.hash(account.password),
      isAdmin: account.isAdmin,
    }
    try {
      await transact(async ({ accounts, audit }) => {
        await accounts.insert(row)
        await audit.append({
          chain: 'instance',
          actor: { kind: 'service', id: null },
          action: 'account.created',
          subject: id,
          details: { isAdmin: row.isAdmin },
        })
      })
      return id
    } catch (error) {
      if (isDuplicate(error, 'users_email_uq')) return undefined
      throw error
    }
  },
})
