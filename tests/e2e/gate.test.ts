import { execFile } from 'node:child_process'
import { readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { promisify } from 'node:util'
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest'
import { larkhaven } from '#scripts/demo/larkhaven/larkhaven.ts'
import { createPeople } from '#scripts/demo/people.ts'
import { createDemoKey } from '#scripts/demo/seed-demo.ts'
import { createClient } from '#shared/client/client.ts'
import { getCheck, listChecks } from '#shared/contracts/checks.contract.ts'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { getSystem } from '#shared/contracts/systems.contract.ts'
import type { SarifLog } from '#shared/formats/sarif-log.ts'
import { type DemoService, startDemoService } from '#tests/support/demo-service.ts'
import { createGateProcess, type GateProcess, type GateRun } from '#tests/support/gate-process.ts'

const DEMO = fileURLToPath(new URL('../../scripts/demo/', import.meta.url))
const execute = promisify(execFile)
const params = { system: 'larkhaven' }
let service: DemoService
let key: string
let pipeline: GateProcess

beforeAll(async () => {
  service = await startDemoService()
  key = await createDemoKey(service)
  pipeline = createGateProcess()
})
afterAll(async () => {
  await service?.close()
  pipeline?.remove()
})

const gate = (
  options: readonly string[] = [],
  env: Readonly<Record<string, string>> = {},
): Promise<GateRun> =>
  pipeline.run(['gate', '--url', service.baseUrl, '--system', 'larkhaven', ...options], {
    DYEWRIGHT_KEY: key,
    ...env,
  })

describe('the demo over HTTP', () => {
  it('answers the head that the demo is said to have, one revision a step', async () => {
    const maintainer = await createPeople(service)('maintainer')
    const { body } = await maintainer(getSystem, { params })
    expect(body.counts).toEqual({ tokens: 122, pairs: 157, themes: 3, openBreaches: 10 })
    expect(body.head).toMatchObject({ revision: service.revisions, verdict: 'fail' })
    expect(service.revisions).toBe(larkhaven.length)
  })

  it('leaves a demo that is there as it is, and a key that opens the gate where none was kept', async () => {
    const file = join(pipeline.folder, 'ci-key')
    const args = [
      join(inject('dist'), 'demo/seed.js'),
      '--url',
      service.baseUrl,
      '--key-file',
      file,
    ]
    const seed = () => execute(process.execPath, args)
    expect((await seed()).stdout).toBe('Larkhaven Ferries is there already.\n')
    const made = readFileSync(file, 'utf8')
    expect(statSync(file).mode & 0o777).toBe(0o600)
    expect((await gate(['--new-only'], { DYEWRIGHT_KEY: made })).code).toBe(0)
    await seed()
    expect(readFileSync(file, 'utf8')).toBe(made)
  })
})

describe('the shipped change and its fix', () => {
  const candidate = (name: string) => [
    '--config',
    join(DEMO, 'dyewright.json'),
    '--tokens',
    join(DEMO, name),
  ]

  it('answers 1 to the change that breaches, and names its breaches', async () => {
    const { code, out } = await gate(candidate('breaching-change.tokens.json'))
    expect(code).toBe(1)
    expect(out).toContain('text.link on surface.hull, text')
    expect(out).toMatch(/light {2}rest +\d\.\d{4} +4\.5 +#[0-9a-f]{6} on #[0-9a-f]{6}/)
    expect(out).not.toContain('text.muted on surface.cabin')
  })

  it('answers 0 to the fix, and to the token file as it is', async () => {
    expect((await gate(candidate('fix.tokens.json'))).code).toBe(0)
    expect(await gate(['--config', join(DEMO, 'dyewright.json')])).toMatchObject({
      code: 0,
      err: '',
    })
  })

  it('answers 1 to the change laid over the whole token file, and says which wins', async () => {
    const files = ['larkhaven.tokens.json', 'breaching-change.tokens.json'].map((name) =>
      join(DEMO, name),
    )
    const { code, err } = await gate(['--new-only', '--tokens', ...files])
    expect(code).toBe(1)
    expect(err).toContain('sea.7 is set in two files')
  })
})

describe('a verdict', () => {
  it('answers 1 for the head as it stands, and 0 where only what is new counts', async () => {
    expect((await gate()).code).toBe(1)
    expect((await gate(['--new-only'])).code).toBe(0)
  })

  it('answers json that equals the check of the service', async () => {
    const { code, out, err } = await gate(['--format', 'json'])
    expect({ code, err }).toEqual({ code: 1, err: '' })
    const check = JSON.parse(out)
    const call = createClient({ ...service, headers: { authorization: `Bearer ${key}` } })
    const { body } = await call(getCheck, { params: { ...params, id: check.id } })
    expect(check).toEqual(body)
  })

  it('answers every format at once, all of the same check', async () => {
    const formats = ['text', 'json=check.json', 'sarif=check.sarif']
    const { code, out, err } = await gate(['--format', ...formats])
    expect({ code, err }).toEqual({ code: 1, err: '' })
    const written = (name: string) => JSON.parse(readFileSync(join(pipeline.folder, name), 'utf8'))
    const check = written('check.json')
    expect(out).toContain(`Check ${check.number} of larkhaven fails`)
    const served = await fetch(`${service.baseUrl}/v1/systems/larkhaven/checks/${check.id}`, {
      headers: { accept: 'application/sarif+json', authorization: `Bearer ${key}` },
    })
    expect(served.headers.get('content-type')).toBe('application/sarif+json')
    expect(written('check.sarif')).toEqual(await served.json())
  })

  it('answers SARIF whose errors are the gating breaches, and with new-only none', async () => {
    const levelsOf = async (...options: string[]) => {
      const { code, out } = await gate(['--format', 'sarif', ...options])
      const [run] = (JSON.parse(out) as SarifLog).runs
      return { code, levels: run?.results.map(({ level }) => level) }
    }
    const all = await levelsOf()
    expect(all.code).toBe(1)
    expect(all.levels).toContain('error')
    const fresh = await levelsOf('--new-only')
    expect(fresh.code).toBe(0)
    expect(fresh.levels).not.toContain('error')
    expect(fresh.levels).toContain('note')
  })

  it('answers a breach of a pair of the build', async () => {
    const pair = { foreground: 'sand.1', background: 'sand.2', use: 'text' }
    const pairs = pipeline.write('pairs.json', [pair])
    const { code, out } = await gate(['--new-only', '--pairs', pairs])
    expect(code).toBe(1)
    expect(out).toContain('sand.1 on sand.2, text')
  })

  it('leaves where the build comes from with the check', async () => {
    await gate(['--new-only'], {
      DYEWRIGHT_SOURCE_REPOSITORY: 'lark/quay',
      DYEWRIGHT_SOURCE_BRANCH: 'fog',
    })
    const maintainer = await createPeople(service)('maintainer')
    const { body } = await maintainer(listChecks, { params, query: { repository: 'lark/quay' } })
    expect(body.items[0]?.source).toEqual({ repository: 'lark/quay', branch: 'fog' })
  })

  it('answers without colour unless asked, and never with it under NO_COLOR', async () => {
    expect((await gate()).out).not.toContain('\u001b')
    const painted = (await gate([], { FORCE_COLOR: '1' })).out
    expect(painted).toContain('\u001b[38;2;')
    expect((await gate([], { FORCE_COLOR: '1', NO_COLOR: '1' })).out).not.toContain('\u001b')
  })
})

describe('usage and configuration', () => {
  it.each([
    ['an unknown flag', ['--nope'], "unknown option '--nope'"],
    ['a file that is not there', ['--tokens', 'none.json'], 'none.json cannot be read'],
    ['an unknown format', ['--format', 'xml'], 'There is no format "xml"'],
    [
      'a file that cannot be written',
      ['--format', 'json=no/such/folder.json'],
      'cannot be written',
    ],
  ])('answers 2 to %s', async (_, options, reason) => {
    const { code, err } = await gate(options)
    expect({ code, err }).toEqual({ code: 2, err: expect.stringContaining(reason) })
  })

  it('answers 2 to an unknown key in the configuration, by name', async () => {
    const { code, err } = await gate([
      '--config',
      pipeline.write('bad.json', { sistem: 'larkhaven' }),
    ])
    expect({ code, err }).toEqual({ code: 2, err: expect.stringContaining('"sistem"') })
  })

  it('answers 2 with the place of every fault that the service finds', async () => {
    const pairs = pipeline.write('unknown.json', [
      { foreground: 'no.such', background: 'sand.1', use: 'text' },
    ])
    const named = await gate(['--pairs', pairs])
    expect(named.code).toBe(2)
    expect(named.err).toContain('unknown.json#/0/foreground')

    const colour = {
      sea: { '7': { $type: 'color', $value: { colorSpace: 'srgb', components: [2, 0, 0] } } },
    }
    const files = [pipeline.write('fine.json', { a: {} }), pipeline.write('colour.json', colour)]
    const refused = await gate(['--tokens', ...files])
    expect(refused.code).toBe(2)
    expect(refused.err).toContain('colour.json#/sea/7/$value')
  })

  it('answers 2 to a revision that nobody released, and to a system that is not there', async () => {
    expect((await gate(['--against', '1.0.0'])).code).toBe(2)
    expect((await gate(['--system', 'nowhere'])).code).toBe(2)
  })

  it('answers help with 0, and no command at all with 2', async () => {
    expect(await pipeline.run(['gate', '--help'])).toMatchObject({ code: 0, err: '' })
    expect((await pipeline.run([])).code).toBe(2)
  })
})

describe('a key that is refused', () => {
  it('answers 4 without a key, and says that none is set', async () => {
    const { code, err } = await gate([], { DYEWRIGHT_KEY: '' })
    expect({ code, err }).toEqual({
      code: 4,
      err: expect.stringContaining('DYEWRIGHT_KEY is not set'),
    })
  })

  it('answers 4 to a wrong key, and prints it nowhere', async () => {
    const wrong = 'dyw_ci_0000000000000000000000000000'
    const { code, out, err } = await gate([], { DYEWRIGHT_KEY: wrong })
    expect(code).toBe(4)
    expect(out + err).not.toContain(wrong)
  })

  it('answers 4 to a key without the scope, which it names', async () => {
    const engineer = await createPeople(service)('engineer')
    const { body } = await engineer(createKey, {
      params,
      body: { name: 'Reader', scopes: ['themes:read'] },
    })
    const { code, err } = await gate([], { DYEWRIGHT_KEY: String(body.key) })
    expect({ code, err }).toEqual({ code: 4, err: expect.stringContaining('checks:write') })
  })
})
