import { describe, expect, it } from 'vitest'
import {
  bandOf,
  groupOf,
  MOST_BANDS,
  placeBands,
  type StripBand,
  stripGroups,
} from '#console/ui/strip-geometry.ts'
import { ratioPosition } from '#console/ui/ratio-scale.ts'

const band = (name: string, breach?: 'light'): StripBand => ({
  name,
  href: `/${name}`,
  light: '#ffffff',
  dark: '#000000',
  ...(breach === undefined ? {} : { breach }),
})

describe('the strip', () => {
  it('answers bands by the pitch (height − gaps) ÷ tokens, 1 px between them and 3 between groups', () => {
    const groups = [[band('a.1'), band('a.2')], [band('b.1')]]
    const placed = placeBands(groups, 93)
    expect(placed.map(({ top, high }) => [top, high])).toEqual([
      [0, 29],
      [30, 29],
      [63, 29],
    ])
    expect(placed.map(({ index }) => index)).toEqual([0, 1, 2])
  })

  it('leaves the last band at the foot of the page, however many there are', () => {
    for (const count of [1, 7, 117, 300]) {
      const placed = placeBands([Array.from({ length: count }, (_, at) => band(`a.${at}`))], 900)
      const last = placed.at(-1)!
      expect(last.top + 900 / count).toBeCloseTo(900, 6)
      expect(last.high).toBeGreaterThan(0)
    }
  })

  it('answers groups by the first segment, in ledger order', () => {
    const groups = stripGroups(
      [band('surface.deck'), band('text.link'), band('surface.hull')],
      String,
    )
    expect(groups.map((group) => group.map(({ name }) => name))).toEqual([
      ['surface.deck', 'surface.hull'],
      ['text.link'],
    ])
    expect(groupOf('plain')).toBe('plain')
  })

  it('answers one band a group over 300 tokens, with the breach of the group shown', () => {
    const many = Array.from({ length: MOST_BANDS + 1 }, (_, at) =>
      band(`g${at % 3}.t${at}`, at === 4 ? 'light' : undefined),
    )
    const [bands = []] = stripGroups(many, (group) => `?group=${group}`)
    expect(bands.map(({ name, href, breach }) => [name, href, breach])).toEqual([
      ['g0', '?group=g0', undefined],
      ['g1', '?group=g1', 'light'],
      ['g2', '?group=g2', undefined],
    ])
  })

  it('answers the band of a token, or of its group where bands are groups', () => {
    const placed = placeBands([[band('a.1'), band('b')]], 100)
    expect(bandOf(placed, 'a.1')?.index).toBe(0)
    expect(bandOf(placed, 'b.7')?.index).toBe(1)
    expect(bandOf(placed, 'c.1')).toBeUndefined()
  })

  it('answers no band for no token', () => {
    expect(placeBands([], 900)).toEqual([])
  })
})

describe('the ratio ruler', () => {
  it('answers places by ln(r) ÷ ln(21)', () => {
    expect(ratioPosition(1, 244)).toBe(0)
    expect(ratioPosition(21, 244)).toBe(244)
    expect(ratioPosition(Math.sqrt(21), 244)).toBeCloseTo(122, 9)
  })
})
