import { expect, it } from 'vitest'
import { applyEdits } from '#shared/checks/edits.ts'
import { system, token } from './model-builder.ts'

const model = { ...system({ tokens: [token('a', '#777777')] }), remainder: 'kept' }

it('leaves the remainder where it is not given, and answers the one given', () => {
  expect(applyEdits(model, {}).remainder).toBe('kept')
  expect(applyEdits(model, { remainder: 'new' }).remainder).toBe('new')
})

it('leaves no remainder where null is given', () => {
  expect(applyEdits(model, { remainder: null })).not.toHaveProperty('remainder')
})

it('leaves the model that it is given, and shares what does not change', () => {
  const edited = applyEdits(model, { tokens: { put: [token('a', '#888888')], remove: ['a'] } })
  expect(edited.tokens.map(({ id }) => id)).toEqual(['ground', 'ink', 'a'])
  expect(edited.tokens[2]).toEqual(token('a', '#888888'))
  expect(model.tokens[2]).toEqual(token('a', '#777777'))
  expect(edited.pairs).toBe(model.pairs)
})
