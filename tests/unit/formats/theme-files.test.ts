import { describe, expect, it } from 'vitest'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { customProperty, themeCss } from '#shared/formats/theme-css.ts'
import { themeJson } from '#shared/formats/theme-json.ts'
import type { ThemeToken } from '#shared/formats/theme-tokens.ts'

const rendered = (text: string) => {
  const reading = parseColor(text)
  if (!reading.ok) throw new Error(reading.reason)
  return renderColor(reading.color)
}
const token = (name: string, states: Record<string, string>, rest = {}): ThemeToken => ({
  name,
  states: Object.entries(states).map(([state, text]) => ({ state, rendered: rendered(text) })),
  ...rest,
})
const cssOf = (tokens: readonly ThemeToken[]) => {
  const result = themeCss(tokens, true)
  if (!result.ok) throw new Error(JSON.stringify(result.collisions))
  return result.css
}

describe('themeCss', () => {
  it('answers hex for each token and state, eight digits where translucent', () => {
    expect(
      cssOf([
        token('action.board.fill', { rest: '#3366cc', hover: '#2255bb', disabled: '#3366cc73' }),
        token('sand.1', { rest: 'rgb(0 0 0 / 0.5)' }),
      ]),
    ).toBe(
      [
        ':root {',
        '  --action-board-fill: #3366cc;',
        '  --action-board-fill-hover: #2255bb;',
        '  --action-board-fill-disabled: #3366cc73;',
        '  --sand-1: #00000080;',
        '}',
        '',
      ].join('\n'),
    )
  })

  it('answers mapped P3 in a media query where it differs, and leaves no mapping to the browser', () => {
    expect(
      cssOf([
        token('a', { rest: 'oklch(0.7 0.4 150)' }),
        token('b', { rest: 'color(display-p3 0 1 0 / 0.5)' }),
        token('c', { rest: '#3366cc' }),
      ]),
    ).toBe(
      [
        ':root {',
        '  --a: #00c248;',
        '  --b: #00fb2980;',
        '  --c: #3366cc;',
        '}',
        '',
        '@media (color-gamut: p3) {',
        '  :root {',
        '    --a: color(display-p3 0 0.78431 0.19608);',
        '    --b: color(display-p3 0 1 0 / 0.50196);',
        '  }',
        '}',
        '',
      ].join('\n'),
    )
  })

  it('answers P3 fractions that lead back to the same byte', () => {
    for (let byte = 0; byte < 256; byte++) {
      const wide = { ...rendered('#000'), p3r: byte, p3g: 255, gamut: 'p3' as const }
      const css = cssOf([{ name: 'x', states: [{ state: 'rest', rendered: wide }] }])
      const [, fraction] = /display-p3 ([\d.]+) 1/.exec(css)!
      expect(Math.floor(Number(fraction) * 255 + 0.5)).toBe(byte)
    }
  })

  it('answers names escaped as CSS identifiers', () => {
    expect(customProperty('action.board.fill')).toBe('--action-board-fill')
    expect(customProperty('Acid Green')).toBe('--Acid\\ Green')
    expect(customProperty('500')).toBe('--500')
    expect(customProperty('über-grau')).toBe('--über-grau')
    expect(customProperty('a$b/c')).toBe('--a\\$b\\/c')
    expect(customProperty('x;}body{}')).toBe('--x\\;\\}body\\{\\}')
    expect(customProperty('line\nbreak')).toBe('--line\\a break')
    expect(customProperty('button.$root')).toBe('--button-\\$root')
  })

  it('refuses names that become one property, naming both', () => {
    const collide = themeCss(
      [
        token('a.b', { rest: '#fff' }),
        token('a-b', { rest: '#000' }),
        token('fill', { rest: '#fff', hover: '#eee' }),
        token('fill.hover', { rest: '#000' }),
      ],
      true,
    )
    expect(collide).toEqual({
      ok: false,
      collisions: [
        { property: '--a-b', names: ['a.b', 'a-b'], detail: 'a.b and a-b both become --a-b.' },
        {
          property: '--fill-hover',
          names: ['fill (hover)', 'fill.hover'],
          detail: 'fill (hover) and fill.hover both become --fill-hover.',
        },
      ],
    })
  })
})

describe('themeJson', () => {
  it('answers a DTCG document of the theme at rest that our own reader takes', () => {
    const tokens = [
      token(
        'action.board.fill',
        { rest: 'oklch(0.7 0.4 150)', hover: '#222' },
        { description: 'Board' },
      ),
      token('action.board.ring', { rest: '#3366cc80' }, { deprecated: 'use ring' }),
      token('sand.$root', { rest: '#fff' }),
      token('__proto__.toString', { rest: '#000' }),
      token('sand.1', { rest: '#eee' }, { deprecated: false }),
    ]
    const result = themeJson(tokens)
    if (!result.ok) throw new Error('refused')
    const document = JSON.parse(JSON.stringify(result.document))
    expect(document.action.board.fill).toEqual({
      $value: {
        colorSpace: 'srgb',
        components: [0, 194 / 255, 72 / 255],
        alpha: 1,
        hex: '#00c248',
      },
      $description: 'Board',
    })
    const read = readDtcgTokens(document)
    expect(read.faults).toEqual([])
    expect(read.tokens.map(({ name }) => name)).toEqual([
      'action.board.fill',
      'action.board.ring',
      'sand.1',
      'sand.$root',
      '__proto__.toString',
    ])
    for (const each of read.tokens) {
      const source = tokens.find(({ name }) => name === each.name)!
      const { r, g, b, a } = source.states[0]!.rendered
      if (each.value.kind !== 'color') throw new Error('An alias came out of a theme file.')
      expect(renderColor(each.value.color)).toMatchObject({ r, g, b, a })
    }
    expect(read.tokens[1]).toMatchObject({ deprecated: 'use ring' })
  })

  it('refuses a token that stands where another needs a group', () => {
    expect(themeJson([token('a.b.c', { rest: '#fff' }), token('a', { rest: '#000' })])).toEqual({
      ok: false,
      conflicts: [{ names: ['a', 'a.b.c'], detail: 'a is a token, so it cannot hold a.b.c.' }],
    })
  })

  it('refuses a token without a rest state as a wrong call', () => {
    expect(() => themeJson([token('a', { hover: '#fff' })])).toThrow(TypeError)
  })
})
