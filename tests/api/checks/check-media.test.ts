import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SarifLog } from '#shared/formats/sarif-log.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem

beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  for (const foreground of ['ink', 'soft']) {
    await system.addPair({ foreground, background: 'paper', use: 'text' })
  }
})
afterAll(() => test.close())

const post = (body: object, query = '') =>
  system.maintainer.post(`${system.url}/checks${query}`).send(body)

describe('createCheck by Accept', () => {
  const mediaOf = async (accept: string) => {
    const { headers } = await post({}).set('Accept', accept).expect(200)
    expect(headers.vary).toContain('Accept')
    return headers['content-type']?.split(';')[0]
  }

  it('answers a failing check as a SARIF log of the same findings', async () => {
    const answer = await post({}).set('Accept', 'application/sarif+json').expect(200)
    expect(answer.headers['content-type']).toBe('application/sarif+json')
    const log = JSON.parse(answer.text)
    const { findings } = await system.check()
    expect(log).toMatchObject({
      version: '2.1.0',
      runs: [
        {
          automationDetails: { id: expect.stringMatching(/^dyewright\/sample-\d+\/\d+$/) },
          properties: { verdict: 'fail', counts: { breach: 1 } },
          results: [
            {
              ruleId: 'WCAG-1.4.3',
              level: 'error',
              locations: [{ logicalLocations: [{ fullyQualifiedName: 'soft' }] }],
              partialFingerprints: { 'findingIdentity/v1': findings[0]?.fingerprint },
            },
          ],
        },
      ],
    })
  })

  it('answers known breaches as notes, and passes where they are asked for', async () => {
    const levels = async (body: object, query = '') => {
      const { text } = await post(body, query).set('Accept', 'application/sarif+json').expect(200)
      return (JSON.parse(text) as SarifLog).runs[0]?.results.map(
        ({ kind, level }) => `${kind} ${level}`,
      )
    }
    expect(await levels({ newOnly: true })).toEqual(['fail note'])
    expect(await levels({}, '?findings=all')).toEqual(['pass none', 'fail error'])
  })

  it('answers the form that is preferred, JSON where none is', async () => {
    const [json, sarif] = ['application/json', 'application/sarif+json']
    expect(await mediaOf(`${json};q=0.4, ${sarif};q=0.5`)).toBe(sarif)
    expect(await mediaOf(`${sarif};q=0.4, ${json};q=0.5`)).toBe(json)
    expect(await mediaOf(`${sarif}, */*;q=0.1`)).toBe(sarif)
    expect(await mediaOf(`${json};q=0, */*`)).toBe(sarif)
    expect(await mediaOf('APPLICATION/SARIF+JSON')).toBe(sarif)
    expect(await mediaOf('application/*')).toBe(json)
    expect(await mediaOf(`image/png, ${sarif};q=0.1`)).toBe(sarif)
  })

  it('answers JSON to a browser, whatever else it takes', async () => {
    expect(await mediaOf('text/html, application/sarif+json')).toBe('application/json')
    expect(await mediaOf('application/sarif+json, Text/HTML;q=0.1')).toBe('application/json')
  })

  it('refuses a media type that it cannot give, but not what a browser asks for', async () => {
    for (const type of ['image/png', 'application/sarif+json;q=0', 'text/*']) {
      const { body } = await post({}).set('Accept', type).expect(406)
      expect(body.type).toBe('/problems/not-acceptable')
      expect(body.detail).toContain('application/sarif+json')
    }
    const browser = 'text/html,application/xhtml+xml,application/xml;q=0.9'
    for (const type of ['application/json', '*/*', 'application/*', browser]) {
      const { headers } = await post({}).set('Accept', type).expect(200)
      expect(headers['content-type']).toMatch(/^application\/json/)
    }
  })
})
