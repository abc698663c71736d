import { expect, it } from 'vitest'
import { createPasswords } from '#api/platform/passwords.ts'

const cheap = () => createPasswords({ memoryKiB: 64, passes: 1 })

/** Parameters of the trust promises: argon2id, 64 MiB, three passes, one lane. */
it('answers argon2id at full cost unless told otherwise', async () => {
  expect(await createPasswords().hash('slack water')).toMatch(
    /^\$argon2id\$v=19\$m=65536,t=3,p=1\$/,
  )
})

it('answers only for the right password, and never without a hash', async () => {
  const passwords = cheap()
  const hashed = await passwords.hash('slack water')
  expect(await passwords.verify(hashed, 'slack water')).toBe(true)
  expect(await passwords.verify(hashed, 'slack waters')).toBe(false)
  expect(await passwords.verify(undefined, 'slack water')).toBe(false)
  expect(await passwords.hash('slack water')).not.toBe(hashed)
})

it('refuses beyond two at work and 32 in a queue, and takes more once those are done', async () => {
  const passwords = cheap()
  const outcomes = await Promise.allSettled(
    Array.from({ length: 40 }, () => passwords.verify(undefined, 'x')),
  )
  const refused = outcomes.filter(({ status }) => status === 'rejected')
  expect(refused).toHaveLength(40 - 2 - 32)
  expect(refused[0]).toMatchObject({ reason: { code: 'service-unavailable' } })
  expect(await passwords.verify(undefined, 'x')).toBe(false)
})
