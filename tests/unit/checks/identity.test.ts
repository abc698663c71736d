import { describe, expect, it } from 'vitest'
import { identityOf } from '#shared/checks/identity.ts'
import type { PairModel, SystemModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { evaluate, findings } from './reading.ts'

const GREY = token('grey', '#8a8a8a')

function lightSystem(
  pairs: readonly PairModel[],
  more: Parameters<typeof system>[0] = {},
): SystemModel {
  return system({ themes: [theme('light')], tokens: [GREY], pairs, ...more })
}

describe('identity', () => {
  it('answers ids, backdrop, kind, theme and states, and neither pair id, name, use nor threshold', () => {
    const identities = (one: Partial<PairModel>) =>
      findings(lightSystem([pair('grey', 'ground', one)])).map(({ identity }) => identity)
    const first = identities({})
    expect(first).toEqual(['grey/ground/ground/text/light/rest/rest'])
    for (const other of [
      { id: 'anew' },
      { use: 'large-text' },
      { level: 'AAA' },
      { minimum: 6 },
      { backdrop: ['ground'] },
    ] as const) {
      expect(identities(other)).toEqual(first)
    }
    expect(identities({ use: 'non-text' })).not.toEqual(first)
    expect(identities({ backdrop: ['ink', 'grey'] })).toEqual([
      'grey/ground/ink+grey/text/light/rest/rest',
    ])
  })

  it('answers the kind of every use: text, non-text, focus, link', () => {
    const kinds = {
      text: 'text',
      'large-text': 'text',
      'non-text': 'non-text',
      'focus-adjacent': 'focus',
      'focus-change': 'focus',
      'link-in-text': 'link',
    } as const
    for (const [use, kind] of Object.entries(kinds)) {
      const [one] = findings(
        lightSystem([pair('grey', 'ground', { use: use as PairModel['use'] })]),
      )
      expect(one).toMatchObject({ kind, identity: `grey/ground/ground/${kind}/light/rest/rest` })
    }
  })

  it('answers findings that share one as one entry: the strictest, and there the furthest short', () => {
    const exempt = { kind: 'decorative' as const, reason: 'drawn' }
    const model = lightSystem([
      pair('grey', 'ground', { id: 'drawn', exempt }),
      pair('grey', 'ground', { id: 'large', use: 'large-text' }),
      pair('grey', 'ground', { id: 'plain' }),
      pair('grey', 'ground', { id: 'high', level: 'AAA' }),
    ])
    const { findings: all, counts } = verdictOf(evaluate(model))
    expect(counts).toEqual({ pass: 0, breach: 1, waived: 0, exempt: 0, known: 0 })
    expect(all).toHaveLength(1)
    expect(all[0]).toMatchObject({ required: 7, pairs: ['drawn', 'large', 'plain', 'high'] })
  })

  it('answers pass before exempt, and breach before waived', () => {
    const exempt = { kind: 'decorative' as const, reason: 'drawn' }
    const drawn = pair('ink', 'ground', { id: 'drawn', exempt })
    expect(findings(lightSystem([drawn, pair('ink', 'ground')]))[0]!.outcome).toBe('pass')
    const waiver = { id: 'w', foreground: 'grey', background: 'ground', kind: 'text' as const }
    const waivers = [{ ...waiver, floorRatio: 1, required: 4.5, endsAt: '2030-01-01T00:00:00Z' }]
    const high = pair('grey', 'ground', { id: 'high', level: 'AAA' })
    const both = lightSystem([pair('grey', 'ground'), high])
    expect(findings(both, { waivers })[0]).toMatchObject({ outcome: 'breach', required: 7 })
  })

  it('answers different text for different subjects, whatever the ids hold', () => {
    const subject = {
      backdrop: [],
      ground: 'g',
      kind: 'text',
      theme: 't',
      foregroundState: 'rest',
      backgroundState: 'rest',
    } as const
    const first = identityOf({ ...subject, foreground: 'a/b', background: 'c' })
    const second = identityOf({ ...subject, foreground: 'a', background: 'b/c' })
    expect(first).not.toBe(second)
  })
})
