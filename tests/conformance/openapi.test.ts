import { Ajv2020 } from 'ajv/dist/2020.js'
import addFormats from 'ajv-formats'
import { describe, expect, it } from 'vitest'
import * as z from 'zod'
import { createDocument } from '#openapi/document.ts'
import { contracts } from '#shared/contracts/contracts.ts'
import { type Problem, PROBLEMS } from '#shared/contracts/problems.ts'
import { type Contract, problemsOf } from '#shared/contracts/route.ts'

/** @see https://spec.openapis.org/oas/v3.1.1 */
interface Media {
  readonly schema: object
  readonly example?: unknown
  readonly examples?: Record<string, { $ref: string }>
}
interface Response {
  readonly $ref?: string
  readonly description: string
  readonly headers?: Record<string, { $ref: string }>
  readonly content?: Record<string, Media>
}
interface Operation {
  readonly operationId: string
  readonly security: object[]
  readonly parameters?: { name: string; in: string; required: boolean; schema: object }[]
  readonly requestBody?: { required: boolean; content: Record<string, Media> }
  readonly responses: Record<string, Response>
}

const document = JSON.parse(JSON.stringify(createDocument())) as {
  openapi: string
  paths: Record<string, Record<string, Operation>>
  components: {
    schemas: Record<string, object>
    responses: Record<string, Response>
    examples: Record<string, { value: unknown }>
    headers: Record<string, object>
  }
}
const ajv = new Ajv2020({ strict: false, allErrors: true })
addFormats.default(ajv)
ajv.addSchema({ ...document, $id: 'urn:dyewright:document' })

const faultsOf = (schema: object, value: unknown): string => {
  const absolute = JSON.parse(JSON.stringify(schema).replaceAll('"#/', '"urn:dyewright:document#/'))
  const validate = ajv.compile(absolute)
  return validate(value) ? '' : ajv.errorsText(validate.errors)
}
const operationOf = ({ path, method }: Contract): Operation =>
  document.paths[path]?.[method.toLowerCase()] as Operation
const resolve = (response: Response): Response =>
  response.$ref === undefined
    ? response
    : (document.components.responses[response.$ref.split('/').at(-1) ?? ''] as Response)

const cases = contracts.map((contract) => [contract.operationId, contract] as const)

describe.each(cases)('%s', (_, contract) => {
  const operation = operationOf(contract)

  it('answers examples that keep to their schemas', () => {
    const success = operation.responses[contract.success.status] as Response
    const media = Object.values(success.content ?? {})
    if (contract.success.status !== 204) expect(media.length).toBeGreaterThan(0)
    for (const { schema, example } of media) {
      expect(example).toBeDefined()
      expect(faultsOf(schema, example)).toBe('')
    }
    for (const { schema, example } of Object.values(operation.requestBody?.content ?? {})) {
      expect(example).toBeDefined()
      expect(faultsOf(schema, example)).toBe('')
    }
  })

  it('reads its own example as the service does', () => {
    if (contract.body === undefined) return expect(operation.requestBody).toBeUndefined()
    expect(contract.body.safeParse(contract.bodyExample).error).toBeUndefined()
  })

  it('lists every code it can be refused with, under its status', () => {
    for (const code of problemsOf(contract)) {
      const response = operation.responses[PROBLEMS[code].status]
      const media = response && resolve(response).content?.['application/problem+json']
      expect(media?.examples?.[code]?.$ref).toBe(`#/components/examples/${code}`)
    }
  })

  it('names its parameters, its credentials and its validators', () => {
    const inPath = operation.parameters?.filter((one) => one.in === 'path').map(({ name }) => name)
    const inTemplate = [...contract.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name)
    expect(inPath ?? []).toEqual(inTemplate)
    expect(operation.security.length > 0).toBe(contract.access !== 'anyone')
    const ifMatch = operation.parameters?.find(({ name }) => name === 'If-Match')
    expect(ifMatch?.required).toBe(
      contract.precondition === undefined ? undefined : contract.precondition === 'required',
    )
    const names = operation.parameters?.map(({ name }) => name) ?? []
    expect(names.includes('Idempotency-Key')).toBe(
      contract.method === 'POST' && contract.access !== 'anyone',
    )
    if (contract.conditional) {
      expect(operation.responses[304]).toBeDefined()
      expect(operation.responses[200]?.headers?.ETag).toBeDefined()
    }
  })
})

