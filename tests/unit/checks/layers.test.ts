import { describe, expect, it } from 'vitest'
import type { Finding, PairModel, TokenModel } from '#shared/checks/model.ts'
import { contrastRatio, relativeLuminance, relativeLuminanceP3 } from '#shared/color/luminance.ts'
import { pair, system, theme, token } from './model-builder.ts'
import { findings, read, truncated } from './reading.ts'

const P3 = { p3: true }

/** The one finding of one pair in one theme on a white ground. */
function measured(
  tokens: readonly TokenModel[],
  one: PairModel,
  settings: Parameters<typeof system>[0] = {},
): Finding {
  const model = system({ themes: [theme('light')], tokens, pairs: [one], ...settings })
  const white = {
    ...model,
    tokens: model.tokens.map((own) => (own.id === 'ground' ? token('ground', '#fff') : own)),
  }
  const all = findings(white)
  expect(all).toHaveLength(1)
  return all[0]!
}

describe('layers', () => {
  it('answers #000 at 0.54 on white as 4.61, blended on coded bytes and not in linear light', () => {
    // 0.54 is rendered as 138/255.
    const got = measured([token('fg', 'rgb(0 0 0 / 0.54)')], pair('fg', 'ground'))
    expect(got.ratio).toBeCloseTo(4.61, 2)
    expect(got.rendered).toEqual({ foreground: '#0000008a', background: '#ffffff' })
  })

  it('answers a foreground laid on its background, that on the backdrop, that on the ground', () => {
    const tokens = [
      token('fg', 'rgb(0 0 0 / 0.6)'),
      token('bg', 'rgb(255 0 0 / 0.4)'),
      token('scrim', 'rgb(0 0 255 / 0.2)'),
    ]
    // By hand, α = 153, 102, 51 of 255: scrim on white (204 204 255), bg on that (224 122 153), fg on that.
    const under = relativeLuminance(224, 122, 153)
    const over = relativeLuminance(90, 49, 61)
    const got = measured(tokens, pair('fg', 'bg', { backdrop: ['scrim'] }))
    expect(got.ratio).toBe(contrastRatio(over, under))
  })

  it('answers backdrops bottom first', () => {
    const tokens = [
      token('a', '#f00'),
      token('b', '#00f'),
      token('fg', '#fff'),
      token('bg', 'transparent'),
    ]
    const order = (backdrop: string[]) => measured(tokens, pair('fg', 'bg', { backdrop })).ratio
    expect(order(['a', 'b'])).toBe(contrastRatio(1, relativeLuminance(0, 0, 255)))
    expect(order(['b', 'a'])).toBe(contrastRatio(1, relativeLuminance(255, 0, 0)))
  })

  it('answers each side on the backdrop for link-in-text and focus-adjacent', () => {
    const tokens = [token('fg', 'rgb(0 0 0 / 0.6)'), token('bg', '#404040')]
    const ratioFor = (use: PairModel['use']) => measured(tokens, pair('fg', 'bg', { use })).ratio
    const beside = contrastRatio(relativeLuminance(102, 102, 102), relativeLuminance(64, 64, 64))
    const laidOn = contrastRatio(relativeLuminance(26, 26, 26), relativeLuminance(64, 64, 64))
    expect(ratioFor('link-in-text')).toBe(beside)
    expect(ratioFor('focus-adjacent')).toBe(beside)
    expect(ratioFor('focus-change')).toBe(laidOn)
    expect(ratioFor('non-text')).toBe(laidOn)
  })

  it('answers backdrop tokens at rest whatever the state of the pair', () => {
    const sheet = token('sheet', '#777777', { states: ['hover'] })
    const tokens = [token('fg', '#fff', { states: ['hover'] }), token('bg', 'transparent'), sheet]
    const model = system({
      themes: [theme('light')],
      tokens,
      pairs: [pair('fg', 'bg', { backdrop: ['sheet'] })],
    })
    const hover = findings(model).find((one) => one.foregroundState === 'hover')!
    const { rendered } = read(model, 'fg hover')
    const wanted = contrastRatio(
      relativeLuminance(rendered.r, rendered.g, rendered.b),
      relativeLuminance(119, 119, 119),
    )
    expect(hover.ratio).toBe(wanted)
  })
})

