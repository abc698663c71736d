import { describe, expect, it } from 'vitest'
import {
  findingsIn,
  groupPasses,
  lowestFinding,
  passesByGroup,
} from '#console/lib/lowest-finding.ts'
import { standingsInTheme } from '#console/features/tokens/standings-in-theme.ts'
import { pairStandings } from '#console/features/tokens/pair-standings.ts'
import type { Finding } from '#shared/checks/model.ts'
import type { LedgerTokenWire } from '#shared/contracts/tokens.contract.ts'

const finding = (part: Partial<Finding>): Finding => ({
  foreground: 'a',
  background: 'b',
  theme: 'thm_light',
  foregroundState: 'rest',
  backgroundState: 'rest',
  use: 'text',
  kind: 'text',
  ratio: 5,
  required: 4.5,
  basis: 'srgb',
  ratios: { srgb: 5 },
  outcome: 'pass',
  gating: true,
  rendered: { foreground: '#000000', background: '#ffffff' },
  pairs: [],
  identity: 'a/b',
  ...part,
})
const byGroup = finding({ ratio: 1.2, required: 3, reason: 'any-of' })
const exempt = finding({ ratio: 1.3, outcome: 'exempt' })
const nearText = finding({ ratio: 4.6 })
const farLarge = finding({ ratio: 3.05, required: 3, use: 'large-text' })

describe('the lowest finding', () => {
  it('answers the one nearest to its own line, not the one of the lowest ratio', () => {
    expect(lowestFinding([farLarge, finding({ ratio: 4.5 })])?.ratio).toBe(4.5)
    expect(lowestFinding([nearText, farLarge])?.ratio).toBe(3.05)
  })

  it('leaves out what is exempt or passes by its group, unless there is nothing else', () => {
    expect(lowestFinding([exempt, byGroup, nearText])).toBe(nearText)
    expect(lowestFinding([exempt])).toBe(exempt)
    expect(lowestFinding([])).toBeUndefined()
  })

  it('answers that a pass under its line is one by its group', () => {
    expect([byGroup, nearText, exempt].map(passesByGroup)).toEqual([true, false, false])
  })

  it('answers both tokens of a finding that passes by its group, and no others', () => {
    const other = finding({ foreground: 'c', background: 'd' })
    expect([...groupPasses([byGroup, other, exempt])]).toEqual(['a', 'b'])
  })

  it('answers the findings in which the token itself stands in a state', () => {
    const hovered = finding({ backgroundState: 'hover' })
    expect(findingsIn([hovered, nearText], 'b', 'thm_light', 'hover')).toEqual([hovered])
    expect(findingsIn([hovered, nearText], 'a', 'thm_light', 'rest')).toEqual([hovered, nearText])
    expect(findingsIn([hovered], 'a', 'thm_dark', 'rest')).toEqual([])
  })
})

describe('the pairs of a token', () => {
  it('answers furthest short first, each by its lowest finding, before and after', () => {
    const other = finding({ foreground: 'c', ratio: 4.7, identity: 'c/b' })
    const tried = [finding({ ratio: 9 }), { ...other, ratio: 4.1, outcome: 'breach' as const }]
    const pairs = pairStandings('b', [nearText, other], tried, () => false)
    expect(
      pairs.map(({ relation, before, after }) => [relation.other, before.ratio, after?.ratio]),
    ).toEqual([
      ['c', 4.7, 4.1],
      ['a', 4.6, 9],
    ])
  })
})

describe('standings in one theme', () => {
  const token = (id: string): LedgerTokenWire => ({
    id,
    name: `name.${id}`,
    value: '{x}',
    states: [],
    values: {},
    locked: false,
    resolved: {},
    etag: '"1"',
    standing: { pairs: 2, pairsThroughAliases: 1, breaches: 9, mark: 'waived', lowest: null },
  })
  const themes = [
    { id: 'thm_light', key: 'light', ground: 'b', ink: 'a', gating: true },
    { id: 'thm_dark', key: 'dark', ground: 'b', ink: 'a', gating: true },
  ]
  const breach = finding({ ratio: 4.1, outcome: 'breach', theme: 'thm_dark' })

  it('answers breaches and the lowest of that theme alone, the background marked as such', () => {
    const standings = standingsInTheme(
      [token('a'), token('b')],
      [nearText, breach],
      { themes },
      'dark',
    )
    expect(standings.get('name.a')).toMatchObject({
      pairs: 2,
      pairsThroughAliases: 1,
      breaches: 1,
      mark: 'breach',
      lowest: { ratio: 4.1, theme: 'dark', state: 'rest/rest', foreground: 'name.a' },
    })
    expect(standings.get('name.b')?.mark).toBe('breach-on-it')
  })

  it('leaves a token unmarked where that theme has no finding of it', () => {
    const standings = standingsInTheme([token('a'), token('c')], [nearText], { themes }, 'light')
    expect(standings.get('name.a')).toMatchObject({
      breaches: 0,
      mark: null,
      lowest: { ratio: 4.6 },
    })
    expect(standings.get('name.c')).toMatchObject({ mark: null, lowest: null })
  })
})