it('answers 201 with the address of what was made, and both of a PUT that can make it', () => {
  const makes = contracts.filter(
    ({ success, precondition }) => success.status === 201 || precondition === 'create',
  )
  expect(makes.length).toBeGreaterThan(4)
  const made = makes.map(operationOf)
  for (const { responses } of made) expect(responses[201]?.headers?.Location).toBeDefined()
  const put = made.find(({ operationId }) => operationId === 'putTheme')?.responses
  expect(put?.[200]?.content).toEqual(put?.[201]?.content)
  expect(put?.[200]?.headers?.Location).toBeUndefined()
})

it('answers every operation under a name of its own, equal to its export', () => {
  const ids = Object.values(document.paths).flatMap((item) =>
    Object.values(item).map(({ operationId }) => operationId),
  )
  expect(ids.sort()).toEqual(contracts.map(({ operationId }) => operationId).sort())
  expect(new Set(ids).size).toBe(ids.length)
})

it('answers examples of problems that keep to the schema', () => {
  const schema = document.components.schemas.Problem as object
  for (const [code, { value }] of Object.entries(document.components.examples)) {
    expect(value).toMatchObject({ type: `/problems/${code}` })
    expect(faultsOf(schema, value)).toBe('')
  }
})

it('answers an example of every refusal of every operation, with what tells it from others', () => {
  const refused = contracts.flatMap((contract) =>
    Object.entries(operationOf(contract).responses)
      .filter(([status]) => Number(status) >= 400)
      .flatMap(([status, response]) => {
        const media = resolve(response).content?.['application/problem+json']
        return Object.keys(media?.examples ?? {}).map((code) => ({ status: Number(status), code }))
      }),
  )
  expect(refused.length).toBeGreaterThan(contracts.length * 5)
  for (const { status, code } of refused) {
    expect(document.components.examples[code]?.value).toMatchObject({ status })
  }
  const said = (code: string) => document.components.examples[code]?.value as Problem
  expect(said('precondition-failed')).toHaveProperty('current')
  expect(said('role-missing')).toHaveProperty('roles')
  expect(said('scope-missing')).toHaveProperty('scopes')
  expect(said('request-too-large')).toHaveProperty('limitBytes')
  for (const code of ['request-invalid', 'system-unresolvable'])
    expect(said(code).errors?.[0]).toHaveProperty('pointer')
  for (const code of ['parameter-invalid', 'precondition-required', 'media-type-unsupported'])
    expect(said(code).errors?.[0]).toHaveProperty('parameter')
})

/** Two schemas under one name: the generator keeps the first without a word. */
it('names no two schemas alike', () => {
  const byName = new Map<string, Set<z.ZodType>>()
  const seen = new Set<unknown>()
  const visit = (node: unknown): void => {
    if (typeof node !== 'object' || node === null || seen.has(node)) return
    seen.add(node)
    if (node instanceof z.ZodType) {
      const id = node.meta()?.id
      if (id !== undefined) byName.set(id, (byName.get(id) ?? new Set()).add(node))
      visit(node.def)
      if (node instanceof z.ZodObject) visit(node.shape)
      return
    }
    for (const member of Object.values(node)) visit(member)
  }
  for (const { params, query, body, success, alternatives } of contracts)
    visit([params, query, body, success.body, alternatives])
  expect(byName.size).toBeGreaterThan(40)
  const shared = [...byName].filter(([, schemas]) => schemas.size > 1).map(([name]) => name)
  expect(shared).toEqual([])
})

it('names every reference that it follows', () => {
  const text = JSON.stringify(document)
  for (const [, section, name] of text.matchAll(/"#\/components\/(\w+)\/([^"]+)"/g)) {
    const components = document.components as Record<string, Record<string, unknown>>
    expect(components[section ?? '']?.[name ?? '']).toBeDefined()
  }
})
