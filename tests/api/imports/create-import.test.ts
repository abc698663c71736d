import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const imported = async (system: SampleSystem, document: object, query = ''): Promise<ImportWire> =>
  (await system.maintainer.post(`${system.url}/imports${query}`).send(document).expect(200)).body

const revisionOf = async ({ url, maintainer }: SampleSystem): Promise<number> =>
  (await maintainer.get(url).expect(200)).body.head.revision

const sourceOf = async ({ url, maintainer }: SampleSystem, name: string) =>
  (await maintainer.get(`${url}/tokens/${encodeURIComponent(name)}`).expect(200)).body.value

const namesIn = async ({ url, maintainer }: SampleSystem): Promise<string[]> => {
  const { body } = await maintainer.get(`${url}/tokens`).expect(200)
  return body.items.map(({ name }: { name: string }) => name)
}

const ACTION = {
  action: { fill: dtcgHex('#2283c1'), label: { $type: 'color', $value: '{paper}' } },
}

describe('merge', () => {
  it('answers one revision with what it added, edited and left', async () => {
    const system = await createSampleSystem(test)
    const before = await revisionOf(system)
    const answer = await imported(system, { ...ACTION, ink: dtcgHex('#101010') })
    expect(answer).toMatchObject({
      dryRun: false,
      mode: 'merge',
      written: true,
      counts: { tokens: { added: 2, edited: 1, removed: 0, unchanged: 1 } },
      effect: { revision: before + 1 },
    })
    expect(answer.changes.map(({ operation, name }) => `${operation} ${name}`)).toEqual([
      'edited ink',
      'added action.fill',
      'added action.label',
    ])
    expect(await sourceOf(system, 'action.label')).toBe('{paper}')
    const { body } = await system.maintainer.get(`${system.url}/revisions/${before + 1}`)
    expect(body.origin).toBe('import')
    expect(body).not.toHaveProperty('other')
  })

  it('answers before and after of an edited token, and nothing that stayed', async () => {
    const system = await createSampleSystem(test)
    const answer = await imported(system, { ink: dtcgHex('#202020') }, '?dryRun=true')
    expect(answer.changes).toHaveLength(1)
    expect(Object.keys(answer.changes[0]?.before ?? {})).toEqual(['value'])
    expect(Object.keys(answer.changes[0]?.after ?? {})).toEqual(['value'])
  })

  it('answers what a token comes to on both sides, as the strip shows it, and the grounds', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('link', '#0000cc', { states: ['hover'] })
    const ledger = async (name: string) => {
      const { body } = await system.maintainer.get(`${system.url}/tokens/${name}`).expect(200)
      const { light } = body.resolved
      return { light: { rest: light.rest.hex, ...(light.hover && { hover: light.hover.hex }) } }
    }
    const before = await ledger('link')
    const file = { link: dtcgHex('#0000aa'), mark: dtcgHex('#112233') }
    const answer = await imported(system, file)
    const [edited, added] = answer.changes
    expect(edited?.colors).toEqual({ before, after: await ledger('link') })
    expect(added?.colors).toEqual({ after: { light: { rest: '#112233' } } })
    expect(answer.grounds.after).toEqual({ light: (await ledger('paper')).light.rest })
    expect(answer.grounds.before).toEqual(answer.grounds.after)
  })

  it('leaves states, overrides and rules that the file does not give', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('link', '#0000cc', {
      states: ['hover'],
      values: { light: { hover: '#000099' } },
      rules: { states: { hover: { lightness: 0.2 } } },
    })
    await imported(system, { link: dtcgHex('#0000aa') })
    const { body } = await system.maintainer.get(`${system.url}/tokens/link`).expect(200)
    expect(body.states).toEqual(['hover'])
    expect(Object.keys(body.values.light)).toEqual(['hover'])
    expect(body.rules.states.hover.lightness).toBe(0.2)
  })

  it('answers no revision where nothing changes', async () => {
    const system = await createSampleSystem(test)
    await imported(system, ACTION)
    const before = await revisionOf(system)
    const again = await imported(system, ACTION)
    expect(again).toMatchObject({ written: false, changes: [], effect: { revision: before } })
    expect(await revisionOf(system)).toBe(before)
  })

  it('answers a rename of the token whose id the file gives; pairs and aliases follow', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('note', '{ink}')
    const { body } = await system.maintainer.get(`${system.url}/tokens/ink`).expect(200)
    const renamed = { ...dtcgHex('#000000'), $extensions: { 'dev.dyewright': { id: body.id } } }
    const answer = await imported(system, { text: renamed })
    expect(answer.counts.tokens).toMatchObject({ added: 0, removed: 0 })
    expect(await namesIn(system)).toEqual(['paper', 'text', 'note'])
    expect(await sourceOf(system, 'note')).toBe('{text}')
  })

  it('answers a revision of its own where only what is no colour changes, under its message', async () => {
    const system = await createSampleSystem(test)
    const before = await revisionOf(system)
    const space = { space: { $type: 'dimension', $value: { value: 4, unit: 'px' } } }
    const answer = await imported(system, space, '?message=Spaces%20too')
    expect(answer).toMatchObject({ written: true, effect: { revision: before + 1 } })
    expect(answer.changes).toMatchObject([{ item: 'other', operation: 'edited' }])
    const { body } = await system.maintainer.get(`${system.url}/revisions/${before + 1}`)
    expect(body).toMatchObject({
      message: 'Spaces too',
      edits: [{ item: 'other', operation: 'added' }],
      other: { document: space },
    })
    expect(await imported(system, space)).toMatchObject({ written: false, changes: [] })
  })

  it('answers breaches that it opens, as any direct write', async () => {
    const system = await createSampleSystem(test)
    await system.addPair({ foreground: 'ink', background: 'paper', use: 'text' })
    await system.addToken('muted', '#333333')
    await system.addPair({ foreground: 'muted', background: 'paper', use: 'text' })
    const answer = await imported(system, { muted: dtcgHex('#bbbbbb') })
    expect(answer.effect.opened).toMatchObject([{ foreground: 'muted', outcome: 'breach' }])
    expect(answer.check).toMatchObject({ verdict: 'fail', counts: { breach: 1 } })
    expect(await system.breaches('?status=open')).toHaveLength(1)
    const back = await imported(system, { muted: dtcgHex('#333333') })
    expect(back.effect.resolved).toHaveLength(1)
    expect(back.check.verdict).toBe('pass')
  })
})

