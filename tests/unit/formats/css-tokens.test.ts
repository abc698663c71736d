import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'
import { readCssTokens } from '#shared/formats/css-tokens.ts'
import type { DtcgColor } from '#shared/formats/dtcg-color.ts'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { themeCss } from '#shared/formats/theme-css.ts'

const read = (css: string, options: Parameters<typeof readCssTokens>[1] = {}) => {
  const result = readCssTokens(css, options)
  if (!result.ok) throw new Error(JSON.stringify(result.faults))
  return result
}

const faultsOf = (css: string, options: Parameters<typeof readCssTokens>[1] = {}) => {
  const result = readCssTokens(css, options)
  if (result.ok) throw new Error('There is no fault')
  return result.faults
}

/** Colours as hex, aliases in braces, by name; of a resolver document in one theme. */
function colors(document: object, theme?: string): Record<string, string> {
  const reading = theme === undefined ? undefined : readDtcgResolver(document)
  const chosen = reading?.ok ? reading.resolver.documentFor({ theme }) : undefined
  const tokens = readDtcgTokens(chosen?.ok ? chosen.document : document)
  expect(tokens.faults).toEqual([])
  return Object.fromEntries(
    tokens.tokens.map(({ name, value }) => {
      if (value.kind === 'alias') return [name, `{${value.name}}`]
      const { r, g, b, a } = renderColor(value.color)
      return [name, [r, g, b, a].map((byte) => byte.toString(16).padStart(2, '0')).join('')]
    }),
  )
}

const defaultTheme = (document: object) => {
  const reading = readDtcgResolver(document)
  return reading.ok ? reading.resolver.modifiers[0] : undefined
}

describe('one block', () => {
  it('answers colours in any CSS notation, and references as aliases', () => {
    const { document, leftOut } = read(`
      :root {
        --sea: #036; --link: var(--sea); --veil: rgb(0 0 0 / 50%); --hull: oklch(0.5 0 none);
        --odd\\/name: White; /* --not: red; */ --late: red /* was blue */;
      }`)
    expect(colors(document)).toEqual({
      sea: '003366ff',
      link: '{sea}',
      veil: '00000080',
      hull: '636363ff',
      'odd/name': 'ffffffff',
      late: 'ff0000ff',
    })
    expect(leftOut).toEqual([])
  })

  it('leaves out what is no colour, and what leads to it, with line and reason', () => {
    const { document, leftOut } = read(`:root {
      --gap: 16px;
      --pad: var(--gap);
      --mix: color-mix(in oklch, red, blue);
      --gone: var(--nowhere);
      --ink: #111;
    }
    .card { --own: red }
    @media print { :root { --ink: #000 } }`)
    expect(colors(document)).toEqual({ ink: '111111ff' })
    expect(leftOut.map(({ line, property }) => [line, property])).toEqual([
      [2, '--gap'],
      [3, '--pad'],
      [4, '--mix'],
      [5, '--gone'],
      [8, '--own'],
      [9, '--ink'],
    ])
    expect(leftOut.find(({ line }) => line === 5)?.detail).toContain('--nowhere')
    expect(leftOut.find(({ line }) => line === 9)?.detail).toContain('@media print')
  })

  it('leaves out a value that is longer than any colour, however many fallbacks lie in it', () => {
    const nested = `${'var(--no,'.repeat(200_000)}red${')'.repeat(200_000)}`
    const { leftOut } = read(`:root { --a: ${nested}; --b: light-dark(${nested}, red) }`)
    expect(leftOut.map(({ property }) => property)).toEqual(['--a', '--b'])
  })

  it('answers the later declaration, unless the earlier one is important', () => {
    const css = ':root { --a: #111; --b: #111 !important } html { --a: #222; --b: #222 }'
    expect(colors(read(css).document)).toEqual({ a: '222222ff', b: '111111ff' })
  })

  it('answers a fallback where the sheet has no such property, and an alias where it has', () => {
    const css = ':root { --a: var(--none, var(--nor, #123)); --b: var(--a, red) }'
    expect(colors(read(css).document)).toEqual({ a: '112233ff', b: '{a}' })
  })

  it('answers an alias to a token that stands in the system', () => {
    const { document } = read(':root { --a: var(--brand) }', { stands: (name) => name === 'brand' })
    expect(document).toMatchObject({ a: { $value: '{brand}' } })
  })

  it('answers names with escapes of every kind, also where they are referred to', () => {
    const css = String.raw`:root {
      --a\:b: #111; --c\;d: #222; --e\"f: #333; --g\(h\,\ i : #444; --\31 j: #555; --k\/ : #666;
      --ref: var(--g\(h\,\ i); --ref2: var(--\31 j)
    }`
    expect(colors(read(css).document)).toEqual({
      'a:b': '111111ff',
      'c;d': '222222ff',
      'e"f': '333333ff',
      'g(h, i': '444444ff',
      '1j': '555555ff',
      'k/': '666666ff',
      ref: '{g(h, i}',
      ref2: '{1j}',
    })
  })

  it('answers dots for hyphens only where that is asked for', () => {
    const css = ':root { --action-board: red; --action--fill: blue; --x: var(--action-board) }'
    expect(Object.keys(colors(read(css).document))).toEqual(['action-board', 'action--fill', 'x'])
    expect(colors(read(css, { hyphensAsDots: true }).document)).toEqual({
      'action.board': 'ff0000ff',
      'action.fill': '0000ffff',
      x: '{action.board}',
    })
  })
})

