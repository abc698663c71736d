import { describe, expect, it } from 'vitest'
import {
  type BreachState,
  closingReason,
  fallsShort,
  type HeadShift,
  stepOf,
} from '#api/features/breaches/breaches.rules.ts'
import type { Finding, PairModel, SystemModel, SystemSettings } from '#shared/checks/model.ts'

const AT = new Date('2026-11-27T10:02:11.481Z')
const IDENTITY = 'tok_a/tok_b/tok_ground/text/thm_light/rest/rest'

const finding = (changes: Partial<Finding> = {}): Finding => ({
  foreground: 'tok_a',
  background: 'tok_b',
  theme: 'thm_light',
  foregroundState: 'rest',
  backgroundState: 'rest',
  use: 'text',
  kind: 'text',
  ratio: 3.9,
  ratios: { srgb: 3.9 },
  required: 4.5,
  basis: 'srgb',
  outcome: 'breach',
  gating: true,
  rendered: { foreground: '#faf8f2', background: '#2283c1' },
  pairs: ['pair_1'],
  identity: IDENTITY,
  ...changes,
})

const open = (changes: Partial<BreachState> = {}): BreachState => ({
  status: 'open',
  gating: true,
  basis: 'srgb',
  ratio: 3.9,
  required: 4.5,
  lowestRatio: 3.9,
  foregroundHex: '#faf8f2',
  backgroundHex: '#2283c1',
  waiverId: null,
  lastSeenAt: null,
  resolvedAt: null,
  closingReason: null,
  metBy: null,
  ...changes,
})
const resolved = open({
  status: 'resolved',
  ratio: 5,
  lowestRatio: 3.5,
  lastSeenAt: AT,
  resolvedAt: AT,
  closingReason: 'fixed',
})

const settings: SystemSettings = { level: 'AA', p3: true, p3Gates: true }
const pair = (changes: Partial<PairModel> = {}): PairModel => ({
  id: 'pair_1',
  foreground: 'tok_a',
  background: 'tok_b',
  use: 'text',
  relation: 'inside',
  backdrop: [],
  ...changes,
})
const model = (changes: Partial<SystemModel> = {}): SystemModel => ({
  settings,
  states: {},
  prefixes: [],
  themes: [{ id: 'thm_light', key: 'light', ground: 'tok_ground', ink: 'tok_ink', gating: true }],
  tokens: [],
  pairs: [pair()],
  ...changes,
})
const shift = (changes: Partial<HeadShift> = {}): HeadShift => ({
  before: model(),
  after: model(),
  cause: 'edit',
  at: AT,
  ...changes,
})
const moved = (before: Finding | undefined, after: Finding | undefined) => ({
  identity: IDENTITY,
  ...(before ? { before } : {}),
  ...(after ? { after } : {}),
})

describe('stepOf', () => {
  it('opens an entry for a finding that falls short', () => {
    expect(
      stepOf(moved(finding({ outcome: 'pass', ratio: 5 }), finding()), undefined, shift()),
    ).toEqual({
      state: open(),
      event: { kind: 'opened', ratio: 3.9, required: 4.5 },
    })
  })

  it('logs a breach of a theme that only reports with gating false', () => {
    const step = stepOf(moved(undefined, finding({ gating: false })), undefined, shift())
    expect(step?.state.gating).toBe(false)
    expect(step?.event?.kind).toBe('opened')
  })

  it('calls a lower ratio worsened and keeps the lowest', () => {
    const step = stepOf(moved(finding(), finding({ ratio: 3.2 })), open(), shift())
    expect(step?.state).toMatchObject({ ratio: 3.2, lowestRatio: 3.2, lastSeenAt: null })
    expect(step?.event).toEqual({ kind: 'worsened', ratio: 3.2, required: 4.5 })
  })

  it('calls a higher ratio that still falls short eased and keeps the lowest', () => {
    const step = stepOf(moved(finding(), finding({ ratio: 4.2 })), open(), shift())
    expect(step?.state).toMatchObject({ ratio: 4.2, lowestRatio: 3.9 })
    expect(step?.event?.kind).toBe('eased')
  })

  it('calls a stricter requirement worsened though the ratio stays', () => {
    const step = stepOf(moved(finding(), finding({ required: 7 })), open(), shift())
    expect(step?.event).toEqual({ kind: 'worsened', ratio: 3.9, required: 7 })
  })

  it('brings an entry up to date without an event where only its theme stops gating', () => {
    const step = stepOf(moved(finding(), finding({ gating: false })), open(), shift())
    expect(step).toEqual({ state: open({ gating: false }), event: null })
  })

  it('leaves an entry alone that says the same already', () => {
    expect(stepOf(moved(finding(), finding()), open(), shift())).toBeNull()
  })

  it('resolves an open entry with the last ratio, the time and the reason', () => {
    const after = finding({ outcome: 'pass', ratio: 4.6 })
    expect(stepOf(moved(finding(), after), open(), shift())).toEqual({
      state: open({
        status: 'resolved',
        ratio: 4.6,
        lastSeenAt: AT,
        resolvedAt: AT,
        closingReason: 'fixed',
      }),
      event: { kind: 'resolved', ratio: 4.6, required: 4.5 },
    })
  })

  it('leaves a resolved entry alone while its finding passes', () => {
    const after = finding({ outcome: 'pass', ratio: 6 })
    expect(stepOf(moved(finding({ outcome: 'pass' }), after), resolved, shift())).toBeNull()
  })

  it('reopens a resolved entry, its closing undone and its lowest ratio kept', () => {
    const step = stepOf(moved(undefined, finding()), resolved, shift())
    expect(step).toEqual({
      state: open({ lowestRatio: 3.5 }),
      event: { kind: 'reopened', ratio: 3.9, required: 4.5 },
    })
  })

  it('keeps a waived finding in the log under its waiver', () => {
    const waived = finding({
      outcome: 'waived',
      waiver: { id: 'wai_1', endsAt: '2027-01-01T00:00:00.000Z' },
    })
    expect(fallsShort(waived)).toBe(true)
    expect(stepOf(moved(finding(), waived), open(), shift())).toEqual({
      state: open({ status: 'waived', waiverId: 'wai_1' }),
      event: null,
    })
  })
})

