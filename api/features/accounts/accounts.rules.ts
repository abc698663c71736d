import { normalizeEmail } from '#shared/contracts/email-address.ts'
import type { Fault } from '#shared/contracts/problems.ts'

export const LEAST_PASSWORD_LENGTH = 15
const MOST_PASSWORD_LENGTH = 256

/** Long enough, and still among the first that anybody tries. From memory; there is no source. */
const OBVIOUS = [
  'passwordpassword',
  'passwordpassword1',
  'password12345678',
  '123456789012345',
  '1234567890123456',
  'qwertyuiopasdfgh',
  'qwertyuiopasdfghjkl',
  'iloveyouiloveyou',
  'letmeinletmeinletmein',
  'administrator123',
  'adminadminadmin',
  'welcomewelcome1',
  'changemechangeme',
  'correcthorsebatterystaple',
  'correct horse battery staple',
  'dyewrightdyewright',
]

const lettersOf = (text: string): string => text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '')
const OBVIOUS_LETTERS = new Set(OBVIOUS.map(lettersOf))

export interface NewAccount {
  readonly email: string
  readonly name: string
  readonly password: string
  readonly isAdmin: boolean
}

/** Everything that speaks against a new account. Length counts, composition does not. */
export function accountFaults({ email, name, password }: NewAccount): Fault[] {
  const faults: Fault[] = []
  if (!/^[^\s@]+@[^\s@]+$/.test(normalizeEmail(email)) || email.length > 254) {
    faults.push({ pointer: '/email', detail: 'Expected an e-mail address' })
  }
  if (name.trim() === '' || name.length > 120) {
    faults.push({ pointer: '/name', detail: 'Expected a name of at most 120 characters' })
  }
  const length = [...password].length
  if (length < LEAST_PASSWORD_LENGTH || length > MOST_PASSWORD_LENGTH) {
    const detail = `Expected ${LEAST_PASSWORD_LENGTH} to ${MOST_PASSWORD_LENGTH} characters`
    faults.push({ pointer: '/password', detail })
  } else if (isObvious(password, [email, email.split('@')[0] ?? '', name])) {
    faults.push({ pointer: '/password', detail: 'Everybody would guess it' })
  }
  return faults
}

/** Well-known, of one or two letters only, or no more than the person's own name or address. */
function isObvious(password: string, own: readonly string[]): boolean {
  const letters = lettersOf(password)
  if (OBVIOUS_LETTERS.has(letters) || new Set(password).size < 3) return true
  return own.map(lettersOf).some((word) => word !== '' && letters.replaceAll(word, '').length < 5)
}
