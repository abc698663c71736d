import { truncateRatio } from '#shared/checks/finding-words.ts'
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import {
  CONSOLE_COLORS,
  CONSOLE_GROUNDS,
  CONSOLE_REQUIRED,
  consoleColor,
  type Shade,
} from '#console/ui/console-colors.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'
import { renderColor } from '#shared/color/render.ts'

const theme = readFileSync(new URL('../../../../console/ui/theme.css', import.meta.url), 'utf8')
const inTheme = new Map(
  [...theme.matchAll(/--color-([\w-]+): light-dark\((#\w{6}), (#\w{6})\)/g)].map(
    ([, name, light, dark]) => [name, { light, dark }],
  ),
)

const rendered = ({ l, c, h }: Shade) => renderColor({ l, c, h, alpha: 1 })
const luminance = (shade: Shade) => {
  const { r, g, b } = rendered(shade)
  return relativeLuminance(r, g, b)
}
const ratio = (shade: Shade, ground: Shade) => contrastRatio(luminance(shade), luminance(ground))

/** Ratios of the console’s design specification, truncated: light on the four grounds, then dark on the four. */
const PUBLISHED: Record<keyof typeof CONSOLE_REQUIRED, string[]> = {
  ink: ['14.54', '13.53', '15.35', '12.75', '14.08', '12.55', '14.92', '10.58'],
  'ink-soft': ['6.85', '6.37', '7.23', '6.01', '8.34', '7.43', '8.84', '6.26'],
  madder: ['6.44', '5.99', '6.80', '5.65', '6.92', '6.17', '7.33', '5.20'],
  weld: ['5.66', '5.26', '5.97', '4.96', '10.84', '9.66', '11.48', '8.14'],
  woad: ['6.54', '6.08', '6.90', '5.73', '8.89', '7.93', '9.42', '6.68'],
  edge: ['3.99', '3.71', '4.21', '3.49', '4.67', '4.17', '4.95', '3.51'],
}

describe('the console’s own colours', () => {
  it('calls each by the same name in the theme file and in the data, and by no other', () => {
    expect([...inTheme.keys()].sort()).toEqual(CONSOLE_COLORS.map(({ name }) => name).sort())
  })

  it.each(CONSOLE_COLORS)(
    'answers $name alike from its OKLCH source, its hex and the theme file',
    (color) => {
      for (const mode of ['light', 'dark'] as const) {
        const { r, g, b } = rendered(color[mode])
        expect(formatHex(r, g, b)).toBe(color[mode].hex)
        expect(inTheme.get(color.name)?.[mode]).toBe(color[mode].hex)
      }
    },
  )

  it('leaves no colour outside sRGB, so that hex is the whole of it', () => {
    for (const { light, dark } of CONSOLE_COLORS) {
      expect([rendered(light).gamut, rendered(dark).gamut]).toEqual(['srgb', 'srgb'])
    }
  })

  const names = Object.keys(CONSOLE_REQUIRED) as (keyof typeof CONSOLE_REQUIRED)[]
  it.each(names)(
    'answers the published ratios for %s, each at its requirement or above',
    (name) => {
      const ratios = (['light', 'dark'] as const).flatMap((mode) =>
        CONSOLE_GROUNDS.map((ground) =>
          ratio(consoleColor(name)[mode], consoleColor(ground)[mode]),
        ),
      )
      expect(ratios.map((each) => truncateRatio(each, 2))).toEqual(PUBLISHED[name])
      expect(Math.min(...ratios)).toBeGreaterThanOrEqual(CONSOLE_REQUIRED[name])
    },
  )

  it('answers the published ratios of what never carries meaning alone', () => {
    const onGround = (name: string) =>
      (['light', 'dark'] as const).map((mode) =>
        truncateRatio(ratio(consoleColor(name)[mode], consoleColor('ground')[mode]), 2),
      )
    expect(onGround('rule')).toEqual(['2.39', '2.60'])
    expect(onGround('feint')).toEqual(['1.36', '1.52'])
  })

  it('refuses a name that the palette lacks', () => {
    expect(() => consoleColor('gold')).toThrow(TypeError)
  })
})
