import { describe, expect, it } from 'vitest'
import { listMembers, putMembers } from '#shared/contracts/members.contract.ts'
import { emailOf, watchedConsole } from '#tests/support/console-page.ts'

const MEMBERS = '/systems/larkhaven/members'
const params = { system: 'larkhaven' }
const site = watchedConsole()

const list = async () => (await (await site.api('admin'))(listMembers, { params })).body

describe('the members of a system', () => {
  it('answers an engineer with the list alone, and who changes it', async () => {
    const page = await site.open(MEMBERS, { as: 'engineer' })
    const table = page.getByRole('table', { name: 'Members' })
    await table.getByText('Tove Lind').waitFor()
    await page.getByText('An administrator adds people').waitFor()
    expect(await table.getByRole('button').count()).toBe(0)
  })

  it('answers an administrator with each move made: added, another role, removed', async () => {
    const page = await site.open(MEMBERS, { as: 'admin' })
    const email = emailOf('admin')
    await page.getByLabel('E-mail of their account').fill(email)
    await page.getByRole('button', { name: 'Add them' }).click()
    await page.getByText('Odd Brekke is engineer here now.').waitFor()
    await page.getByRole('button', { name: 'Role of Odd Brekke' }).click()
    await page.getByRole('option', { name: 'maintainer' }).click()
    await page.getByText('Odd Brekke is maintainer here now.').waitFor()
    expect((await list()).items.find((member) => member.email === email)?.role).toBe('maintainer')
    await page.getByRole('button', { name: 'Remove Odd Brekke' }).click()
    await page.getByRole('button', { name: 'Yes, remove Odd Brekke' }).click()
    await page.getByText('is a member no longer.').waitFor()
    expect((await list()).items.some((member) => member.email === email)).toBe(false)
  })

  it('refuses an address that nobody has, beside the field', async () => {
    const page = await site.open(MEMBERS, { as: 'admin', refusals: [422] })
    await page.getByLabel('E-mail of their account').fill('nobody@larkhaven.example')
    await page.getByRole('button', { name: 'Add them' }).click()
    await page.getByText('Nobody has this address.').waitFor()
    expect(await page.getByLabel('E-mail of their account').inputValue()).toBe(
      'nobody@larkhaven.example',
    )
  })

  it('leaves the list as somebody else made it meanwhile, until it is asked again', async () => {
    const page = await site.open(MEMBERS, { as: 'admin', refusals: [412] })
    await page.getByRole('table', { name: 'Members' }).waitFor()
    const { etag, items } = await list()
    const call = await site.api('admin')
    const moved = items.map(({ email, role }) => ({
      email,
      role: email.startsWith('sanna') ? ('engineer' as const) : role,
    }))
    await call(putMembers, { params, ifMatch: etag, body: { items: moved } })
    await page.getByRole('button', { name: 'Role of Pelle Strand' }).click()
    await page.getByRole('option', { name: 'engineer' }).click()
    await page.getByRole('alert').getByText('Somebody has changed the list').waitFor()
    await page.getByRole('button', { name: 'Do it again on this list' }).click()
    await page.getByText('Pelle Strand is engineer here now.').waitFor()
    const roles = (await list()).items.filter(({ role }) => role === 'engineer')
    expect(roles.map(({ name }) => name).sort()).toEqual([
      'Pelle Strand',
      'Sanna Quill',
      'Tove Lind',
    ])
  })
})