describe('an unknown backdrop', () => {
  const unknown = { backdrop: 'unknown' as const }

  it('answers the least ratio over all backdrops', () => {
    // A black scrim of 0.8 is lightest on white: 51 51 51, under white text.
    const tokens = [token('fg', '#fff'), token('scrim', 'rgb(0 0 0 / 0.8)')]
    const got = measured(tokens, pair('fg', 'scrim', unknown))
    expect(got.ratio).toBe(contrastRatio(1, relativeLuminance(51, 51, 51)))
    expect(got).toMatchObject({ reason: 'backdrop-unknown', outcome: 'pass' })
    expect(got.identity).toBe('fg/scrim/?/text/light/rest/rest')
  })

  it('answers the least ratio whichever backdrop it lies on', () => {
    // Black on a white veil is least on black, on a veil of blue at the corner that holds no red or green.
    const over = (veil: string) =>
      measured([token('fg', '#000'), token('veil', veil)], pair('fg', 'veil', unknown)).ratio
    expect(over('rgb(255 255 255 / 0.8)')).toBe(contrastRatio(0, relativeLuminance(204, 204, 204)))
    expect(over('rgb(0 0 255 / 0.4)')).toBe(contrastRatio(0, relativeLuminance(0, 0, 102)))
    const onTeal = measured(
      [token('fg', '#fff'), token('veil', 'rgb(0 102 102 / 0.8)')],
      pair('fg', 'veil', unknown),
    )
    expect(onTeal.ratio).toBe(contrastRatio(1, relativeLuminance(51, 133, 133)))
  })

  it('answers 1 where the foreground is lighter than some backdrops and darker than others', () => {
    const tokens = [token('fg', '#777777'), token('scrim', 'rgb(0 0 0 / 0.1)')]
    expect(measured(tokens, pair('fg', 'scrim', unknown))).toMatchObject({
      ratio: 1,
      outcome: 'breach',
      reason: 'backdrop-unknown',
    })
  })

  it('answers an opaque background as if the backdrop were known', () => {
    const got = measured(
      [token('fg', 'rgb(0 0 0 / 0.54)'), token('bg', '#fff')],
      pair('fg', 'bg', unknown),
    )
    expect(got.ratio).toBeCloseTo(4.61, 2)
  })
})

describe('two bases', () => {
  const vivid = token('vivid', 'color(display-p3 0 0.45 0.1)')

  it('answers srgb alone where the system ships no P3, or every visible layer lies in sRGB', () => {
    expect(measured([vivid], pair('vivid', 'ground')).ratios).not.toHaveProperty('p3')
    const plain = measured([token('plain', '#456')], pair('plain', 'ground'), { settings: P3 })
    expect(plain.ratios).not.toHaveProperty('p3')
  })

  it('answers the lower of both where a layer leaves sRGB', () => {
    const got = measured([vivid], pair('vivid', 'ground'), { settings: P3 })
    const model = system({ tokens: [vivid] })
    const { rendered } = read(model, 'vivid')
    const srgb = contrastRatio(1, relativeLuminance(rendered.r, rendered.g, rendered.b))
    const p3 = contrastRatio(
      relativeLuminanceP3(255, 255, 255),
      relativeLuminanceP3(rendered.p3r, rendered.p3g, rendered.p3b),
    )
    expect(got.ratios).toEqual({ srgb, p3 })
    expect(got.ratio).toBe(Math.min(srgb, p3))
    expect(got.basis).toBe(p3 < srgb ? 'p3' : 'srgb')
  })

  it('leaves P3 measured but not gating where the system switches that off', () => {
    const find = (settings: { p3: boolean; p3Gates: boolean }) => {
      for (let hue = 0; hue < 360; hue += 10) {
        const wide = token('wide', `oklch(0.6 0.3 ${hue})`)
        const got = measured([wide], pair('wide', 'ground'), { settings })
        if (got.ratios.p3! < got.ratios.srgb) return got
      }
      throw new Error('no hue is lower in P3')
    }
    const gating = find({ p3: true, p3Gates: true })
    expect([gating.basis, gating.ratio]).toEqual(['p3', gating.ratios.p3])
    const off = find({ p3: true, p3Gates: false })
    expect([off.basis, off.ratio]).toEqual(['srgb', off.ratios.srgb])
  })

  it('answers P3 for a vivid background under a plain foreground, not for a layer of no opacity', () => {
    const tokens = [vivid, token('plain', '#123456'), token('none', 'rgb(255 0 0 / 0)')]
    const on = (background: string) =>
      measured(tokens, pair('plain', background), { settings: P3 }).ratios
    expect(on('vivid')).toHaveProperty('p3')
    expect(on('none')).not.toHaveProperty('p3')
  })

  it('answers P3 for a translucent layer inside sRGB, but not for one that is hidden', () => {
    const tokens = [token('glass', 'rgb(0 0 0 / 0.5)'), token('board', '#123456')]
    const shown = measured(tokens, pair('glass', 'board'), { settings: P3 })
    expect(shown.ratios).toHaveProperty('p3')
    const hidden = pair('ink', 'board', { backdrop: ['glass'] })
    expect(measured(tokens, hidden, { settings: P3 }).ratios).not.toHaveProperty('p3')
  })
})

