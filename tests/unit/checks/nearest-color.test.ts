import { describe, expect, it } from 'vitest'
import { nearestColor, ratioOnColor } from '#shared/checks/nearest-color.ts'
import { smallestDisjoint } from '#shared/checks/smallest-disjoint.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'

function colorOf(css: string) {
  const reading = parseColor(css)
  if (!reading.ok) throw new TypeError(reading.reason)
  return reading.color
}
const demand = (css: string, required: number) => ({ color: colorOf(css), required })

function hexOf(found: ReturnType<typeof nearestColor>): string | undefined {
  if (found.found === undefined) return undefined
  const { r, g, b } = renderColor(found.found.color)
  return formatHex(r, g, b)
}

describe('the nearest colour against bare colours', () => {
  it('answers #767676 for a light grey on white at 4.5, by WCAG', () => {
    // w3c/wcag understanding/21/non-text-contrast.html
    expect(hexOf(nearestColor(colorOf('#999999'), [demand('#fff', 4.5)]))).toBe('#767676')
  })

  it('answers a colour between two, no further from the start than brute force finds', () => {
    const start = colorOf('oklch(0.75 0.15 150)')
    const demands = [demand('#ffffff', 3), demand('#101010', 4.5)]
    const { found } = nearestColor(start, demands)
    const rendered = renderColor(found!.color)
    for (const { color, required } of demands) {
      expect(ratioOnColor(rendered, renderColor(color))).toBeGreaterThanOrEqual(required)
    }
    let least = Number.POSITIVE_INFINITY
    for (let l = 0; l <= 1; l += 0.002) {
      for (let c = 0; c < 0.3; c += 0.004) {
        const tried = renderColor({ ...start, l, c })
        const passes = demands.every(
          ({ color, required }) => ratioOnColor(tried, renderColor(color)) >= required,
        )
        if (!passes) continue
        least = Math.min(least, Math.hypot(l - start.l!, c - start.c!))
      }
    }
    expect(found!.deltaEOk).toBeLessThanOrEqual(least + 0.002)
  })

  it('answers the start where nothing is asked, or all is met already', () => {
    const start = colorOf('#123456')
    expect(nearestColor(start, [])).toMatchObject({ found: { color: start, deltaEOk: 0 } })
    const met = nearestColor(start, [demand('#ffffff', 7)])
    expect(met).toMatchObject({ found: { color: start }, evaluations: 1, conflict: [] })
  })

  it('answers the fewest demands that no colour meets together', () => {
    const demands = [demand('#ffffff', 2.5), demand('#ffffff', 7), demand('#333333', 4.5)]
    const { found, conflict } = nearestColor(colorOf('#777'), demands)
    expect(found).toBeUndefined()
    expect(conflict).toEqual([1, 2])
    expect(nearestColor(colorOf('#777'), [demand('#808080', 12)]).conflict).toEqual([0])
  })

  it('answers the ratio of a translucent colour over each of the others, 0 and 1 alpha too', () => {
    const clear = nearestColor(colorOf('rgb(0 0 0 / 0)'), [demand('#ffffff', 1)])
    expect(clear.found!.deltaEOk).toBe(0)
    const none = nearestColor(colorOf('rgb(0 0 0 / 0)'), [demand('#ffffff', 1.1)])
    expect(none.conflict).toEqual([0])
    const half = nearestColor(colorOf('rgb(120 120 120 / 0.8)'), [demand('#ffffff', 4.5)])
    expect(half.found!.color.alpha).toBe(0.8)
    expect(
      ratioOnColor(renderColor(half.found!.color), renderColor(colorOf('#fff'))),
    ).toBeGreaterThanOrEqual(4.5)
  })

  it('refuses a translucent side and a ratio that is none', () => {
    const start = colorOf('#777')
    expect(() => nearestColor(start, [demand('#ffffff80', 3)])).toThrow(TypeError)
    for (const ratio of [0.5, 22, Number.NaN]) {
      expect(() => nearestColor(start, [demand('#fff', ratio)])).toThrow(TypeError)
    }
  })
})

describe('the smallest family without a common sample', () => {
  const columns = (...texts: string[]) =>
    texts.map((text) => Uint8Array.from(text, (digit) => Number(digit)))

  it('answers one, two or three, the fewest first, and none where a sample is common', () => {
    expect(smallestDisjoint(columns('110', '011'))).toBeUndefined()
    expect(smallestDisjoint(columns('110', '000', '001'))).toEqual([1])
    expect(smallestDisjoint(columns('110', '011', '001'))).toEqual([0, 2])
    expect(smallestDisjoint(columns('110', '011', '101'))).toEqual([0, 1, 2])
    expect(smallestDisjoint([])).toBeUndefined()
  })

  it('answers four where no three are enough, and leaves out what is needless', () => {
    expect(smallestDisjoint(columns('01111', '10111', '11011', '11101', '11110', '11111'))).toEqual(
      [0, 1, 2, 3, 4],
    )
  })

  it('answers over more samples than a word has', () => {
    const first = new Uint8Array(100).fill(1, 0, 60)
    const second = new Uint8Array(100).fill(1, 59)
    expect(smallestDisjoint([first, second])).toBeUndefined()
    expect(smallestDisjoint([first, second.fill(0, 59, 60)])).toEqual([0, 1])
  })
})
