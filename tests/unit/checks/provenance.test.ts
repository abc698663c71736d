import { expect, it } from 'vitest'
import type { ThemeRule } from '#shared/checks/model.ts'
import { describeProvenance } from '#shared/checks/provenance.ts'
import { system, token, value } from './model-builder.ts'
import { read } from './reading.ts'

function textOf(model: Parameters<typeof read>[0], place: string): string {
  return describeProvenance(read(model, place).provenance, (id) => id)
}

it('answers source, override and alias', () => {
  const a = token('a', '#777', { states: ['hover'], values: { dark: { rest: value('#999') } } })
  const model = system({ tokens: [a, token('b', '{a}')] })
  expect(textOf(model, 'a')).toBe('source')
  expect(textOf(model, 'a dark')).toBe('override')
  expect(textOf(model, 'b')).toBe('{a}')
  expect(textOf(model, 'b hover')).toBe('{a} hover')
})

it('answers what a derivation adds and multiplies', () => {
  const t = {
    ...token('t', '#000'),
    value: {
      kind: 'derived',
      token: 'a',
      lightness: -0.1,
      chroma: 0.5,
      hue: 20,
      alpha: 0.8,
    } as const,
  }
  expect(textOf(system({ tokens: [token('a', '#777'), t] }), 't')).toBe(
    'from {a}, lightness − 0.1, chroma × 0.5, hue + 20°, alpha × 0.8',
  )
})

it('answers the state that a derivation follows', () => {
  const a = token('a', '#777777', { states: ['hover'] })
  const dimmed = { kind: 'derived', token: 'a', alpha: 0.8 } as const
  const t = { ...token('t', '#000000', { states: ['hover'] }), value: dimmed }
  expect(textOf(system({ tokens: [a, t] }), 't')).toBe('from {a}, alpha × 0.8')
  expect(
    describeProvenance(
      {
        from: 'derived',
        token: 'a',
        state: 'hover',
        adjustment: { lightness: 0, chroma: 1, hue: 0, alpha: 1 },
      },
      (id) => id,
    ),
  ).toBe('from {a} hover')
})

it('answers the step of a state rule with what it was taken from, and its factors', () => {
  const states = ['hover', 'active', 'focus', 'disabled'] as const
  const text = (color: string, hover: object, place: string) =>
    textOf(system({ tokens: [token('t', color, { states, rules: { states: { hover } } })] }), place)
  expect(text('oklch(0.6 0.1 258)', {}, 't hover')).toBe('hover: 0.05 away from ground')
  expect(text('oklch(0.6 0.1 258)', {}, 't focus')).toBe('focus: as rest')
  expect(text('oklch(0.6 0.1 258)', {}, 't disabled')).toBe('disabled: chroma × 0.35, alpha × 0.45')
  expect(text('oklch(0.09 0 0)', {}, 't hover')).toBe(
    'hover: 0.05 lighter, no room away from ground',
  )
  const ink = { towards: { direction: 'towards', reference: 'ink' }, lightness: 0.2 }
  expect(text('oklch(0.6 0.1 258)', ink, 't hover')).toBe('hover: 0.2 towards ink')
  expect(text('oklch(0.4 0 0)', { lightness: 0.7 }, 't hover')).toBe(
    'hover: 0.7 lighter, the roomier side, clamped',
  )
  expect(text('rgb(0 0 0 / 0.5)', {}, 't hover')).toBe('hover: alpha + 0.05')
})

it('answers the theme rule with the fields that it uses', () => {
  const text = (rule: ThemeRule) =>
    textOf(system({ tokens: [token('t', '#777')], dark: { rule } }), 't dark')
  expect(text({})).toBe('keep')
  expect(text({ kind: 'mirror', chroma: 0.92 })).toBe('mirror, chroma × 0.92')
  expect(text({ kind: 'relative', k: 0.5 })).toBe('relative, k 0.5')
  expect(text({ kind: 'shift', lightness: 0.1, hue: -15 })).toBe(
    'shift, lightness + 0.1, hue − 15°',
  )
  expect(text({ kind: 'match-contrast' })).toBe('match-contrast, against ground')
})

it('answers how far short match-contrast stays, cut and not rounded', () => {
  const mid = token('mid', '#000', { values: { dark: { rest: value('#9ab') } } })
  const rule: ThemeRule = { kind: 'match-contrast', against: { token: 'mid' } }
  const model = system({ tokens: [mid, token('t', '#fff')], dark: { rule } })
  expect(textOf(model, 't dark')).toMatch(
    /^match-contrast, against mid, short: \d+\.\d\d of 21\.00$/,
  )
})