describe('theme blocks', () => {
  it.each([
    '[data-theme="dark"]',
    ":root[data-theme='dark']",
    'html[data-color-scheme=dark]',
    '.dark',
    '.theme-dark',
    ':root.Dark',
  ])('answers the theme of %s over a base called light', (selector) => {
    const { document } = read(`:root { --a: #fff; --b: #eee } ${selector} { --a: #000 }`)
    expect(defaultTheme(document)).toEqual({
      name: 'theme',
      contexts: ['light', 'dark'],
      default: 'light',
    })
    expect(colors(document, 'light')).toEqual({ a: 'ffffffff', b: 'eeeeeeff' })
    expect(colors(document, 'dark')).toEqual({ a: '000000ff', b: 'eeeeeeff' })
  })

  it('answers the preferred scheme and the attribute as one theme', () => {
    const { document, leftOut } = read(`
      :root { --a: #fff; --b: #eee }
      @media (prefers-color-scheme: dark) { :root:not([data-theme="light"]) { --a: #000 } }
      [data-theme="dark"] { --a: #000; --b: #111 }
      @media (prefers-color-scheme: dark) { [data-theme="light"] { --a: #abc } }`)
    expect(colors(document, 'dark')).toEqual({ a: '000000ff', b: '111111ff' })
    expect(leftOut.map(({ line }) => line)).toEqual([5])
  })

  it('answers what stands under the root and the light theme together as the base', () => {
    const css =
      ':root { --x: #777 } [data-theme=light] { --a: #fff } [data-theme=dark] { --a: #000 }'
    const { document } = read(css)
    expect(colors(document, 'light')).toEqual({ x: '777777ff', a: 'ffffffff' })
    expect(colors(document, 'dark')).toEqual({ x: '777777ff', a: '000000ff' })
  })

  it('answers a theme named beside the root as the base, and the root as dark where only light is set apart', () => {
    const named = read(':root, .dark { --a: #000 } .light { --a: #fff } .kiosk-theme { --a: #ff0 }')
    expect(defaultTheme(named.document)).toMatchObject({
      contexts: ['dark', 'light', 'kiosk'],
      default: 'dark',
    })
    const apart = read(
      ':root { --a: #000 } @media (prefers-color-scheme: light) { :root { --a: #fff } }',
    )
    expect(defaultTheme(apart.document)).toMatchObject({ default: 'dark' })
  })

  it('answers both sides of light-dark()', () => {
    const { document } = read(':root { --a: light-dark(rgb(255, 255, 255), var(--b)); --b: #000 }')
    expect(colors(document, 'light')).toEqual({ a: 'ffffffff', b: '000000ff' })
    expect(colors(document, 'dark')).toEqual({ a: '{b}', b: '000000ff' })
  })

  it('answers nested blocks', () => {
    const css = `:root { --a: #fff;
      &[data-theme=dark] { --a: #000 }
      @media (prefers-color-scheme: dark) { --b: #111 } --b: #eee }`
    expect(colors(read(css).document, 'dark')).toEqual({ a: '000000ff', b: '111111ff' })
  })
})

