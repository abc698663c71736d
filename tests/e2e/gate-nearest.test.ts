import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createPeople } from '#scripts/demo/people.ts'
import { createDemoKey } from '#scripts/demo/seed-demo.ts'
import type { Call } from '#shared/client/client.ts'
import type { CheckFindingWire, CheckWire } from '#shared/contracts/checks.contract.ts'
import { getToken } from '#shared/contracts/tokens.contract.ts'
import { type DemoService, startDemoService } from '#tests/support/demo-service.ts'
import { createGateProcess, type GateProcess } from '#tests/support/gate-process.ts'

const CHANGE = fileURLToPath(
  new URL('../../scripts/demo/breaching-change.tokens.json', import.meta.url),
)
let service: DemoService
let key: string
let pipeline: GateProcess
let engineer: Call

beforeAll(async () => {
  service = await startDemoService()
  key = await createDemoKey(service)
  engineer = await createPeople(service)('engineer')
  pipeline = createGateProcess()
})
afterAll(async () => {
  await service?.close()
  pipeline?.remove()
})

type Node = Record<string, unknown>
type Nearest = NonNullable<CheckFindingWire['nearest']>

/** A failing run: the text, and the gating breaches of the same check. */
async function failing(options: readonly string[]) {
  const { code, out, err } = await gate([...options, '--format', 'text', 'json=check.json'])
  expect({ code, err }).toEqual({ code: 1, err: '' })
  const check: CheckWire = JSON.parse(readFileSync(join(pipeline.folder, 'check.json'), 'utf8'))
  const breaches = check.findings.filter(({ outcome, gating }) => outcome === 'breach' && gating)
  return { text: out.replace(/\s+/g, ' '), breaches }
}

const gate = (options: readonly string[]) =>
  pipeline.run(['gate', '--url', service.baseUrl, '--system', 'larkhaven', ...options], {
    DYEWRIGHT_KEY: key,
  })

/** The document with each suggestion where it says: as the token's value, or as an override of it. */
async function applied(document: Node, breaches: readonly CheckFindingWire[]): Promise<Node> {
  const changed = structuredClone(document)
  for (const { nearest } of breaches) {
    if (nearest === undefined) continue
    const { body } = await engineer(getToken, {
      params: { system: 'larkhaven', name: nearest.token },
    })
    set(changed, nearest, { $value: body.value, values: body.values })
  }
  return changed
}

function set(document: Node, { token, theme, state, source, color }: Nearest, standing: Node) {
  let node = document
  for (const segment of token.split('.')) {
    node[segment] ??= {}
    node = node[segment] as Node
  }
  node.$type = 'color'
  node.$value ??= standing.$value
  if (source) {
    node.$value = color
    return
  }
  node.$extensions ??= { 'dev.dyewright': { values: structuredClone(standing.values) } }
  const { values } = (node.$extensions as Record<string, { values: Record<string, Node> }>)[
    'dev.dyewright'
  ]!
  values[theme] = { ...values[theme], [state]: color }
}

describe('the shipped change that breaches', () => {
  it('answers the nearest colours, which make it pass', async () => {
    const { text, breaches } = await failing(['--new-only', '--tokens', CHANGE])
    expect(breaches.length).toBeGreaterThan(0)
    for (const { nearest } of breaches) {
      expect(nearest?.token).toBe('sea.7')
      const said = `oklch(${nearest?.color.components.join(' ')}) ${nearest?.hex} for sea.7`
      expect(text).toContain(`the nearest that passes: ${said}`)
    }
    const document = JSON.parse(readFileSync(CHANGE, 'utf8')) as Node
    const mended = pipeline.write('mended.json', await applied(document, breaches))
    expect((await gate(['--new-only', '--tokens', mended])).code).toBe(0)
  })
})

describe('the head of the demo', () => {
  it('answers for each of its breaches a colour; with all of them it passes', async () => {
    const { breaches } = await failing([])
    expect(breaches.map(({ nearest }) => nearest).filter((one) => !one)).toEqual([])
    const mended = pipeline.write('head.json', await applied({}, breaches))
    expect((await gate(['--tokens', mended])).code).toBe(0)
  })
})
