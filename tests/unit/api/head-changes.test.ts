import { describe, expect, it } from 'vitest'
import { stateDigest } from '#api/features/revisions/state-digest.ts'
import { changesBetween, isEmpty } from '#api/features/revisions/version-changes.rules.ts'
import type { GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'

const token = (id: string, name = id): GovernedToken => ({
  id,
  name,
  value: { kind: 'color', color: { l: 0.5, c: 0.1, h: 250, alpha: 1 } },
  states: ['hover'],
  values: {},
  locked: false,
})

const SYSTEM: GovernedSystem = {
  settings: { level: 'AA', p3: true, p3Gates: true },
  states: { hover: { lightness: 0.05 } },
  prefixes: [{ prefix: 'a' }, { prefix: 'b' }],
  themes: [
    {
      id: 't1',
      key: 'light',
      name: 'L',
      ground: 'x',
      ink: 'y',
      rule: { kind: 'keep' },
      gating: true,
    },
    {
      id: 't2',
      key: 'dark',
      name: 'D',
      ground: 'x',
      ink: 'y',
      rule: { kind: 'keep' },
      gating: true,
    },
    {
      id: 't3',
      key: 'kiosk',
      name: 'K',
      ground: 'x',
      ink: 'y',
      rule: { kind: 'keep' },
      gating: true,
    },
  ],
  tokens: [token('x'), token('y'), token('z')],
  pairs: [
    {
      id: 'p',
      foreground: 'x',
      background: 'y',
      use: 'text',
      relation: 'inside',
      backdrop: [],
    },
  ],
}

const copy = (): GovernedSystem => structuredClone(SYSTEM) as GovernedSystem

describe('changesBetween', () => {
  it('leaves nothing to write where only the spelling of the state differs', () => {
    const reordered = {
      ...copy(),
      tokens: SYSTEM.tokens.map(({ id, ...rest }) => ({ ...rest, id })),
    }
    expect(isEmpty(changesBetween(SYSTEM, reordered))).toBe(true)
  })

  it('answers what closes, what opens and what is new', () => {
    const after = {
      ...copy(),
      tokens: [token('x'), token('y', 'renamed'), token('new')],
    }
    const { tokens } = changesBetween(SYSTEM, after)
    expect([...tokens.closed].sort()).toEqual(['y', 'z'])
    expect(tokens.opened.map(({ item }) => item.id)).toEqual(['y', 'new'])
    expect(tokens.added).toEqual(['new'])
  })

  it('answers a theme or prefix that only moved up, since its place is part of it', () => {
    const after = {
      ...copy(),
      themes: SYSTEM.themes.filter(({ id }) => id !== 't2'),
      prefixes: [...SYSTEM.prefixes].reverse(),
    }
    const { themes, prefixes } = changesBetween(SYSTEM, after)
    expect(themes.opened).toMatchObject([{ item: { id: 't3' }, position: 1 }])
    expect([...themes.closed].sort()).toEqual(['t2', 't3'])
    expect(prefixes.opened.map(({ position }) => position)).toEqual([0, 1])
  })

  it('answers settings and state rules only where they differ', () => {
    const after: GovernedSystem = { ...copy(), settings: { ...SYSTEM.settings, level: 'AAA' } }
    const changes = changesBetween(SYSTEM, after)
    expect(changes.settings).toEqual(after.settings)
    expect(changes).not.toHaveProperty('states')
    expect(changes.tokens.opened).toEqual([])
  })
})

describe('changesBetween, of distinct sets', () => {
  it('answers those that come, change and go', () => {
    const set = { id: 's', name: 'Series', tokens: ['x', 'y'] }
    const withSet: GovernedSystem = { ...SYSTEM, distinctSets: [set] }
    const made = changesBetween(SYSTEM, withSet)
    expect(made.distinctSets).toMatchObject({ added: ['s'], closed: [] })
    expect(isEmpty(made)).toBe(false)
    const renamed = { ...withSet, distinctSets: [{ ...set, name: 'Lines' }] }
    expect(changesBetween(withSet, renamed).distinctSets).toMatchObject({
      added: [],
      closed: ['s'],
    })
    expect(changesBetween(withSet, SYSTEM).distinctSets).toEqual({
      opened: [],
      added: [],
      closed: ['s'],
    })
  })
})

describe('stateDigest', () => {
  it('answers the same name for the same state, however its members are ordered', () => {
    const reordered = {
      ...copy(),
      tokens: SYSTEM.tokens.map(({ id, name, ...rest }) => ({ ...rest, name, id })),
    }
    expect(stateDigest(reordered)).toBe(stateDigest(SYSTEM))
    expect(stateDigest(SYSTEM)).toMatch(/^[0-9a-f]{64}$/)
  })

  it('answers another name for whatever a revision governs', () => {
    const [first, ...others] = SYSTEM.tokens as [GovernedToken, ...GovernedToken[]]
    const states: GovernedSystem[] = [
      SYSTEM,
      { ...SYSTEM, settings: { ...SYSTEM.settings, disabledFloor: 2 } },
      { ...SYSTEM, states: {} },
      { ...SYSTEM, prefixes: [...SYSTEM.prefixes].reverse() },
      { ...SYSTEM, themes: SYSTEM.themes.slice(0, 2) },
      { ...SYSTEM, tokens: [...others, first] },
      { ...SYSTEM, tokens: [{ ...first, description: 'told' }, ...others] },
      { ...SYSTEM, tokens: [{ ...first, locked: true }, ...others] },
      { ...SYSTEM, pairs: [] },
      { ...SYSTEM, distinctSets: [{ id: 's', name: 'Series', tokens: ['x', 'y'] }] },
      { ...SYSTEM, distinctSets: [{ id: 's', name: 'Series', tokens: ['y', 'x'] }] },
    ]
    expect(new Set(states.map(stateDigest)).size).toBe(states.length)
  })
})
