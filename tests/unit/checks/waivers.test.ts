import { beforeAll, describe, expect, it } from 'vitest'
import type { PairModel, SystemModel, WaiverModel } from '#shared/checks/model.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { evaluate, findings } from './reading.ts'

const GREY = token('grey', '#8a8a8a')

function lightSystem(
  pairs: readonly PairModel[],
  more: Parameters<typeof system>[0] = {},
): SystemModel {
  return system({ themes: [theme('light')], tokens: [GREY], pairs, ...more })
}

describe('waivers', () => {
  const model = lightSystem([pair('grey', 'ground')])
  let ratio = Number.NaN
  let waiver: WaiverModel
  beforeAll(() => {
    ratio = findings(model)[0]!.ratio
    waiver = {
      id: 'wai_1',
      foreground: 'grey',
      background: 'ground',
      kind: 'text',
      floorRatio: ratio,
      required: 4.5,
      endsAt: '2030-01-01T00:00:00.000Z',
    }
  })
  const under = (more: Partial<WaiverModel>, of: SystemModel = model) =>
    findings(of, { waivers: [{ ...waiver, ...more }] })[0]!

  it('answers waived from the floor ratio up, with the waiver’s id and end', () => {
    expect(under({})).toMatchObject({
      outcome: 'waived',
      waiver: { id: 'wai_1', endsAt: waiver.endsAt },
    })
    expect(under({ floorRatio: ratio + 1e-9 }).outcome).toBe('breach')
  })

  it('leaves a breach whose requirement became stricter than the waiver’s', () => {
    expect(under({}, lightSystem([pair('grey', 'ground', { level: 'AAA' })])).outcome).toBe(
      'breach',
    )
    expect(under({ required: 7 }).outcome).toBe('waived')
  })

  it('leaves what the waiver does not name', () => {
    const others = [
      { foreground: 'ink' },
      { background: 'ink' },
      { kind: 'link' },
      { theme: 'dark' },
    ] as const
    for (const other of others) expect(under(other).outcome).toBe('breach')
    expect(under({ foregroundState: 'hover' }).outcome).toBe('breach')
    expect(under({ backgroundState: 'hover' }).outcome).toBe('breach')
    expect(
      under({ theme: 'light', foregroundState: 'rest', backgroundState: 'rest' }).outcome,
    ).toBe('waived')
  })

  it('answers waived in the states that the waiver names, and in no other', () => {
    const states = ['hover', 'focus'] as const
    const several = lightSystem([pair('grey', 'ground')], {
      themes: [theme('light'), theme('kiosk')],
      tokens: [
        token('grey', '#8a8a8a', { states, rules: { states: { hover: { lightness: 0 } } } }),
      ],
    })
    const waived = (more: Partial<WaiverModel>) =>
      findings(several, { waivers: [{ ...waiver, floorRatio: 1, ...more }] })
        .filter(({ outcome }) => outcome === 'waived')
        .map((one) => `${one.theme} ${one.foregroundState}/${one.backgroundState}`)
    expect(waived({ theme: 'kiosk', foregroundState: 'hover' })).toEqual(['kiosk hover/rest'])
    expect(waived({ foregroundState: 'focus', backgroundState: 'rest' })).toEqual([
      'light focus/rest',
      'kiosk focus/rest',
    ])
    expect(waived({ theme: 'light' })).toHaveLength(3)
  })

  it('answers a verdict of pass where every breach is waived', () => {
    const { verdict, counts } = verdictOf(evaluate(model), { waivers: [waiver] })
    expect([verdict, counts.waived, counts.breach]).toEqual(['pass', 1, 0])
  })

  it('answers the waiver that ends last where several cover', () => {
    const later = { ...waiver, id: 'wai_2', endsAt: '2031-01-01T00:00:00.000Z' }
    for (const waivers of [
      [waiver, later],
      [later, waiver],
    ]) {
      expect(findings(model, { waivers })[0]!.waiver!.id).toBe('wai_2')
    }
  })
})

describe('newOnly', () => {
  const at = (text: string) =>
    lightSystem([pair('grey', 'ground')], { tokens: [token('grey', text)] })
  let known: ReadonlyMap<string, number>
  beforeAll(() => {
    known = breachRatios(verdictOf(evaluate(at('#8a8a8a'))))
  })

  it('answers known for a breach that was one before and is not lower now', () => {
    const verdict = verdictOf(evaluate(at('#888888')), { known })
    expect(verdict.findings[0]!.outcome).toBe('known')
    expect(verdict.verdict).toBe('pass')
    expect(findings(at('#8a8a8a'), { known })[0]!.outcome).toBe('known')
  })

  it('answers breach where the ratio fell, or where it was no breach before', () => {
    expect(findings(at('#8c8c8c'), { known })[0]!.outcome).toBe('breach')
    const passing = breachRatios(verdictOf(evaluate(at('#333'))))
    expect(findings(at('#888888'), { known: passing })[0]!.outcome).toBe('breach')
  })

  it('answers known before pass, and waived before known, where findings share an identity', () => {
    const large = pair('grey', 'ground', { id: 'large', use: 'large-text' })
    const high = pair('grey', 'ground', { id: 'high', level: 'AAA' })
    const plain = pair('grey', 'ground')
    expect(findings(lightSystem([large, plain]), { known })[0]!.outcome).toBe('known')
    const waiver = { id: 'w', foreground: 'grey', background: 'ground', kind: 'text' as const }
    const waivers = [{ ...waiver, floorRatio: 1, required: 4.5, endsAt: '2030-01-01T00:00:00Z' }]
    const options = { known, waivers }
    expect(findings(lightSystem([high]), options)[0]!.outcome).toBe('known')
    expect(findings(lightSystem([high, plain]), options)[0]!.outcome).toBe('waived')
  })
})