describe('a style sheet that cannot be taken', () => {
  it('refuses every fault at once, with its line', () => {
    const css = `:root {
      --a: var(--b); --b: var(--a);
      --side: red; --side-left: blue;
      --\\{x: red;
    }
    .dark { --only: red }`
    const faults = faultsOf(css, { hyphensAsDots: true })
    expect(faults.map(({ line, property }) => [line, property])).toEqual(
      expect.arrayContaining([
        [2, '--a'],
        [2, '--b'],
        [3, '--side-left'],
        [4, '--{x'],
        [6, '--only'],
      ]),
    )
    expect(faults).toHaveLength(5)
  })

  it.each([String.raw`--\1 x`, '--__proto__', '--', String.raw`--\$x`, `--${'x'.repeat(256)}`])(
    'refuses the name of %s',
    (property) => expect(faultsOf(`:root { ${property}: red }`)).toHaveLength(1),
  )

  it('refuses two properties that come to one name', () => {
    const [fault] = faultsOf(':root { --a-b: red; --a--b: blue }', { hyphensAsDots: true })
    expect(fault?.detail).toContain('--a-b')
  })

  it.each([':root { --a: "x', ':root { --a: red', '}', '/* never closed'])(
    'refuses the broken text %j with a line',
    (css) => expect(faultsOf(css)).toEqual([{ line: 1, detail: expect.any(String) }]),
  )

  it('refuses blocks without end, and lists of selectors that multiply', () => {
    const deep = `${'a{'.repeat(40)}--a:red${'}'.repeat(40)}`
    expect(faultsOf(deep)[0]?.detail).toContain('depth')
    const wide = `${'a,b,c,d{'.repeat(8)}--a:red${'}'.repeat(8)}`
    expect(faultsOf(wide)[0]?.detail).toContain('selectors')
    expect(faultsOf(';'.repeat(400_001))[0]?.detail).toContain('400000')
  })
})

it('answers the bytes of a theme that was written as CSS', () => {
  const byte = fc.integer({ min: 0, max: 255 })
  const alpha = fc.constantFrom(255, 255, 128, 3)
  fc.assert(
    fc.property(fc.array(fc.tuple(byte, byte, byte, alpha), { minLength: 1 }), (all) => {
      const tokens = all.map(([r, g, b, a], at) => {
        const color: DtcgColor = {
          colorSpace: 'srgb',
          components: [r / 255, g / 255, b / 255],
          alpha: a / 255,
        }
        const text = `color(srgb ${color.components.join(' ')} / ${color.alpha})`
        const parsed = parseColor(text)
        if (!parsed.ok) throw new Error(parsed.reason)
        return {
          name: `${at}.é 🎨/%`,
          states: [{ state: 'rest', rendered: renderColor(parsed.color) }],
        }
      })
      const written = themeCss(tokens, true)
      if (!written.ok) throw new Error(written.collisions[0]?.detail)
      const hex = ([r, g, b, a]: readonly number[]) =>
        [r, g, b, a].map((part = 0) => part.toString(16).padStart(2, '0')).join('')
      expect(colors(read(written.css, { hyphensAsDots: true }).document)).toEqual(
        Object.fromEntries(all.map((bytes, at) => [`${at}.é 🎨/%`, hex(bytes)])),
      )
    }),
  )
})
