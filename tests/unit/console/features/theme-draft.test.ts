import { describe, expect, it } from 'vitest'
import { effectOf } from '#console/features/checks/effect-lines.ts'
import {
  ownValues,
  removalEdits,
  themeEdits,
  withValue,
} from '#console/features/themes/theme-draft.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { SystemModel, TokenModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'

const grey = (l: number) => ({ kind: 'color', color: { l, c: 0, h: null, alpha: 1 } }) as const
const token = (id: string, l: number): TokenModel => ({
  id,
  name: `name.${id}`,
  value: grey(l),
  states: [],
  values: {},
})

const model: SystemModel = {
  settings: { level: 'AA', p3: false, p3Gates: false },
  states: {},
  prefixes: [],
  themes: [{ id: 'thm_1', key: 'light', ground: 'deck', ink: 'ink', gating: true }],
  tokens: [token('deck', 0.98), token('ink', 0.2), token('edge', 0.5)],
  pairs: [
    {
      id: 'p1',
      foreground: 'edge',
      background: 'deck',
      use: 'text',
      relation: 'inside',
      backdrop: [],
    },
  ],
}
const night = {
  id: 'new-theme',
  key: 'night',
  name: 'Night',
  position: 1,
  from: 'light',
  ground: 'name.deck',
  ink: 'name.ink',
  rule: { kind: 'keep' },
  gating: true,
} as const
const exchanged = {
  'name.deck': { rest: 'oklch(0.2 0 0)' },
  'name.ink': { rest: 'oklch(0.98 0 0)' },
}

function evaluate(of: SystemModel) {
  const checked = checkSystem(of)
  if (!checked.ok) throw new TypeError('the model resolves')
  return checked.evaluation
}

function effect(of: SystemModel, edits: SystemEdits) {
  const before = evaluate(of)
  const tried = recheck(before, edits)
  if (!tried.ok) throw new TypeError('the edit resolves')
  return { effect: effectOf(consequences(before, tried.evaluation)), after: tried.evaluation }
}

function editsOf(theme: typeof night, values: Parameters<typeof themeEdits>[2]): SystemEdits {
  const read = themeEdits(model, theme, values)
  if (!read.ok) throw new TypeError('the draft is read')
  return read.edits
}

describe('what a theme would move', () => {
  it('answers every pair in a theme that is made, breaching where the parent’s colour is too near', () => {
    const { effect: moved } = effect(model, editsOf(night, exchanged))
    expect(moved.parts.breaching.lines.map(({ theme, states }) => [theme, states])).toEqual([
      ['new-theme', ['rest/rest']],
    ])
    expect(moved.parts.breaching.lines[0]?.before).toBeUndefined()
  })

  it('answers what is measured no longer where the theme goes, and how much of it breaches now', () => {
    const made = effect(model, editsOf(night, exchanged)).after
    const { effect: moved } = effect(
      made.resolved.model,
      removalEdits(made.resolved.model, 'new-theme'),
    )
    expect([moved.parts.gone.count, moved.goneBreaches]).toEqual([1, 1])
    expect(moved.parts.breaching.count).toBe(0)
  })

  it('refuses a draft that names what is not there, each name once', () => {
    const read = themeEdits(
      model,
      { ...night, ground: 'name.sky' },
      { 'name.sea': { rest: '#000' } },
    )
    const faults = read.ok ? [] : read.faults
    expect(faults.map(({ detail }) => detail)).toEqual([
      'There is no token named name.sky',
      'There is no token named name.sea',
    ])
  })
})

describe('the values of a theme being edited', () => {
  const now: ThemeWire['values'] = { 'name.edge': { rest: '{name.ink}' } }
  const edit = (value: string | undefined) =>
    withValue(now, {}, { token: 'name.edge', state: 'rest', value })

  it('answers a value taken away with null for the token, and none where it is put back', () => {
    const taken = edit(undefined)
    expect(taken.values).toEqual({ 'name.edge': null })
    expect(ownValues(now, taken.values, ['name.edge'])).toEqual([
      { token: 'name.edge', state: 'rest', now: '{name.ink}', drafted: undefined },
    ])
    const back = withValue(now, taken, { token: 'name.edge', state: 'rest', value: '{name.ink}' })
    expect(back).toEqual({})
  })

  it('leaves the other states of a token that is set', () => {
    const draft = withValue(now, {}, { token: 'name.edge', state: 'hover', value: '#fff' })
    expect(draft.values).toEqual({ 'name.edge': { rest: '{name.ink}', hover: '#fff' } })
  })
})