describe('tight', () => {
  /** The alpha byte at which black on white first meets 4.5. */
  const meeting = Array.from({ length: 256 }, (_, a) => a).find((a) => {
    const byte = Math.floor(255 * (1 - a / 255) + 0.5)
    return contrastRatio(relativeLuminance(byte, byte, byte), 1) >= 4.5
  })!
  const at = (a: number, more: Partial<PairModel> = {}) =>
    measured([token('fg', `rgb(0 0 0 / ${a / 255})`)], pair('fg', 'ground', more))

  it('answers tight on both sides of the line where one level flips the verdict', () => {
    expect(at(meeting)).toMatchObject({ outcome: 'pass', tight: true })
    expect(at(meeting - 1)).toMatchObject({ outcome: 'breach', tight: true })
  })

  it('leaves out verdicts further from the line, and opaque ones on it', () => {
    expect(at(meeting + 2)).not.toHaveProperty('tight')
    const opaque = measured([token('fg', '#767676')], pair('fg', 'ground'))
    expect(truncated(opaque.ratio)).toBe(4.54)
    expect(opaque).not.toHaveProperty('tight')
  })

  it('leaves translucent layers that an opaque one hides uncounted', () => {
    const hidden = [token('glass', 'rgb(0 0 0 / 0.5)'), token('board', '#fff')]
    const onBoard = (a: number) =>
      measured(
        [...hidden, token('fg', `rgb(0 0 0 / ${a / 255})`)],
        pair('fg', 'board', { backdrop: ['glass'] }),
      )
    expect(onBoard(meeting)).toMatchObject({ tight: true })
    expect(onBoard(meeting + 1)).not.toHaveProperty('tight')
    expect(onBoard(meeting - 2)).not.toHaveProperty('tight')
  })

  it('leaves a P3 ratio that does not gate from making a verdict tight', () => {
    const glass = token('glass', 'oklch(0.5 0.3 280 / 0.9)')
    const settings = { p3: true, p3Gates: false }
    const got = measured([glass], pair('glass', 'ground', { minimum: 6.35 }), { settings })
    expect([truncated(got.ratios.srgb), truncated(got.ratios.p3!)]).toEqual([6.52, 6.25])
    expect(got.outcome).toBe('pass')
    expect(got).not.toHaveProperty('tight')
  })

  it('answers two levels for two translucent layers', () => {
    // A second, all but invisible layer makes the foreground side move by two.
    const two = (a: number) =>
      measured(
        [token('fg', `rgb(0 0 0 / ${a / 255})`), token('veil', 'rgb(255 255 255 / 0.5)')],
        pair('fg', 'veil'),
      )
    expect(two(meeting + 1)).toMatchObject({ tight: true })
  })
})
