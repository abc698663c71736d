import { describe, expect, it } from 'vitest'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { PairModel } from '#shared/checks/model.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import { pair, theme } from './model-builder.ts'
import { resolve } from './reading.ts'
import { BASE, judge, MID, strictly, withPair, without } from './weakened.ts'

// Which edits weaken is the product's own rule; no published source.

describe('pairs', () => {
  it('refuses nothing of a system that stays', () => {
    expect(weakeningsBetween(resolve(BASE), resolve({ ...BASE }))).toEqual([])
  })

  it('answers a pair that is removed', () => {
    const { said, gone, found } = judge(BASE, { pairs: { remove: ['grey on ground'] } })
    expect(said).toEqual(['pair-removed'])
    expect(found[0]?.item).toEqual({ kind: 'pair', id: 'grey on ground' })
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a pair that is removed and declared anew under another id', () => {
    const anew = pair('grey', 'ground', { id: 'anew' })
    const { said } = judge(BASE, { pairs: { put: [anew], remove: ['grey on ground'] } })
    expect(said).toEqual(['pair-removed'])
  })

  it.each([
    ['foreground', { foreground: 'far' }],
    ['background', { background: 'ink' }],
  ] as const)('answers another %s', (member, members) => {
    const model = { ...BASE, pairs: [pair('grey', 'ground', { themes: ['light'] })] }
    const { said, gone } = judge(model, withPair(model, 'grey on ground', members))
    expect(said).toEqual([`pair-moved ${member}`])
    expect(gone).toBeGreaterThan(0)
  })

  it.each([
    ['taken up', [], ['ink']],
    ['taken away', ['ink'], []],
    ['of another order', ['ink', 'far'], ['far', 'ink']],
    ['that is not known', [], 'unknown'],
    ['that was not known', 'unknown', []],
  ] as const)('answers a backdrop %s', (_, from, to) => {
    const glass = pair('grey', 'glass', { backdrop: from })
    const model = { ...BASE, pairs: [glass] }
    const { said } = judge(model, withPair(model, glass.id, { backdrop: to }))
    expect(said).toEqual(['pair-moved backdrop'])
  })

  it.each([
    ['text', 'large-text'],
    ['text', 'non-text'],
    ['text', 'focus-change'],
    ['large-text', 'non-text'],
    ['non-text', 'focus-change'],
  ] as const)('answers %s that becomes %s and so asks for less at some level', (from, to) => {
    const model = { ...BASE, pairs: [pair('grey', 'ground', { use: from })] }
    const { said } = judge(model, withPair(model, 'grey on ground', { use: to }))
    expect(said).toEqual(['use-asks-less use'])
  })

  it.each([
    ['non-text', 'focus-adjacent'],
    ['non-text', 'link-in-text'],
    ['focus-adjacent', 'link-in-text'],
    ['link-in-text', 'focus-adjacent'],
    ['focus-adjacent', 'text'],
  ] as const)('answers %s that becomes %s and so is measured on something else', (from, to) => {
    const model = { ...BASE, pairs: [pair('grey', 'ground', { use: from })] }
    const { said } = judge(model, withPair(model, 'grey on ground', { use: to }))
    expect(said).toEqual(['use-asks-less use'])
  })

  it.each([
    ['large-text', 'text'],
    ['non-text', 'text'],
    ['non-text', 'large-text'],
    ['focus-change', 'non-text'],
  ] as const)('leaves %s that becomes %s', (from, to) => {
    const model = { ...BASE, pairs: [pair('grey', 'ground', { use: from })] }
    expect(judge(model, withPair(model, 'grey on ground', { use: to })).said).toEqual([])
  })

  it('answers a minimum that is lowered or taken away, where it asks for more than the use', () => {
    const model = strictly({ minimum: 9 })
    const [high] = model.pairs
    const lowered = judge(model, withPair(model, MID, { minimum: 5 }))
    expect(lowered.said).toEqual(['minimum-lowered minimum'])
    const gone = judge(model, { pairs: { put: [without(high!, 'minimum')] } })
    expect(gone.said).toEqual(['minimum-lowered minimum'])
    expect(gone.gone).toBeGreaterThan(0)
    expect(judge(model, withPair(model, MID, { minimum: 12 })).said).toEqual([])
  })

  it('answers a minimum that makes up for a laxer use at one level only', () => {
    const model = strictly({})
    const { said } = judge(model, withPair(model, MID, { use: 'large-text', minimum: 4.5 }))
    expect(said).toEqual(['use-asks-less use'])
    const high = strictly({ use: 'large-text', minimum: 7 })
    const raised: Partial<PairModel> = { use: 'text', minimum: 4.5 }
    expect(judge(high, withPair(high, MID, raised)).said).toEqual(['minimum-lowered minimum'])
  })

  it('leaves a minimum that the use asks for anyway', () => {
    const model = strictly({ use: 'large-text', minimum: 4.5 })
    const [low] = model.pairs
    const text = { ...without(low!, 'minimum'), use: 'text' as const }
    expect(judge(model, { pairs: { put: [text] } }).said).toEqual([])
  })

  it('answers a level that is lowered', () => {
    const model = strictly({ level: 'AAA' })
    const [high] = model.pairs
    const { said, gone } = judge(model, { pairs: { put: [without(high!, 'level')] } })
    expect(said).toEqual(['level-lowered level'])
    expect(gone).toBeGreaterThan(0)
    expect(judge(model, withPair(model, MID, { level: 'AA' })).said).toHaveLength(1)
    expect(judge(strictly({}), withPair(strictly({}), MID, { level: 'AAA' })).said).toEqual([])
  })

  it('answers states that are left out', () => {
    const { said, gone } = judge(BASE, withPair(BASE, 'label on fill', { states: ['disabled'] }))
    expect(said).toEqual(['pair-narrowed states'])
    expect(gone).toBeGreaterThan(0)
    const model = { ...BASE, pairs: [pair('label', 'fill', { states: ['hover', 'disabled'] })] }
    expect(judge(model, withPair(model, 'label on fill', { states: ['hover'] })).found).toEqual([
      {
        code: 'pair-narrowed',
        item: { kind: 'pair', id: 'label on fill' },
        member: 'states',
        detail: 'label on fill is measured no longer in disabled',
      },
    ])
  })

  it('leaves states that are all there are, and states that are added', () => {
    const every = ['hover', 'active', 'focus', 'disabled'] as const
    expect(judge(BASE, withPair(BASE, 'label on fill', { states: [...every] })).said).toEqual([])
    const model = { ...BASE, pairs: [pair('label', 'fill', { states: [] })] }
    expect(judge(model, withPair(model, 'label on fill', { states: ['hover'] })).said).toEqual([])
  })

  it('answers themes that are left out, and leaves those that are added', () => {
    const { said, gone } = judge(BASE, withPair(BASE, 'grey on ground', { themes: ['dark'] }))
    expect(said).toEqual(['pair-narrowed themes'])
    expect(gone).toBeGreaterThan(0)
    const both = ['light', 'dark']
    expect(judge(BASE, withPair(BASE, 'grey on ground', { themes: both })).said).toEqual([])
    const model = { ...BASE, pairs: [pair('grey', 'ground', { themes: ['light'] })] }
    expect(judge(model, withPair(model, 'grey on ground', { themes: both })).said).toEqual([])
  })

  it('answers a pair that leaves out a theme which comes with the same edit', () => {
    const kiosk = theme('kiosk')
    const { said } = judge(BASE, {
      themes: [...BASE.themes, kiosk],
      ...withPair(BASE, 'grey on ground', { themes: ['light', 'dark'] }),
    })
    expect(said).toEqual(['pair-narrowed themes'])
  })

  it('answers inside that becomes together, and leaves the way back', () => {
    const { said, gone } = judge(BASE, withPair(BASE, 'label on fill', { relation: 'together' }))
    expect(said).toEqual(['taken-together relation'])
    expect(gone).toBeGreaterThan(0)
    const model = { ...BASE, pairs: [pair('label', 'fill', { relation: 'together' })] }
    expect(judge(model, withPair(model, 'label on fill', { relation: 'inside' })).said).toEqual([])
  })

  it('answers a way back that loses a state or the floor for disabled', () => {
    const pointed = pair('label', 'fill', { relation: 'together', states: ['active'] })
    const apart = { ...BASE, pairs: [pointed] }
    const inside: Partial<PairModel> = { relation: 'inside' }
    expect(judge(apart, withPair(apart, 'label on fill', inside)).said).toEqual([
      'pair-narrowed relation',
    ])
    const ring = pair('label', 'fill', { relation: 'together', use: 'focus-change' })
    const floored = {
      ...BASE,
      settings: { ...BASE.settings, disabledFloor: 2 },
      pairs: [ring],
    }
    const { said, gone } = judge(floored, withPair(floored, 'label on fill', inside))
    expect(said).toEqual(['floor-lowered relation'])
    expect(gone).toBeGreaterThan(0)
    const exempt = { kind: 'inactive', reason: 'Never used' } as const
    const idle = { ...floored, pairs: [pair('label', 'fill', { use: 'focus-change', exempt })] }
    const [one] = idle.pairs
    expect(judge(idle, { pairs: { put: [without(one!, 'exempt')] } }).said).toEqual([
      'floor-lowered exempt',
    ])
  })

  it('answers an exemption, another kind of it, and one that comes with a new pair', () => {
    const exempt = { kind: 'logotype', reason: 'The line of the brand name' } as const
    const { said, gone } = judge(BASE, withPair(BASE, 'grey on ground', { exempt }))
    expect(said).toEqual(['exempted exempt'])
    expect(gone).toBeGreaterThan(0)
    const inactive = { ...exempt, kind: 'inactive' as const }
    const model = {
      ...BASE,
      settings: { ...BASE.settings, disabledFloor: 3 },
      pairs: [pair('grey', 'ground', { exempt: inactive })],
    }
    const freed = judge(model, withPair(model, 'grey on ground', { exempt }))
    expect(freed.said).toEqual(['exempted exempt'])
    expect(freed.gone).toBeGreaterThan(0)
    const added = pair('far', 'ground', { exempt })
    expect(judge(BASE, { pairs: { put: [added] } }).said).toEqual(['exempted exempt'])
  })

  it('leaves a new reason, the end of an exemption, another product and a new pair', () => {
    const exempt = { kind: 'decorative', reason: 'A wave' } as const
    const model = { ...BASE, pairs: [pair('grey', 'ground', { exempt })] }
    const [one] = model.pairs
    const edits: SystemEdits[] = [
      withPair(model, 'grey on ground', { exempt: { ...exempt, reason: 'A wave in the margin' } }),
      { pairs: { put: [without(one!, 'exempt')] } },
      withPair(model, 'grey on ground', { product: 'kiosk' }),
      { pairs: { put: [pair('far', 'ground')] } },
    ]
    for (const edit of edits) expect(judge(model, edit).said).toEqual([])
  })
})
