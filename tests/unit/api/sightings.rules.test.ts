import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { branchIn, isProtectedBranch } from '#api/features/breaches/sightings.rules.ts'

const isNamed = (pattern: string, branch: string) =>
  isProtectedBranch([{ repository: '*', branch: pattern }], { repository: 'r', branch })

describe('a protected branch', () => {
  it.each([
    ['main', 'main', true],
    ['main', 'main2', false],
    ['main', 'Main', false],
    ['release/*', 'release/3.2', true],
    ['release/*', 'release/', true],
    ['release/*', 'release', false],
    ['*', '', true],
    ['*', 'any/thing', true],
    ['*-stable', '3-stable', true],
    ['*-stable', '3-stable-x', false],
    ['a*a', 'a', false],
    ['a*a', 'aa', true],
    ['a*b*c', 'a-b-b-c', true],
    ['a*b*c', 'a-c-b', false],
    ['ma.n', 'main', false],
    ['ma[i]n', 'main', false],
    ['', '', true],
    ['', 'main', false],
  ])('of the pattern %j and the name %j answers %s', (pattern, name, named) => {
    expect(isNamed(pattern, name)).toBe(named)
  })

  it('answers as a regular expression of the same pattern does', () => {
    const text = fc.string({ unit: fc.constantFrom('a', 'b', '*', '/'), maxLength: 9 })
    const name = fc.string({ unit: fc.constantFrom('a', 'b', '/'), maxLength: 12 })
    fc.assert(
      fc.property(text, name, (pattern, branch) => {
        const expression = new RegExp(`^${pattern.replaceAll('*', '.*')}$`, 's')
        expect(isNamed(pattern, branch)).toBe(expression.test(branch))
      }),
      { numRuns: 2_000 },
    )
  })

  it('takes both parts of one pattern, not one of each', () => {
    const patterns = [
      { repository: 'quay/a', branch: 'main' },
      { repository: 'quay/b', branch: 'next' },
    ]
    expect(isProtectedBranch(patterns, { repository: 'quay/a', branch: 'main' })).toBe(true)
    expect(isProtectedBranch(patterns, { repository: 'quay/a', branch: 'next' })).toBe(false)
    expect(isProtectedBranch([], { repository: 'quay/a', branch: 'main' })).toBe(false)
  })
})

describe('the branch of a source', () => {
  it('answers its name, also from a whole ref, and nothing where a part is left out', () => {
    const repository = 'quay/a'
    expect(branchIn({ repository, branch: 'main' })).toEqual({ repository, branch: 'main' })
    expect(branchIn({ repository, branch: 'refs/heads/a/b' })?.branch).toBe('a/b')
    expect(branchIn({ repository, branch: 'refs/tags/v1' })?.branch).toBe('refs/tags/v1')
    expect(branchIn({ repository })).toBeUndefined()
    expect(branchIn({ branch: 'main' })).toBeUndefined()
    expect(branchIn(undefined)).toBeUndefined()
  })
})
