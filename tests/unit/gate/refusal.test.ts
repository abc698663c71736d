import { describe, expect, it } from 'vitest'
import { NotACheck } from '#scripts/gate/check-call.ts'
import { planFrom } from '#scripts/gate/plan.ts'
import { refusalOf } from '#scripts/gate/refusal.ts'
import { NoAnswer } from '#scripts/gate/send.ts'
import { ApiError } from '#shared/client/client.ts'

const argv = 'gate --url http://127.0.0.1:4310 --system larkhaven --tokens a.json'.split(' ')
const planned = planFrom(argv, {}, (path) =>
  path === 'a.json' ? { ok: true, text: '{"a":{"$value":"x"}}' } : { ok: false, reason: '' },
)
if (planned.kind !== 'plan') throw new Error(planned.kind)
const { plan } = planned

const problem = (status: number, code: string, more: object = {}) =>
  new ApiError(status, {
    type: `/problems/${code}`,
    title: 'The request was read and refused',
    status,
    requestId: 'req_1',
    ...more,
  })

describe('what ends a run without a verdict', () => {
  it.each([
    [401, 4],
    [403, 4],
    [400, 2],
    [404, 2],
    [409, 2],
    [413, 2],
    [422, 2],
    [429, 3],
    [500, 3],
    [502, 3],
    [503, 3],
    [301, 3],
  ])('answers %i with exit code %i', (status, exitCode) => {
    expect(refusalOf(new ApiError(status, undefined), plan).exitCode).toBe(exitCode)
  })

  it.each([
    [new NoAnswer('ECONNREFUSED', 'connect ECONNREFUSED')],
    [new NoAnswer('TIMEOUT', 'No answer in time')],
    [new NotACheck('The answer is no check')],
    [new TypeError('unforeseen')],
    ['a thrown text'],
  ])('answers no verdict for %s', (failure) => {
    expect(refusalOf(failure, plan).exitCode).toBe(3)
  })

  it('answers every fault of a problem document at its place in a file', () => {
    const errors = [
      { pointer: '/tokens/a/$value', detail: 'Expected a CSS colour' },
      { pointer: '/tokens', detail: 'Too deep' },
      { parameter: 'findings', detail: 'Expected short or all' },
    ]
    const { lines } = refusalOf(problem(422, 'request-invalid', { errors }), plan)
    expect(lines).toEqual([
      'The request was read and refused (422, request-invalid).',
      '  a.json#/a/$value: Expected a CSS colour',
      '  a.json: Too deep',
      '  findings: Expected short or all',
      'Request req_1',
    ])
  })

  it('answers a hint where the key is not set, not known, or lacks its scope', () => {
    expect(refusalOf(problem(401, 'sign-in-required'), plan).lines).toContain(
      'DYEWRIGHT_KEY is not set.',
    )
    expect(refusalOf(problem(403, 'scope-missing'), plan).lines.join()).toContain('checks:write')
    expect(refusalOf(problem(404, 'not-found'), plan).lines.join()).toContain('larkhaven')
  })

  it('leaves no terminal escape of the wire', () => {
    const hostile = problem(422, 'x', { title: 'a\u001b[31m', errors: [{ detail: '\u001b[2Jb' }] })
    expect(refusalOf(hostile, plan).lines.join('')).not.toContain('\u001b')
  })

  it('answers a problem document whose errors are no list', () => {
    expect(refusalOf(problem(422, 'x', { errors: { a: 1 } }), plan).exitCode).toBe(2)
    expect(refusalOf(problem(422, 'x', { errors: [null, 5] }), plan).exitCode).toBe(2)
  })
})
