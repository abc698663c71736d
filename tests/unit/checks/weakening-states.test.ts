import { describe, expect, it } from 'vitest'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import { createTokenNames } from '#shared/checks/weakening-kinds.ts'
import { pair, system, token } from './model-builder.ts'
import { resolve } from './reading.ts'
import { BASE, judge } from './weakened.ts'

// Which edits weaken is the product's own rule; no published source.

describe('states of tokens', () => {
  const withStates = (id: string, states: SystemModel['tokens'][number]['states']): SystemEdits => {
    const before = BASE.tokens.find((one) => one.id === id)!
    return { tokens: { put: [{ ...before, states }] } }
  }

  it('answers a state that goes from a token that a pair measures in it', () => {
    const { found, gone } = judge(BASE, withStates('fill', ['disabled']))
    expect(found).toEqual([
      {
        code: 'states-changed',
        item: { kind: 'token', id: 'fill' },
        member: 'states',
        detail: 'With the states of fill, label on fill in hover is measured no longer',
      },
    ])
    expect(gone).toBeGreaterThan(0)
    expect(judge(BASE, withStates('label', [])).said).toEqual(['states-changed states'])
  })

  it('answers a state that goes from the token that an alias follows', () => {
    const model = system({
      tokens: [
        token('source', '#888888', { states: ['hover'] }),
        token('other', '#888888'),
        token('fill', '{source}'),
      ],
      pairs: [pair('ink', 'fill')],
    })
    const gone = judge(model, { tokens: { put: [token('source', '#888888')] } })
    expect(gone.found).toMatchObject([
      { code: 'states-changed', item: { id: 'fill' }, detail: expect.stringContaining('hover') },
    ])
    const elsewhere = judge(model, { tokens: { put: [token('fill', '{other}')] } })
    expect(elsewhere.said).toEqual(['states-changed states'])
  })

  it('answers a state that comes and exempts what was asked for', () => {
    const { found, gone } = judge(BASE, withStates('label', ['hover', 'disabled']))
    expect(found).toMatchObject([{ code: 'states-changed', item: { id: 'label' } }])
    expect(found[0]?.detail).toContain('in rest/disabled')
    expect(gone).toBeGreaterThan(0)
  })

  it('leaves states that no pair measures, that are exempt, or that come', () => {
    const model = system({
      tokens: [
        token('alone', '#888888', { states: ['hover'] }),
        token('label', '#999999', { states: ['disabled'] }),
        token('fill', '#888888'),
      ],
      pairs: [pair('label', 'fill')],
    })
    const edits: SystemEdits[] = [
      { tokens: { put: [token('alone', '#888888')] } },
      { tokens: { put: [token('label', '#999999')] } },
      { tokens: { put: [token('fill', '#888888', { states: ['hover', 'focus'] })] } },
      { tokens: { put: [token('new', '#888888', { states: ['hover'] })] } },
    ]
    for (const edit of edits) expect(judge(model, edit).said).toEqual([])
    const floor = { ...model, settings: { ...model.settings, disabledFloor: 2 } }
    expect(judge(floor, edits[1]!).said).toEqual(['states-changed states'])
  })

  it('leaves a container that reacts to the pointer like its label, and a component likewise', () => {
    const model = system({
      tokens: [
        token('label', '#999999', { states: ['hover', 'active'] }),
        token('fill', '#888888', { states: ['focus'] }),
      ],
      pairs: [pair('label', 'fill'), pair('label', 'fill', { id: 'b', relation: 'together' })],
    })
    const fill = token('fill', '#888888', { states: ['hover', 'active', 'focus'] })
    expect(judge(model, { tokens: { put: [fill] } }).said).toEqual([])
  })

  it('leaves a pair that is new, and one that is exempt in every state', () => {
    const model = system({
      tokens: [token('label', '#999999', { states: ['hover'] }), token('fill', '#888888')],
      pairs: [pair('label', 'fill', { exempt: { kind: 'logotype', reason: 'mark' } })],
    })
    const put = [token('label', '#999999'), token('new', '#ffffff')]
    const edits = { tokens: { put }, pairs: { put: [pair('label', 'new')] } }
    expect(judge(model, edits).said).toEqual([])
    const inactive = { kind: 'inactive', reason: 'greyed' } as const
    const floored = {
      ...model,
      settings: { ...model.settings, disabledFloor: 2 },
      pairs: [pair('label', 'fill', { exempt: inactive })],
    }
    expect(judge(floored, edits).said).toEqual(['states-changed states'])
  })

  it('answers a background’s state that a link is measured in no longer', () => {
    const model = system({
      tokens: [token('link', '#2244aa'), token('row', '#dddddd', { states: ['hover'] })],
      pairs: [pair('link', 'row', { use: 'link-in-text' })],
    })
    const put = [token('row', '#dddddd', { states: ['focus'] })]
    const { found } = judge(model, { tokens: { put } })
    expect(found.map(({ detail }) => detail)).toEqual([
      'With the states of row, link on row in hover is measured no longer',
    ])
  })

  it('answers five pairs that are measured no longer, and how many more there are', () => {
    const grounds = Array.from({ length: 7 }, (_, at) => token(`g${at}`, '#ffffff'))
    const model = system({
      tokens: [token('label', '#555555', { states: ['hover'] }), ...grounds],
      pairs: grounds.map(({ id }) => pair('label', id)),
    })
    const { found } = judge(model, { tokens: { put: [token('label', '#555555')] } })
    expect(found).toHaveLength(1)
    expect(found[0]!.detail).toBe(
      `With the states of label, ${[0, 1, 2, 3, 4].map((at) => `label on g${at} in hover`).join('; ')}; ` +
        'and 2 more is measured no longer',
    )
  })

  it('answers nothing between a system and itself, and what else moved where no token did', () => {
    const before = resolve(BASE)
    expect(weakeningsBetween(before, before)).toEqual([])
    const strict = {
      ...before.model,
      settings: { ...before.model.settings, level: 'AAA' as const },
    }
    const found = weakeningsBetween({ ...before, model: strict }, before)
    expect(found.map(({ code }) => code)).toEqual(['level-lowered'])
  })

  it('answers a token that neither system has by its id', () => {
    const nameOf = createTokenNames(resolve(BASE), resolve(system()))
    expect([nameOf('grey'), nameOf('gone')]).toEqual(['grey', 'gone'])
  })
})