describe('closingReason', () => {
  const reasonFor = (
    before: Finding | undefined,
    after: Finding | undefined,
    changes: Partial<HeadShift> = {},
    logged: Partial<BreachState> = {},
  ) => closingReason(moved(before, after), open(logged), shift(changes))
  const passing = (changes: Partial<Finding> = {}) => finding({ outcome: 'pass', ...changes })

  it('answers fixed where the ratio meets what was required', () => {
    expect(reasonFor(finding(), passing({ ratio: 4.5 }))).toBe('fixed')
  })

  it('answers requirement-changed where only the requirement came down', () => {
    expect(reasonFor(finding(), passing({ required: 3 }))).toBe('requirement-changed')
    expect(reasonFor(finding(), passing({ ratio: 4, required: 3 }))).toBe('requirement-changed')
  })

  it('answers pair-removed where the finding is not measured any more', () => {
    expect(reasonFor(finding(), undefined)).toBe('pair-removed')
  })

  it('answers theme-removed where its theme is gone, also when only the log remembers it', () => {
    const after = model({ themes: [] })
    expect(reasonFor(finding(), undefined, { after })).toBe('theme-removed')
    expect(reasonFor(undefined, undefined, { after, before: null })).toBe('theme-removed')
    expect(reasonFor(undefined, undefined, { before: null })).toBe('pair-removed')
  })

  it.each(['logotype', 'decorative', 'inactive'])('answers exempted for a declared %s', (kind) => {
    const after = finding({ outcome: 'exempt', reason: kind, ratio: 9 })
    expect(reasonFor(finding(), after)).toBe('exempted')
  })

  it('answers exempted where the pair came to be exempt by the criterion itself', () => {
    const after = finding({ outcome: 'exempt', reason: 'disabled' })
    expect(reasonFor(finding(), after)).toBe('exempted')
  })

  it('tells a lifted floor for disabled from a ratio that rose above it', () => {
    const before = finding({ reason: 'disabled-floor', ratio: 2, required: 2.5 })
    const exempt = finding({ outcome: 'exempt', reason: 'disabled', ratio: 2 })
    const logged = { ratio: 2, required: 2.5 }
    expect(reasonFor(before, exempt, {}, logged)).toBe('requirement-changed')
    expect(reasonFor(before, { ...exempt, ratio: 2.6 }, {}, logged)).toBe('fixed')
  })

  it('tells joining a group from a group whose other member came to pass', () => {
    const after = passing({ reason: 'any-of' })
    const grouped = model({ pairs: [pair({ anyOf: 'rings' })] })
    expect(reasonFor(finding(), after, { after: grouped })).toBe('requirement-changed')
    expect(reasonFor(finding(), after, { before: grouped, after: grouped })).toBe('fixed')
  })

  it('answers what stands in for an entry that its group closes, and for no other', () => {
    const standIn = {
      foreground: 'tok_c',
      background: 'tok_b',
      names: { foreground: 'inner', background: 'deck' },
    }
    const grouped = model({ pairs: [pair({ anyOf: 'rings' })] })
    const shift: HeadShift = {
      before: grouped,
      after: grouped,
      cause: 'edit',
      at: AT,
      standInFor: () => standIn,
    }
    const step = (after: Finding) =>
      stepOf({ identity: IDENTITY, before: finding(), after }, open(), shift)?.state.metBy
    expect(step(passing({ reason: 'any-of' }))).toEqual(standIn)
    expect(step(passing({ ratio: 4.6 }))).toBeNull()
    const again = stepOf(
      { identity: IDENTITY, after: finding() },
      open({ ...resolved, metBy: standIn }),
      shift,
    )
    expect(again?.state.metBy).toBeNull()
  })

  it('answers requirement-changed where the P3 ratio stopped gating', () => {
    const before = finding({ basis: 'p3' })
    const after = passing({ ratio: 4.6 })
    const without = (changes: Partial<SystemSettings>) => ({
      after: model({ settings: { ...settings, ...changes } }),
    })
    const logged = { basis: 'p3' } as const
    expect(reasonFor(before, after, without({ p3: false }), logged)).toBe('requirement-changed')
    expect(reasonFor(before, after, without({ p3Gates: false }), logged)).toBe(
      'requirement-changed',
    )
    expect(reasonFor(before, after, {}, logged)).toBe('fixed')
  })

  it('answers engine-changed whenever another engine measured', () => {
    expect(reasonFor(finding(), passing({ ratio: 4.6 }), { cause: 'engine' })).toBe(
      'engine-changed',
    )
    expect(reasonFor(finding(), undefined, { cause: 'engine' })).toBe('engine-changed')
  })
})
