import { expect, it } from 'vitest'
import { accountFaults } from '#api/features/accounts/accounts.rules.ts'

const sound = {
  email: 'ines@quay.test',
  name: 'Ines Marrow',
  password: 'tar rope and slack water',
  isAdmin: false,
}
const pointersOf = (change: Partial<typeof sound>) =>
  accountFaults({ ...sound, ...change }).map(({ pointer }) => pointer)

it('takes any long password, whatever it is made of', () => {
  for (const password of [
    sound.password,
    'åäöåäöåäöåäöåäöxyz',
    '384 626 433 832 795',
    'xxxxxxxxxxxxxxyz',
  ]) {
    expect(pointersOf({ password })).toEqual([])
  }
})

/** @see https://pages.nist.gov/800-63-4/sp800-63b.html section 3.1.1.2: at least 15 alone; block lists */
it.each([
  ['14 characters', 'slack water xy'],
  ['14 characters of many bytes', '🐟'.repeat(14)],
  ['257 characters', 'ab c'.repeat(65)],
  ['one that everybody tries', 'Password-Password'],
  ['another', 'correct horse battery staple'],
  ['two letters only', 'abababababababab'],
  ['the own address', 'ines@quay.test1'],
  ['the own name, twice', 'InesMarrowInesMarrow'],
])('refuses %s', (_, password) => {
  expect(pointersOf({ password })).toEqual(['/password'])
})

it('refuses all that is wrong at once', () => {
  expect(pointersOf({ email: 'nobody', name: ' ', password: 'short' })).toEqual([
    '/email',
    '/name',
    '/password',
  ])
})
