import { describe, expect, it } from 'vitest'
import { keptTrial } from '#console/features/tokens/kept-trial.ts'

const kept = { token: 'tok_a', text: 'oklch(0.5 0.1 150)', message: 'Deeper' }

describe('a trial that is kept through signing in', () => {
  it('answers what was typed, to its own token', () => {
    expect(keptTrial({ kept }, 'tok_a')).toEqual(kept)
  })

  it('leaves it from another token, and from a history entry that kept nothing', () => {
    expect(keptTrial({ kept }, 'tok_b')).toBeUndefined()
    for (const state of [null, undefined, {}, { kept: { token: 'tok_a' } }, 'kept']) {
      expect(keptTrial(state, 'tok_a')).toBeUndefined()
    }
  })
})