describe('a dry run', () => {
  it('answers what would change and leaves everything as it was', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('muted', '#333333')
    await system.addPair({ foreground: 'muted', background: 'paper', use: 'text' })
    const before = await revisionOf(system)
    const file = { ...ACTION, muted: dtcgHex('#bbbbbb') }
    const answer = await imported(system, file, '?dryRun=true')
    expect(answer).toMatchObject({
      dryRun: true,
      written: false,
      counts: { tokens: { added: 2, edited: 1 } },
      effect: { revision: before, verdict: 'fail' },
      check: { verdict: 'fail', findings: [{ foreground: 'muted' }] },
    })
    expect(answer.effect.opened).toHaveLength(1)
    expect(await revisionOf(system)).toBe(before)
    expect(await namesIn(system)).not.toContain('action.fill')
    expect(await system.breaches()).toEqual([])
  })
})

describe('replace', () => {
  const asAdmin = (system: SampleSystem, document: object, query = '?mode=replace') =>
    test.people.admin.post(`${system.url}/imports${query}`).send(document)

  it('answers the removal of what the file lacks', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('spare', '#00ff00')
    const file = { paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000'), mark: dtcgHex('#ff0000') }
    const { body } = await asAdmin(system, file).expect(200)
    expect(body.counts.tokens).toEqual({ added: 1, edited: 0, removed: 1, unchanged: 2 })
    expect(await namesIn(system)).toEqual(['paper', 'ink', 'mark'])
  })

  it('refuses to remove what a pair, an alias or a theme uses, and names each', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('muted', '#333333')
    await system.addPair({ foreground: 'muted', background: 'paper', use: 'text' })
    const { body } = await asAdmin(system, { ink: dtcgHex('#000000') }).expect(409)
    expect(body.type).toBe('/problems/token-in-use')
    const details = body.errors.map(({ detail }: { detail: string }) => detail).join('\n')
    expect(details).toContain('paper is not in the file')
    expect(details).toContain('theme light as ground')
    expect(details).toContain('muted is not in the file')
    expect(await namesIn(system)).toEqual(['paper', 'ink', 'muted'])
  })

  it('refuses a reference to a token that only the system has', async () => {
    const system = await createSampleSystem(test)
    const file = { paper: dtcgHex('#ffffff'), mark: { $type: 'color', $value: '{ink}' } }
    const { body } = await asAdmin(system, file).expect(422)
    expect(body.errors).toMatchObject([{ pointer: '/mark/$value' }])
  })

  it('answers a maintainer what it weakens on a dry run, and refuses it for good', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('spare', '#00ff00')
    const file = { paper: dtcgHex('#ffffff'), ink: dtcgHex('#000000') }
    const before = await revisionOf(system)
    const { body } = await system.maintainer
      .post(`${system.url}/imports?mode=replace`)
      .send(file)
      .expect(403)
    expect(body.type).toBe('/problems/weakening-needs-approval')
    expect(await revisionOf(system)).toBe(before)
    const dry = await imported(system, file, '?mode=replace&dryRun=true')
    expect(dry.weakens).toMatchObject([{ code: 'import-replaces' }])
  })
})

