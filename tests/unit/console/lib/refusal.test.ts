import { describe, expect, it } from 'vitest'
import { readNumber } from '#console/lib/read-number.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { valueText } from '#console/lib/value-words.ts'
import { ApiError } from '#shared/client/client.ts'

const problem = (status: number, members: object = {}) => ({
  type: '/problems/request-invalid',
  title: 'The request was read and refused',
  status,
  requestId: 'req_1',
  ...members,
})

describe('a write that was not taken', () => {
  it('answers its faults by the place they lie at, or under', () => {
    const errors = [{ pointer: '/rule/chroma', detail: 'too large' }]
    const refusal = writeRefusal(new ApiError(422, problem(422, { errors })))
    expect(faultAt(refusal, '/rule')).toBe('Too large.')
    expect(faultAt(refusal, '/rules')).toBeUndefined()
  })

  it('answers what is there now where it has changed, and tells it from other ends', () => {
    const current = { etag: '"2"' }
    const changed = writeRefusal(new ApiError(412, problem(412, { current })))
    expect([changed.kind, changed.current]).toEqual(['changed', current])
    const kinds = [new ApiError(401, undefined), new ApiError(409, undefined), new TypeError('x')]
    expect(kinds.map((error) => writeRefusal(error).kind)).toEqual([
      'signed-out',
      'refused',
      'unreachable',
    ])
  })
})

describe('a number that was written', () => {
  it.each([
    ['', {}],
    [' 0.5 ', { value: 0.5 }],
    ['.5', { value: 0.5 }],
    ['−1', { value: -1 }],
    ['+1', { value: 1 }],
  ])('answers %j with what it says', (text, reading) => {
    expect(readNumber(text, -1, 1)).toEqual(reading)
  })

  it.each(['2', 'x', '1e-1', '0x1', '1,5', '-'])('refuses %j with its range', (text) => {
    expect(readNumber(text, -1, 1)).toEqual({ fault: 'Write a number from -1 to 1.' })
  })
})

describe('a value in words', () => {
  it('answers a colour as CSS, an alias as it is, a derivation with what it changes', () => {
    const components: [number, number, number] = [0.585, 0.128, 243]
    expect(valueText({ colorSpace: 'oklch', components, alpha: 0.5 })).toBe(
      'oklch(0.585 0.128 243 / 0.5)',
    )
    expect(valueText('{sand.1}')).toBe('{sand.1}')
    expect(valueText({ derive: '{a.b}', lightness: -0.1, chroma: 0.5 })).toBe(
      'from {a.b} lightness − 0.1, chroma × 0.5',
    )
  })
})
