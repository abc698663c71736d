import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readTrial, shortOklch } from '#console/features/tokens/trial.ts'
import { renderColor } from '#shared/color/render.ts'

const ids = (name: string) => (name === 'sand.1' ? 'tok_sand' : undefined)

describe('what is written into the field', () => {
  it('answers the notation, the gamut and the hex of a colour', () => {
    const reading = readTrial('oklch(0.465 0.128 243)', ids)
    // Value from the design specification: outside sRGB, shown as #005f9a.
    expect(reading).toMatchObject({ kind: 'color', notation: 'OKLCH', hex: '#005f9a' })
    expect(reading.kind === 'color' && reading.rendered.gamut).toBe('p3')
  })

  it.each([
    ['#2283c1', 'hex'],
    ['RGB(34 131 193)', 'sRGB'],
    ['hsl(200 50% 50%)', 'HSL'],
    ['color(display-p3 0.1 0.4 0.6)', 'Display P3'],
    ['rebeccapurple', 'a CSS name'],
  ])('answers %s as %s', (text, notation) => {
    expect(readTrial(text, ids)).toMatchObject({ kind: 'color', notation })
  })

  it('answers a token in braces as an alias, and names the one that is missing', () => {
    expect(readTrial(' {sand.1} ', ids)).toEqual({
      kind: 'alias',
      name: 'sand.1',
      value: { kind: 'alias', token: 'tok_sand' },
    })
    expect(readTrial('{sand.99}', ids)).toEqual({
      kind: 'unread',
      reason: 'There is no token sand.99.',
    })
  })

  it.each(['', 'nonsense', 'calc(1)', 'currentcolor'])('refuses %j with a reason', (text) => {
    const reading = readTrial(text, ids)
    expect(reading.kind).toBe('unread')
    expect(reading.kind === 'unread' && reading.reason).toMatch(/^[^a-z].*\.$/)
  })

  it('leaves a colour within one level of its bytes when it is written short', () => {
    fc.assert(
      fc.property(
        fc.record({
          l: fc.double({ min: 0.05, max: 0.95, noNaN: true }),
          c: fc.double({ min: 0, max: 0.04, noNaN: true }),
          h: fc.double({ min: 0, max: 359.9, noNaN: true }),
        }),
        (part) => {
          const color = { ...part, alpha: 1 }
          const again = readTrial(shortOklch(color), ids)
          if (again.kind !== 'color') return false
          const [whole, short] = [renderColor(color), again.rendered]
          return (['r', 'g', 'b'] as const).every((at) => Math.abs(whole[at] - short[at]) <= 1)
        },
      ),
    )
  })
})