describe('locks', () => {
  it('refuses to move a locked colour, names every one, and takes an unlocking file', async () => {
    const system = await createSampleSystem(test)
    await system.addToken('a', '#111111', { locked: true })
    await system.addToken('b', '#222222', { locked: true })
    const file = { a: dtcgHex('#aaaaaa'), b: dtcgHex('#bbbbbb') }
    const url = `${system.url}/imports`
    const { body } = await system.maintainer.post(url).send(file).expect(409)
    expect(body.type).toBe('/problems/token-locked')
    expect(body.errors).toHaveLength(2)
    const unlocked = { $extensions: { 'dev.dyewright': { locked: false } } }
    await imported(system, { a: { ...file.a, ...unlocked }, b: { ...file.b, ...unlocked } })
    await imported(system, { a: file.a })
  })
})

describe('rights', () => {
  const keyWith = async (system: SampleSystem, scopes: string[]) => {
    const key = await system.maintainer.post(`${system.url}/keys`).send({ name: 'ci', scopes })
    return test.withKey(key.body.key)
  }
  const PAIRS = {
    $extensions: {
      'dev.dyewright': { pairs: [{ foreground: 'ink', background: 'paper', use: 'text' }] },
    },
  }

  it('answers a key that writes tokens, and refuses it pairs', async () => {
    const system = await createSampleSystem(test)
    const key = await keyWith(system, ['tokens:write'])
    await key.post(`${system.url}/imports`).send(ACTION).expect(200)
    const { body } = await key.post(`${system.url}/imports`).send(PAIRS).expect(403)
    expect(body.type).toBe('/problems/scope-missing')
    await imported(system, PAIRS)
    await key.post(`${system.url}/imports`).send(PAIRS).expect(200)
  })

  it('refuses a maintainer an exemption', async () => {
    const system = await createSampleSystem(test)
    const [pair] = PAIRS.$extensions['dev.dyewright'].pairs
    const exempt = { kind: 'logotype', reason: 'The name of the line' }
    const file = { $extensions: { 'dev.dyewright': { pairs: [{ ...pair, exempt }] } } }
    const url = `${system.url}/imports`
    const { body } = await system.maintainer.post(url).send(file).expect(403)
    expect(body.detail).toContain('accessibility-lead')
    await test.people.admin.post(url).send(file).expect(200)
  })

  it('refuses every write where edits are reviewed, and still answers a dry run', async () => {
    const system = await createSampleSystem(test)
    await system.patchSettings({ writeMode: 'review' })
    const url = `${system.url}/imports`
    const { body } = await system.maintainer.post(url).send(ACTION).expect(409)
    expect(body.type).toBe('/problems/review-required')
    expect((await imported(system, ACTION, '?dryRun=true')).counts.tokens.added).toBe(2)
  })
})
