import { describe, expect, it } from 'vitest'
import { applyEdits, type SystemEdits } from '#shared/checks/edits.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { BASE, judge, strictly } from './weakened.ts'

// Which edits weaken is the product's own rule; no published source.

describe('the system and its themes', () => {
  it('answers a lower level of the system', () => {
    const model = { ...strictly({}), settings: { ...BASE.settings, level: 'AAA' as const } }
    const { said, gone } = judge(model, { settings: { ...model.settings, level: 'AA' } })
    expect(said).toEqual(['level-lowered level'])
    expect(gone).toBeGreaterThan(0)
    expect(judge(BASE, { settings: { ...BASE.settings, level: 'AAA' } }).said).toEqual([])
  })

  it('answers a floor for disabled that is lowered or taken away', () => {
    const model = system({
      tokens: [token('label', '#999999', { states: ['disabled'] })],
      pairs: [pair('label', 'ground', { relation: 'together' })],
      settings: { disabledFloor: 3 },
    })
    const { disabledFloor: _, ...none } = model.settings
    const gone = judge(model, { settings: none })
    expect(gone.said).toEqual(['floor-lowered disabledFloor'])
    expect(gone.gone).toBeGreaterThan(0)
    const lower = { ...model.settings, disabledFloor: 1.2 }
    expect(judge(model, { settings: lower }).said).toEqual(['floor-lowered disabledFloor'])
    expect(judge(model, { settings: { ...none, disabledFloor: 4 } }).said).toEqual([])
    expect(judge({ ...model, settings: none }, { settings: model.settings }).said).toEqual([])
  })

  it.each([
    ['ships no longer', { p3: false }, 'p3'],
    ['gates no longer', { p3Gates: false }, 'p3Gates'],
    ['does neither any more', { p3: false, p3Gates: false }, 'p3'],
  ] as const)('answers a P3 that %s', (_, members, member) => {
    const model = { ...BASE, settings: { ...BASE.settings, p3: true, p3Gates: true } }
    const { said } = judge(model, { settings: { ...model.settings, ...members } })
    expect(said).toEqual([`p3-switched-off ${member}`])
  })

  it('leaves a P3 that is switched on', () => {
    const on = { ...BASE.settings, p3: true, p3Gates: true }
    expect(judge(BASE, { settings: on }).said).toEqual([])
  })

  it('answers a theme that goes with what is measured in it', () => {
    const { found, gone } = judge(BASE, { themes: BASE.themes.slice(0, 1) })
    expect(found).toMatchObject([{ code: 'theme-removed', item: { kind: 'theme', id: 'dark' } }])
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a theme that takes the place of another', () => {
    const [light, dark] = BASE.themes
    const { said } = judge(BASE, { themes: [light!, { ...dark!, id: 'kiosk' }] })
    expect(said).toEqual(['theme-removed'])
  })

  it('leaves the removal of a theme in which no pair occurs', () => {
    const model = { ...BASE, pairs: [pair('grey', 'ground', { themes: ['light'] })] }
    expect(judge(model, { themes: BASE.themes.slice(0, 1) }).said).toEqual([])
  })

  const edited = (members: Partial<SystemModel['themes'][number]>): SystemEdits => ({
    themes: [{ ...BASE.themes[0]!, ...members }, ...BASE.themes.slice(1)],
  })

  it('answers a theme that only reports from now on', () => {
    const { said, gone } = judge(BASE, edited({ gating: false }))
    expect(said).toEqual(['gating-stopped gating'])
    expect(gone).toBeGreaterThan(0)
    const reporting = applyEdits(BASE, edited({ gating: false }))
    expect(judge(reporting, edited({ gating: true })).said).toEqual([])
  })

  it('answers a lower level of a theme, also where the system asks for it anyway', () => {
    const model = applyEdits(strictly({}), edited({ level: 'AAA' }))
    const { said, gone } = judge(model, edited({}))
    expect(said).toEqual(['level-lowered level'])
    expect(gone).toBeGreaterThan(0)
    const strict = { ...model, settings: { ...model.settings, level: 'AAA' as const } }
    expect(judge(strict, edited({})).said).toEqual(['level-lowered level'])
  })

  it('answers another ground of a theme, where a pair lies on it', () => {
    const model = system({
      tokens: [token('deck', '#ffffff'), token('glass', 'rgb(0 0 0 / 0.4)')],
      pairs: [pair('glass', 'glass')],
    })
    expect(judge(model, edited({ ground: 'deck' })).said).toEqual(['ground-moved ground'])
    const unknown = { ...model, pairs: [pair('glass', 'glass', { backdrop: 'unknown' })] }
    expect(judge(unknown, edited({ ground: 'deck' })).said).toEqual([])
    expect(judge({ ...model, pairs: [] }, edited({ ground: 'deck' })).said).toEqual([])
  })

  it('leaves rules, names, a further theme that only reports, and colours of every kind', () => {
    const edits: SystemEdits[] = [
      edited({ key: 'day', rule: { kind: 'shift', lightness: 0.1 } }),
      { themes: [...BASE.themes, theme('kiosk', { gating: false })] },
      { tokens: { put: [token('grey', '#000000')] } },
      { tokens: { put: [{ ...BASE.tokens[2]!, name: 'fog' }] } },
      { states: { hover: { lightness: 0.3 } } },
      { prefixes: [{ prefix: 'grey', themes: { dark: { kind: 'mirror' } } }] },
    ]
    for (const edit of edits) expect(judge(BASE, edit).said).toEqual([])
  })
})
