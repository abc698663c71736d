import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let pair: string
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

beforeEach(async () => {
  system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  pair = await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
})

const ALL = '?status=open&status=waived&status=resolved'
async function only(): Promise<BreachWire> {
  const found = await system.breaches(ALL)
  expect(found).toHaveLength(1)
  return found[0] as BreachWire
}
async function whole() {
  const { id } = await only()
  return (await test.people.engineer.get(`${system.url}/breaches/${id}`).expect(200)).body
}
const eventsOf = (body: { events: { kind: string }[] }) => body.events.map(({ kind }) => kind)

describe('getBreach', () => {
  it('answers the whole history: who, when, by which revision and why', async () => {
    const opening = (await system.maintainer.get(system.url)).body.head.revision
    await system.editToken('soft', { value: '#bbbbbb', message: 'Softer still' })
    await system.editToken('soft', { value: '#999999' })
    await system.editToken('soft', { value: '#666666', message: 'Dark enough' })
    await system.editToken('soft', { value: '#aaaaaa' })
    const body = await whole()
    expect(body).toMatchObject({ status: 'open', firstSeenRevision: opening, lastSeenAt: null })
    expect(body).not.toHaveProperty('closingReason')
    expect(body).not.toHaveProperty('resolvedAt')
    expect(body.events).toMatchObject([
      { kind: 'opened', revision: opening, required: 4.5 },
      { kind: 'worsened', revision: opening + 1, message: 'Softer still' },
      { kind: 'eased', revision: opening + 2 },
      { kind: 'resolved', revision: opening + 3, message: 'Dark enough' },
      { kind: 'reopened', revision: opening + 4 },
    ])
    for (const { actor } of body.events) expect(actor.name).toBe('Ines Marrow')
    // Ratios of greys on white: 2.32 and 5.74 are ACT's, the others common practice, no source.
    const ratios = body.events.map(({ ratio }: { ratio: number }) => Math.floor(ratio * 100) / 100)
    expect(ratios).toEqual([2.32, 1.91, 2.84, 5.74, 2.32])
    expect(body.lowestRatio).toBe(body.events[1].ratio)
  })

  it('answers a resolved breach with its last sight and its closing', async () => {
    await system.editToken('soft', { value: '#666666' })
    const body = await whole()
    expect(body).toMatchObject({ status: 'resolved', closingReason: 'fixed' })
    expect(body.resolvedAt).toBe(body.lastSeenAt)
    expect(body.resolvedAt).toBe(body.events[1].at)
  })

  it('leaves an entry alone that an edit does not move', async () => {
    const before = await whole()
    await system.editToken('soft', { description: 'For hints' })
    await system.editToken('ink', { value: '#111111' })
    expect(await whole()).toEqual(before)
  })

  it('changes its etag with everything that it says', async () => {
    const { id } = await only()
    const url = `${system.url}/breaches/${id}`
    const { headers, body } = await test.people.engineer.get(url).expect(200)
    expect(headers.etag).toBe(body.etag)
    expect((await only()).etag).toBe(body.etag)
    await system.editToken('soft', { name: 'softer' })
    const renamed = await test.people.engineer.get(url).set('If-None-Match', body.etag).expect(200)
    expect(renamed.body).toMatchObject({ foreground: 'softer' })
    await test.people.engineer.get(url).set('If-None-Match', renamed.body.etag).expect(304)
  })

  it('refuses what is not there, and a breach of another system', async () => {
    const { id } = await only()
    const other = await createSampleSystem(test)
    await test.people.engineer.get(`${system.url}/breaches/brc_nowhere`).expect(404)
    await test.people.engineer.get(`${other.url}/breaches/${id}`).expect(404)
    await test.people.stranger.get(`${system.url}/breaches/${id}`).expect(404)
  })
})

describe('getBreach, on why it was closed,', () => {
  const closing = async () => {
    const { status, closingReason } = await only()
    return `${status} ${closingReason}`
  }

  it('answers requirement-changed where the pair asks for less', async () => {
    await system.editPair(pair, { use: 'large-text' })
    expect((await only()).status).toBe('open')
    await system.editToken('soft', { value: '#888888' })
    expect(await closing()).toBe('resolved fixed')
    await system.editPair(pair, { use: 'text' })
    expect((await only()).status).toBe('open')
    await system.editPair(pair, { use: 'large-text' })
    expect(await closing()).toBe('resolved requirement-changed')
  })

  it('answers pair-removed where the pair goes', async () => {
    await system.removePair(pair)
    expect(await closing()).toBe('resolved pair-removed')
  })

  it('answers pair-removed where the pair is narrowed to other states', async () => {
    await system.editToken('soft', { value: '#000000', states: ['hover'] })
    await system.editToken('soft', { values: { light: { hover: '#cccccc' } } })
    const found = await system.breaches()
    expect(found.map(({ state }) => state)).toEqual(['hover/rest'])
    await system.editPair(pair, { states: ['rest'] })
    const closed = await system.breaches('?status=resolved')
    expect(closed.map(({ state, closingReason }) => `${state} ${closingReason}`)).toEqual([
      'rest/rest fixed',
      'hover/rest pair-removed',
    ])
  })

  it('answers theme-removed where the theme goes, and keeps its key', async () => {
    await system.putTheme('dusk', {
      name: 'Dusk',
      ground: 'paper',
      ink: 'ink',
      values: { paper: { rest: '#eeeeee' }, ink: { rest: '#000000' } },
    })
    expect((await system.breaches('?theme=dusk')).map(({ number }) => number)).toEqual([2])
    await system.removeTheme('dusk')
    expect(await system.breaches('?status=resolved')).toMatchObject([
      { theme: 'dusk', closingReason: 'theme-removed' },
    ])
  })

  it('answers exempted where the accessibility lead says so', async () => {
    const exempt = { kind: 'decorative', reason: 'A pattern behind the timetable' }
    await system.editPair(pair, { exempt }, test.people.lead)
    expect(await closing()).toBe('resolved exempted')
    const { events } = await whole()
    expect(events[1].actor.name).toBe('Noor Haddad')
  })

  it('logs a breach of a theme that only reports with gating false, and lets the check pass', async () => {
    await system.patchTheme('light', { gating: false })
    expect(await only()).toMatchObject({ status: 'open', gating: false })
    expect(eventsOf(await whole())).toEqual(['opened'])
    expect(await system.check()).toMatchObject({ verdict: 'pass', counts: { breach: 1 } })
  })

  it('answers one entry for what two pairs declare of the same tokens', async () => {
    await system.addPair({
      foreground: 'soft',
      background: 'paper',
      use: 'text',
      product: 'kiosk',
      level: 'AAA',
    })
    expect(await only()).toMatchObject({ required: 7, number: 1 })
    await system.removePair(pair)
    expect(await only()).toMatchObject({ status: 'open', required: 7 })
    expect(eventsOf(await whole())).toEqual(['opened', 'worsened'])
  })
})
